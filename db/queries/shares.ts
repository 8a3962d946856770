import { and, desc, eq, isNull, ne, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { logs, shares } from "@/db/schema";
import { cursorInstant, decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

export type ShareRow = typeof shares.$inferSelect;

/** Shares of one field, newest first. */
export async function listShares(tx: Transaction, scope: Scope, query: ListQuery & { fieldId: string }) {
  const after = decodeCursor(query.cursor);
  const earlier = after
    ? sql`(${shares.createdAt}, ${shares.id}) < (${cursorInstant(after).toISOString()}::timestamptz, ${after[1]})`
    : undefined;
  const rows = await tx
    .select()
    .from(shares)
    .where(and(eq(shares.organisationId, scope.organisationId), eq(shares.fieldId, query.fieldId), earlier))
    .orderBy(desc(shares.createdAt), desc(shares.id))
    .limit(query.limit + 1);
  return pageOf(rows, query.limit, (row) => [row.createdAt.toISOString(), row.id]);
}

export async function insertShare(
  tx: Transaction,
  scope: Scope,
  input: Omit<typeof shares.$inferInsert, "organisationId" | "createdBy">,
): Promise<ShareRow> {
  const [row] = await tx
    .insert(shares)
    .values({ ...input, organisationId: scope.organisationId, createdBy: scope.userId })
    .returning();
  if (!row) throw new Error("insertShare returned no row");
  return row;
}

export async function getShare(tx: Transaction, scope: Scope, shareId: string): Promise<ShareRow | null> {
  const [row] = await tx
    .select()
    .from(shares)
    .where(and(eq(shares.organisationId, scope.organisationId), eq(shares.id, shareId)));
  return row ?? null;
}

/** Ends a share; the row stays, so that its link says "no longer available" and the audit can name it. */
export async function revokeShareRow(tx: Transaction, scope: Scope, input: { shareId: string; at: Date }) {
  await tx
    .update(shares)
    .set({ revokedAt: input.at })
    .where(
      and(eq(shares.organisationId, scope.organisationId), eq(shares.id, input.shareId), isNull(shares.revokedAt)),
    );
}

/** Whether this log belongs to this field. */
export async function isLogOfField(
  tx: Transaction,
  scope: Scope,
  input: { logId: string; fieldId: string },
): Promise<boolean> {
  const rows = await tx
    .select({ id: logs.id })
    .from(logs)
    .where(
      and(eq(logs.organisationId, scope.organisationId), eq(logs.id, input.logId), eq(logs.fieldId, input.fieldId)),
    );
  return rows.length > 0;
}

/** The field's newest seeding log that did not fail: what a share shows when no log was chosen. */
export async function findNewestLogOfField(tx: Transaction, scope: Scope, fieldId: string): Promise<string | null> {
  const [row] = await tx
    .select({ id: logs.id })
    .from(logs)
    .where(
      and(
        eq(logs.organisationId, scope.organisationId),
        eq(logs.fieldId, fieldId),
        eq(logs.kind, "seeding"),
        ne(logs.status, "failed"),
      ),
    )
    .orderBy(sql`${logs.status} = 'ready' desc`, desc(logs.createdAt), desc(logs.id))
    .limit(1);
  return row?.id ?? null;
}
