import { withOrganisation } from "@/db/client";
import type { LogRow } from "@/db/queries/logs";
import { findRecipesBySignature, markRecipeUsed } from "@/db/queries/recipes";
import type { Inspection } from "@/lib/ingest/log-format";
import { headerSignature, mappingFits, type LogMapping } from "@/lib/ingest/mapping";
import { workerScope } from "@/lib/server/logs/worker-scope";

export interface ChosenMapping {
  mapping: LogMapping;
  recipeId: string | null;
}

/** The mapping given with the log, else the newest recipe for files with this very header; null when a person must say. */
export async function chooseMapping(log: LogRow, inspection: Inspection): Promise<ChosenMapping | null> {
  if (log.mapping) return { mapping: log.mapping, recipeId: log.recipeId };
  const scope = workerScope(log.organisationId);
  return withOrganisation(scope, async (tx) => {
    const recipes = await findRecipesBySignature(tx, scope, headerSignature(inspection));
    const fitting = recipes.find((recipe) => mappingFits(recipe.mapping, inspection));
    if (!fitting) return null;
    await markRecipeUsed(tx, scope, fitting.id);
    return { mapping: fitting.mapping, recipeId: fitting.id };
  });
}
