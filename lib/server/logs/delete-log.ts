import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { endJobs } from "@/db/queries/jobs";
import { isFileInUse, listLogFiles } from "@/db/queries/log-files";
import { deleteLogRows, getLogOrThrow, isLogRemovable, lockBytes } from "@/db/queries/logs";
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
    const unshared: string[] = [];
    for (const { sha256 } of await lockLogFiles(tx, scope, logId)) {
      if (!(await isFileInUse(tx, scope, { sha256, exceptLogId: logId }))) unshared.push(sha256);
    }
    await deleteLogRows(tx, scope, logId);
    await endJobs(tx, scope, { subject: logId, state: "cancelled" });
    await recordAudit(tx, scope, { action: "log.delete", subject: logId, detail: { name: log.name } });
    const { organisationId } = scope;
    for (const sha256 of unshared) await container.storage.delete(uploadKey({ organisationId, sha256 }));
  });
}

/** The files of a log, each held; always in the same order, so that two requests never wait for each other. */
async function lockLogFiles(tx: Transaction, scope: Scope, logId: string): Promise<{ sha256: string }[]> {
  const files = (await listLogFiles(tx, scope, logId)).sort((a, b) => (a.sha256 < b.sha256 ? -1 : 1));
  for (const { sha256 } of files) await lockBytes(tx, scope, sha256);
  return files;
}
