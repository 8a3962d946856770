import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import {
  changeLog as changeLogRow,
  findLogForChange,
  findMachineOfLog,
  getLogOrThrow,
  type LogRow,
} from "@/db/queries/logs";
import type { Transaction } from "@/db/client";
import { AppError } from "@/lib/errors";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { describeLog, isBusy } from "@/lib/server/logs/describe-log";
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

/** Renames a log, or says which machine made it; another machine places every row anew, as a new version. */
export async function changeLog(
  container: Container,
  scope: Scope,
  input: { logId: string; name?: string; machineId?: string | null },
): Promise<Log> {
  const { logId, name, machineId } = input;
  const { log, isQueued } = await withOrganisation(scope, async (tx) => {
    const before = await getLogOrThrow(tx, scope, logId);
    const isOther = machineId !== undefined && machineId !== before.machineId;
    if (isOther) refuseBusy(before);
    if (isOther && machineId) await demandMachine(tx, scope, machineId);
    const isReadAgain = isOther && before.mapping !== null;
    await changeLogRow(tx, scope, logId, {
      ...(name === undefined ? {} : { name }),
      ...(isOther ? { machineId } : {}),
      ...(isReadAgain ? QUEUED : {}),
    });
    if (isReadAgain) await noteReadLog(tx, scope, logId);
    await recordAudit(tx, scope, { action: "log.change", subject: logId, detail: { name, machineId } });
    return { log: describeLog(await getLogOrThrow(tx, scope, logId)), isQueued: isReadAgain };
  });
  if (isQueued) await sendReadLog(container, scope, logId);
  return log;
}
