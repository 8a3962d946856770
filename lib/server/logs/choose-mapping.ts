import { withOrganisation, type Transaction } from "@/db/client";
import { changeLog, type LogRow } from "@/db/queries/logs";
import { changeRecipe, findRecipesBySignature } from "@/db/queries/recipes";
import type { Inspection } from "@/lib/ingest/log-format";
import { headerSignature, mappingFits, type LogMapping } from "@/lib/ingest/mapping";
import { saveRecipeOfLog, type RecipeOfLog } from "@/lib/server/logs/recipe-of-log";
import { workerScope } from "@/lib/server/logs/worker-scope";

export interface ChosenMapping extends RecipeOfLog {
  mapping: LogMapping;
}

interface Choice {
  log: LogRow;
  inspection: Inspection;
}

/** The mapping given with the log, else that of the recipe for files with this very header; null when a person must say. */
export async function chooseMapping(log: LogRow, inspection: Inspection): Promise<ChosenMapping | null> {
  const choice = { log, inspection };
  return withOrganisation({ organisationId: log.organisationId }, async (tx) =>
    log.mapping ? keepGivenMapping(tx, choice, log.mapping) : findRecipeMapping(tx, choice),
  );
}

async function keepGivenMapping(
  tx: Transaction,
  { log, inspection }: Choice,
  given: LogMapping,
): Promise<ChosenMapping> {
  const { save, ...mapping } = given;
  if (!save) return { mapping, recipeId: log.recipeId, recipeVersion: log.recipeVersion };
  const scope = { ...workerScope(log.organisationId), userId: log.uploadedBy ?? "" };
  const { machineId } = log;
  const recipe = await saveRecipeOfLog(tx, scope, { name: save, mapping, found: inspection, machineId });
  // In one step with the saving: a reading that starts anew must not make the next version of it.
  await changeLog(tx, scope, log.id, { mapping, ...recipe });
  return { mapping, ...recipe };
}

async function findRecipeMapping(tx: Transaction, { log, inspection }: Choice): Promise<ChosenMapping | null> {
  const scope = workerScope(log.organisationId);
  const recipes = await findRecipesBySignature(tx, scope, headerSignature(inspection));
  // The same header: what shape it has was for the person to say, and they said it once.
  const fitting = recipes.find(({ mapping }) => mappingFits(mapping, { ...inspection, shape: mapping.shape }));
  if (!fitting) return null;
  await changeRecipe(tx, scope, { id: fitting.id, usedAt: new Date() });
  return { mapping: fitting.mapping, recipeId: fitting.id, recipeVersion: fitting.version };
}
