import { isDeepStrictEqual } from "node:util";
import type { Transaction } from "@/db/client";
import { findMachineOfLog, type LogRow } from "@/db/queries/logs";
import { findRecipeAtVersion, saveRecipe } from "@/db/queries/recipes";
import { newId } from "@/lib/ids";
import type { Inspection } from "@/lib/ingest/log-format";
import { chosenLayer, headerSignature, toRecipe, type LogMapping } from "@/lib/ingest/mapping";
import type { LogColumns } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";

/** Name and version of the recipe that a log was read with, also where it was deleted since. */
export async function findRecipeOfLog(
  tx: Transaction,
  scope: Scope,
  { recipeId, recipeVersion }: Pick<LogRow, "recipeId" | "recipeVersion">,
): Promise<LogColumns["recipe"]> {
  if (recipeId === null) return null;
  const found = await findRecipeAtVersion(tx, scope, { id: recipeId, version: recipeVersion ?? "newest" });
  return found && { id: recipeId, name: found.recipe.name, version: found.version.version };
}

export type RecipeOfLog = Pick<LogRow, "recipeId" | "recipeVersion">;

/** Keeps a log's mapping under a name, beside the machine that the log has. */
export async function saveRecipeOfLog(
  tx: Transaction,
  scope: Scope,
  input: { name: string; mapping: LogMapping; found: Inspection; machineId: string | null },
): Promise<RecipeOfLog> {
  const { name, mapping, found, machineId } = input;
  const layered = { ...found, ...chosenLayer(mapping, found) };
  const { id, version } = await saveRecipe(tx, scope, {
    id: newId("recipe"),
    name,
    format: layered.format,
    columnNames: layered.columns.map((column) => column.name),
    headerSignature: headerSignature(layered),
    mapping: toRecipe(mapping),
    machine: machineId ? await findMachineOfLog(tx, scope, machineId) : null,
  });
  return { recipeId: id, recipeVersion: version };
}

/** A log whose meaning stays what its recipe says is still read with that recipe. */
export async function keepRecipe(
  tx: Transaction,
  scope: Scope,
  { log, mapping }: { log: LogRow; mapping: LogMapping },
): Promise<RecipeOfLog> {
  const { recipeId, recipeVersion } = log;
  const known =
    recipeId && (await findRecipeAtVersion(tx, scope, { id: recipeId, version: recipeVersion ?? "newest" }));
  const isSame = known && isDeepStrictEqual(toRecipe(mapping), known.version.mapping);
  return isSame ? { recipeId, recipeVersion: known.version.version } : { recipeId: null, recipeVersion: null };
}
