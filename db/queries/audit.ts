import { and, desc, eq, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { auditEntries, users } from "@/db/schema";
import { newId } from "@/lib/ids";
import { cursorInstant, decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

/** What happened to what: `field.create` of `fld_…`. Never a secret in `detail`. */
export interface AuditInput {
  /** `<noun>.<verb>`, e.g. `share.revoke`. */
  action: string;
  /** The id of the thing. */
  subject: string;
  detail?: Record<string, unknown>;
}

/** Writes one entry in the transaction of the change itself, so that neither exists without the other. */
export async function recordAudit(tx: Transaction, scope: Scope, input: AuditInput): Promise<void> {
  const { organisationId, userId } = scope;
  // Our clock has milliseconds, as cursors have; the database's own has microseconds.
  const at = new Date();
  await tx.insert(auditEntries).values({ detail: {}, ...input, id: newId("audit"), organisationId, userId, at });
}

/** Newest first. Names of people who left are gone with their membership: null. */
export async function listAudit(tx: Transaction, scope: Scope, query: ListQuery) {
  const after = decodeCursor(query.cursor);
  const earlier = after
    ? sql`(${auditEntries.at}, ${auditEntries.id}) < (${cursorInstant(after).toISOString()}::timestamptz, ${after[1]})`
    : undefined;
  const rows = await tx
    .select({
      id: auditEntries.id,
      at: auditEntries.at,
      userId: auditEntries.userId,
      userName: users.name,
      action: auditEntries.action,
      subject: auditEntries.subject,
      detail: auditEntries.detail,
    })
    .from(auditEntries)
    .leftJoin(users, eq(users.id, auditEntries.userId))
    .where(and(eq(auditEntries.organisationId, scope.organisationId), earlier))
    .orderBy(desc(auditEntries.at), desc(auditEntries.id))
    .limit(query.limit + 1);
  return pageOf(rows, query.limit, (row) => [row.at.toISOString(), row.id]);
}

/** Whether the organisation has an entry of this action. */
export async function hasAuditAction(tx: Transaction, scope: Scope, action: string): Promise<boolean> {
  const [row] = await tx
    .select({ id: auditEntries.id })
    .from(auditEntries)
    .where(and(eq(auditEntries.organisationId, scope.organisationId), eq(auditEntries.action, action)))
    .limit(1);
  return row !== undefined;
}
