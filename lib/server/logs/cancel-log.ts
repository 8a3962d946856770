import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { endJobs } from "@/db/queries/jobs";
import { changeLog, getLogOrThrow, requestCancel } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import type { Log } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { QUEUED, refuseBusy } from "@/lib/server/logs/change-log";
import { describeLog } from "@/lib/server/logs/describe-log";
import { noteReadLog, sendReadLog } from "@/lib/server/logs/queue-log";

const STOPPED = "Stopped because somebody asked for it. The file is kept: it can be read again.";

/** Asks for a stop: at once where nobody reads the log yet, else the worker stops within moments. */
export async function cancelLog(_container: Container, scope: Scope, logId: string): Promise<Log> {
  return withOrganisation(scope, async (tx) => {
    const before = await getLogOrThrow(tx, scope, logId);
    if (!(await requestCancel(tx, scope, logId)) && before.cancelRequestedAt === null) {
      throw new AppError("conflict", "Nothing is going on with this log.", { detailCode: "log_not_busy" });
    }
    if (before.status === "queued") {
      const error = { code: "cancelled", message: STOPPED };
      await changeLog(tx, scope, logId, { status: "failed", stage: "Stopped", error, cancelRequestedAt: null });
      await endJobs(tx, scope, { subject: logId, state: "cancelled" });
    }
    await recordAudit(tx, scope, { action: "log.cancel", subject: logId, detail: { name: before.name } });
    return describeLog(await getLogOrThrow(tx, scope, logId), scope);
  });
}

/** Reads the stored file again, with the mapping it has. */
export async function retryLog(container: Container, scope: Scope, logId: string): Promise<Log> {
  const log = await withOrganisation(scope, async (tx) => {
    const before = await getLogOrThrow(tx, scope, logId);
    refuseBusy(before);
    await changeLog(tx, scope, logId, QUEUED);
    await noteReadLog(tx, scope, logId);
    await recordAudit(tx, scope, { action: "log.retry", subject: logId, detail: { name: before.name } });
    return describeLog(await getLogOrThrow(tx, scope, logId), scope);
  });
  await sendReadLog(container, scope, logId);
  return log;
}
