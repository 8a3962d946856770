import { and, desc, eq } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { logAdjustments, users } from "@/db/schema";
import type { Scope } from "@/lib/scope";

export type AdjustmentRow = typeof logAdjustments.$inferSelect;
type InOrganisation = Pick<Scope, "organisationId">;

function isOfLog({ organisationId }: InOrganisation, logId: string) {
  return and(eq(logAdjustments.organisationId, organisationId), eq(logAdjustments.logId, logId));
}

/** The revision in force; null for a log as read. The caller has seen to it that the log may be seen. */
export async function findNewestAdjustments(
  tx: Transaction,
  scope: InOrganisation,
  logId: string,
): Promise<AdjustmentRow | null> {
  const [row] = await tx
    .select()
    .from(logAdjustments)
    .where(isOfLog(scope, logId))
    .orderBy(desc(logAdjustments.revision))
    .limit(1);
  return row ?? null;
}

export async function findAdjustments(
  tx: Transaction,
  scope: InOrganisation,
  { logId, revision }: { logId: string; revision: number },
): Promise<AdjustmentRow | null> {
  const [row] = await tx
    .select()
    .from(logAdjustments)
    .where(and(isOfLog(scope, logId), eq(logAdjustments.revision, revision)));
  return row ?? null;
}

/** Every revision of a log with the name of who made it, the newest first. */
export async function listAdjustments(tx: Transaction, scope: InOrganisation, logId: string) {
  return tx
    .select({
      revision: logAdjustments.revision,
      at: logAdjustments.createdAt,
      by: users.name,
      note: logAdjustments.note,
      revertedTo: logAdjustments.revertedTo,
    })
    .from(logAdjustments)
    .leftJoin(users, eq(users.id, logAdjustments.createdBy))
    .where(isOfLog(scope, logId))
    .orderBy(desc(logAdjustments.revision));
}

/** Adds a revision; the caller holds the log's row, so that no two take the same number. */
export async function insertAdjustments(
  tx: Transaction,
  scope: Scope,
  input: Pick<AdjustmentRow, "logId" | "revision" | "delaysS" | "cleaning" | "isAsRead" | "note" | "revertedTo">,
): Promise<void> {
  const { organisationId, userId } = scope;
  // Our clock has milliseconds, as the API's times have.
  await tx.insert(logAdjustments).values({ ...input, organisationId, createdBy: userId, createdAt: new Date() });
}
