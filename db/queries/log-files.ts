import { and, eq, ne } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { logFiles } from "@/db/schema";
import type { Scope } from "@/lib/scope";

export type LogFileRow = typeof logFiles.$inferSelect;
export type NewLogFile = Pick<LogFileRow, "fileName" | "fileBytes" | "sha256" | "copies">;

/** The files of a log in the order they were sent; one for most logs. */
export async function listLogFiles(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  logId: string,
): Promise<LogFileRow[]> {
  return tx
    .select()
    .from(logFiles)
    .where(and(eq(logFiles.organisationId, scope.organisationId), eq(logFiles.logId, logId)))
    .orderBy(logFiles.part);
}

export async function insertLogFiles(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  input: { logId: string; files: readonly NewLogFile[] },
): Promise<void> {
  const { organisationId } = scope;
  const { logId, files } = input;
  await tx.insert(logFiles).values(
    files.map(({ fileName, fileBytes, sha256, copies }, part) => ({
      organisationId,
      logId,
      part,
      fileName,
      fileBytes,
      sha256,
      copies,
    })),
  );
}

/** Whether any log of the organisation, other than `exceptLogId`, keeps these bytes. */
export async function isFileInUse(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  input: { sha256: string; exceptLogId: string },
): Promise<boolean> {
  const rows = await tx
    .select({ logId: logFiles.logId })
    .from(logFiles)
    .where(
      and(
        eq(logFiles.organisationId, scope.organisationId),
        eq(logFiles.sha256, input.sha256),
        ne(logFiles.logId, input.exceptLogId),
      ),
    )
    .limit(1);
  return rows.length > 0;
}
