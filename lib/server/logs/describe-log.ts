import type { LogRow } from "@/db/queries/logs";
import { can } from "@/lib/access/permissions";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";

function mayRemove(row: LogRow, scope: Scope): boolean {
  if (can(scope.role, "logs.delete")) return true;
  if (!can(scope.role, "logs.remove")) return false;
  return row.uploadedBy === scope.userId && row.version === 0 && row.status !== "ready";
}

/** A log's row as the API tells it to the caller. */
export function describeLog(row: LogRow, scope: Scope): Log {
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
    mappingVersion: row.recipeVersion,
    fileName: row.fileName,
    fileBytes: row.fileBytes,
    sha256: row.sha256,
    version: row.version,
    revision: row.adjustmentRevision,
    createdAt: row.createdAt.toISOString(),
    removable: mayRemove(row, scope),
  };
}

/** Whether work on the log goes on or waits for the worker. */
export function isBusy(status: Log["status"]): boolean {
  return status === "queued" || status === "reading" || status === "building";
}
