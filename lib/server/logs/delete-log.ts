import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { endJobs } from "@/db/queries/jobs";
import { deleteLogRows, getLogOrThrow, isFileInUse, isLogRemovable, lockBytes } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { uploadKey } from "@/lib/server/logs/log-file";

const NOT_YOURS =
  "You can remove files that you uploaded yourself and that were never read. Ask an owner or an agronomist to remove this log.";

/**
 * Removes a log with everything derived from it, and its file where no other log keeps the same bytes. A worker reading
 * it notices and stops. @throws AppError `not_found`, `conflict` where it is not the caller's to remove
 */
export async function deleteLog(container: Container, scope: Scope, logId: string): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const log = await getLogOrThrow(tx, scope, logId);
    if (!(await isLogRemovable(tx, scope, logId)))
      throw new AppError("conflict", NOT_YOURS, { detailCode: "log_kept" });
    await lockBytes(tx, scope, log.sha256);
    const isShared = await isFileInUse(tx, scope, { sha256: log.sha256, exceptLogId: logId });
    await deleteLogRows(tx, scope, logId);
    await endJobs(tx, scope, { subject: logId, state: "cancelled" });
    await recordAudit(tx, scope, { action: "log.delete", subject: logId, detail: { name: log.name } });
    if (!isShared) await container.storage.delete(uploadKey(log));
  });
}
