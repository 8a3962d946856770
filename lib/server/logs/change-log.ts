import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { getField } from "@/db/queries/fields";
import { isLogShared, moveLogRow } from "@/db/queries/log-places";
import {
  changeLog as changeLogRow,
  findLogForChange,
  findMachineOfLog,
  findSameBytes,
  getLogOrThrow,
  lockBytes,
  type LogRow,
} from "@/db/queries/logs";
import type { Transaction } from "@/db/client";
import { describeChanges } from "@/lib/audit/describe-changes";
import { AppError } from "@/lib/errors";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { describeLog, isBusy } from "@/lib/server/logs/describe-log";
import { OUTSIDE_FIELD } from "@/lib/logs/note-codes";
import { noteReadLog, sendReadLog } from "@/lib/server/logs/queue-log";

/** What a log's row becomes when it is to be read again. */
export const QUEUED = {
  status: "queued",
  stage: "Waiting for its turn",
  progress: 0,
  error: null,
  cancelRequestedAt: null,
} as const;

/** @throws AppError `conflict` while the log is being read */
export function refuseBusy(log: LogRow): void {
  if (!isBusy(log.status)) return;
  throw new AppError("conflict", "This log is being read. Wait for the end, or stop it first.", {
    detailCode: "log_busy",
  });
}

/** For a change that a log may also take while it merely waits: no reading has begun that would not know of it. */
export function refuseBegun(log: LogRow): void {
  if (log.status !== "queued") refuseBusy(log);
}

/** @throws AppError `not_found` */
export async function getLogForChange(tx: Transaction, scope: Scope, logId: string): Promise<LogRow> {
  const row = await findLogForChange(tx, scope, logId);
  if (!row) throw new AppError("not_found", "There is no such log.");
  return row;
}

/** @throws AppError `unprocessable` for a machine that is not there */
export async function demandMachine(tx: Transaction, scope: Scope, machineId: string): Promise<void> {
  if (await findMachineOfLog(tx, scope, machineId)) return;
  const message = "there is no such machine";
  throw new AppError("unprocessable", `machineId: ${message}.`, { places: [{ path: "machineId", message }] });
}

interface LogChanges {
  logId: string;
  name?: string;
  machineId?: string | null;
  fieldId?: string;
}

/** Renames a log, says which machine made it, or moves it to another field; the last two place every row anew, as a new version. */
export async function changeLog(container: Container, scope: Scope, input: LogChanges): Promise<Log> {
  const { logId, name, machineId, fieldId } = input;
  const { log, isQueued } = await withOrganisation(scope, async (tx) => {
    const before = await getLogForChange(tx, scope, logId);
    const isOther = machineId !== undefined && machineId !== before.machineId;
    const isMoved = fieldId !== undefined && fieldId !== before.fieldId;
    if (isOther || isMoved) refuseBusy(before);
    if (isOther && machineId) await demandMachine(tx, scope, machineId);
    if (isMoved) await moveLog(tx, scope, { log: before, fieldId });
    const isReadAgain = (isOther && before.mapping !== null) || (isMoved && before.status !== "failed");
    await changeLogRow(tx, scope, logId, {
      ...(name === undefined ? {} : { name }),
      ...(isOther ? { machineId } : {}),
      ...(isMoved ? { notes: before.notes.filter((note) => note.code !== OUTSIDE_FIELD) } : {}),
      ...(isReadAgain ? QUEUED : {}),
    });
    if (isReadAgain) await noteReadLog(tx, scope, logId);
    const changes = describeChanges(before, { name, machineId, fieldId });
    const detail = { name: before.name, ...changes };
    await recordAudit(tx, scope, { action: isMoved ? "log.move" : "log.change", subject: logId, detail });
    return { log: describeLog(await getLogOrThrow(tx, scope, logId), scope), isQueued: isReadAgain };
  });
  if (isQueued) await sendReadLog(container, scope, logId);
  return log;
}

/** @throws AppError `unprocessable` for a field that is not there, `conflict` where it has the file or a link shows the log */
async function moveLog(
  tx: Transaction,
  scope: Scope,
  { log, fieldId }: { log: LogRow; fieldId: string },
): Promise<void> {
  if (!(await getField(tx, scope, fieldId))) {
    const message = "there is no such field";
    throw new AppError("unprocessable", `fieldId: ${message}.`, { places: [{ path: "fieldId", message }] });
  }
  await lockBytes(tx, scope, log.sha256);
  const same = await findSameBytes(tx, scope, { fieldId, sha256: log.sha256 });
  if (same) {
    const message = "That field has this file already. Open the log there, and remove this one.";
    throw new AppError("conflict", message, { detailCode: "same_bytes", extra: { id: same.id, logId: same.id } });
  }
  if (await isLogShared(tx, scope, log.id)) {
    const message = "A link shows this log as part of the field it is in. End that link first, then move the log.";
    throw new AppError("conflict", message, { detailCode: "log_shared" });
  }
  await moveLogRow(tx, scope, { logId: log.id, fieldId });
}
