import type { LogRow } from "@/db/queries/logs";
import type { Log } from "@/lib/schemas/logs";

/** A log's row as the API tells it. */
export function describeLog(row: LogRow): Log {
  return {
    id: row.id,
    fieldId: row.fieldId,
    name: row.name,
    kind: row.kind,
    status: row.status,
    progress: row.progress,
    stage: row.stage,
    error: row.error ?? null,
    notes: row.notes,
    counts: row.counts,
    channels: row.channels,
    startedAt: row.startedAt?.toISOString() ?? null,
    endedAt: row.endedAt?.toISOString() ?? null,
    bbox: row.bbox ?? null,
    machineId: row.machineId,
    mappingId: row.recipeId,
    fileName: row.fileName,
    fileBytes: row.fileBytes,
    sha256: row.sha256,
    version: row.version,
    createdAt: row.createdAt.toISOString(),
  };
}

/** Whether work on the log goes on or waits for the worker. */
export function isBusy(status: Log["status"]): boolean {
  return status === "queued" || status === "reading" || status === "building";
}
