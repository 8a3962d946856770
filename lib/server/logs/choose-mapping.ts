import { withOrganisation, type Transaction } from "@/db/client";
import type { LogRow } from "@/db/queries/logs";
import { findRecipesBySignature, markRecipeUsed, saveRecipe } from "@/db/queries/recipes";
import { newId } from "@/lib/ids";
import type { Inspection } from "@/lib/ingest/log-format";
import { chosenLayer, headerSignature, mappingFits, toRecipe, type LogMapping } from "@/lib/ingest/mapping";
import { workerScope } from "@/lib/server/logs/worker-scope";

export interface ChosenMapping {
  mapping: LogMapping;
  recipeId: string | null;
}

/** The mapping given with the log, else the newest recipe for files with this very header; null when a person must say. */
export async function chooseMapping(log: LogRow, inspection: Inspection): Promise<ChosenMapping | null> {
  return withOrganisation({ organisationId: log.organisationId }, async (tx) =>
    log.mapping ? keepGivenMapping(tx, log, log.mapping, inspection) : findRecipeMapping(tx, log, inspection),
  );
}

// kernel: four values that belong together for one step of `chooseMapping`.
async function keepGivenMapping(
  tx: Transaction,
  log: LogRow,
  given: LogMapping,
  inspection: Inspection,
): Promise<ChosenMapping> {
  const { save, ...mapping } = given;
  if (!save) return { mapping, recipeId: log.recipeId };
  const scope = { ...workerScope(log.organisationId), userId: log.uploadedBy ?? "" };
  const signature = headerSignature({ ...inspection, ...chosenLayer(mapping, inspection) });
  const recipe = { id: newId("recipe"), name: save, headerSignature: signature, mapping: toRecipe(mapping) };
  return { mapping, recipeId: await saveRecipe(tx, scope, recipe) };
}

async function findRecipeMapping(tx: Transaction, log: LogRow, inspection: Inspection): Promise<ChosenMapping | null> {
  const scope = workerScope(log.organisationId);
  const recipes = await findRecipesBySignature(tx, scope, headerSignature(inspection));
  // The same header: what shape it has was for the person to say, and they said it once.
  const fitting = recipes.find(({ mapping }) => mappingFits(mapping, { ...inspection, shape: mapping.shape }));
  if (!fitting) return null;
  await markRecipeUsed(tx, scope, fitting.id);
  return { mapping: fitting.mapping, recipeId: fitting.id };
}
