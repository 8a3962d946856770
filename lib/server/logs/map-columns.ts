import "server-only";
import { z } from "zod";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { findLogResult } from "@/db/queries/log-results";
import { changeLog, getLogOrThrow } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import { chooseLayer } from "@/lib/ingest/columns/choose-layer";
import { IngestFailure } from "@/lib/ingest/ingest-error";
import type { Inspection, LoggedDevice } from "@/lib/ingest/log-format";
import { chosenLayer, parseMapping, type LogMapping } from "@/lib/ingest/mapping";
import { buildReadPlan } from "@/lib/ingest/records/read-plan";
import { measureDevice } from "@/lib/machines/describe-device";
import { MappingMachine, type Log, type LogColumns } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { demandMachine, getLogForChange, QUEUED, refuseBegun } from "@/lib/server/logs/change-log";
import { describeLog } from "@/lib/server/logs/describe-log";
import { mappingError } from "@/lib/server/logs/mapping-error";
import { noteReadLog, sendReadLog } from "@/lib/server/logs/queue-log";
import { findRecipeOfLog, keepRecipe, saveRecipeOfLog } from "@/lib/server/logs/recipe-of-log";

/** A mapping from outside. @throws AppError `unprocessable` naming the column and the rule */
export function readMapping(input: unknown): LogMapping {
  const parsed = parseMapping(input);
  if (!parsed.ok) throw mappingError(parsed.error);
  return parsed.value;
}

function refuseMisfit(mapping: LogMapping, inspection: Inspection): void {
  try {
    chooseLayer<{ id: string }>(inspection.layers ?? [{ id: mapping.layer ?? "" }], mapping.layer, "The file");
    const columns = chosenLayer(mapping, inspection)?.columns ?? inspection.columns;
    buildReadPlan(
      mapping,
      columns.map((column) => column.name),
    );
  } catch (error) {
    if (error instanceof IngestFailure) throw mappingError(error.error);
    throw error;
  }
}

/** What was found in the file. @throws AppError `conflict` before anybody has looked, or where nothing could be found */
export async function getColumns(_container: Container, scope: Scope, logId: string): Promise<LogColumns> {
  return withOrganisation(scope, async (tx) => {
    const log = await getLogOrThrow(tx, scope, logId);
    const found = (await findLogResult(tx, scope, { logId, version: 0, kind: "columns" })) as Inspection | null;
    if (!found) throw noColumns(log.error?.message);
    const recipe = await findRecipeOfLog(tx, scope, log);
    return {
      format: found.format,
      shape: found.shape,
      columns: found.columns,
      crs: found.crs,
      crsCandidates: found.crsCandidates,
      layers: found.layers?.map(({ device, ...layer }) => ({ ...layer, device: describeDevice(device) })),
      device: describeDevice(found.device),
      example: found.example,
      decimalComma: found.decimalComma,
      notes: found.notes,
      mapping: log.mapping,
      recipe,
    };
  });
}

function describeDevice(device: LoggedDevice | undefined): LogColumns["device"] {
  if (!device) return undefined;
  const { rowSpacingM, widthM } = measureDevice(device);
  return { ...device, rowSpacingM, widthM };
}

function noColumns(reason: string | undefined): AppError {
  const message = reason ?? "The columns of this log have not been looked at yet. Ask again in a moment.";
  return new AppError("conflict", message, { detailCode: "columns_not_known" });
}

/** What may stand beside a mapping. @throws ZodError */
function readMachineId(body: unknown): string | null | undefined {
  return z.looseObject({ machineId: MappingMachine }).parse(body).machineId;
}

/**
 * Takes the meaning of the columns, and with it the machine where one is named, and reads the file again as a new version.
 * A log that waits for its first or next reading is read with the new meaning only.
 */
export async function putMapping(
  container: Container,
  scope: Scope,
  input: { logId: string; body: unknown },
): Promise<Log> {
  const { save, ...mapping } = readMapping(input.body);
  const machineId = readMachineId(input.body);
  const { logId } = input;
  const log = await withOrganisation(scope, async (tx) => {
    const before = await getLogForChange(tx, scope, logId);
    refuseBegun(before);
    if (machineId && machineId !== before.machineId) await demandMachine(tx, scope, machineId);
    const found = (await findLogResult(tx, scope, { logId, version: 0, kind: "columns" })) as Inspection | null;
    if (!found) throw noColumns(before.error?.message);
    refuseMisfit(mapping, found);
    const recipe = save
      ? await saveRecipeOfLog(tx, scope, {
          name: save,
          mapping,
          found,
          machineId: machineId === undefined ? before.machineId : machineId,
        })
      : await keepRecipe(tx, scope, { log: before, mapping });
    const machine = machineId === undefined ? {} : { machineId };
    await changeLog(tx, scope, logId, { ...QUEUED, mapping, ...recipe, ...machine });
    if (before.status !== "queued") await noteReadLog(tx, scope, logId);
    const detail = { recipe: save ?? null, recipeVersion: recipe.recipeVersion, ...machine };
    await recordAudit(tx, scope, { action: "log.map", subject: logId, detail });
    return describeLog(await getLogOrThrow(tx, scope, logId), scope);
  });
  await sendReadLog(container, scope, logId);
  return log;
}
