import { and, desc, eq, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { tokens } from "@/db/schema";
import type { Role } from "@/lib/access/permissions";
import { cursorInstant, decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

/** A person's own tokens in this organisation; nobody sees another's. */
function isOwn(scope: Scope) {
  return and(eq(tokens.organisationId, scope.organisationId), eq(tokens.userId, scope.userId));
}

/** Newest first. */
export async function listTokens(tx: Transaction, scope: Scope, query: ListQuery) {
  const after = decodeCursor(query.cursor);
  const earlier = after
    ? sql`(${tokens.createdAt}, ${tokens.id}) < (${cursorInstant(after).toISOString()}::timestamptz, ${after[1]})`
    : undefined;
  const rows = await tx
    .select()
    .from(tokens)
    .where(and(isOwn(scope), earlier))
    .orderBy(desc(tokens.createdAt), desc(tokens.id))
    .limit(query.limit + 1);
  return pageOf(rows, query.limit, (row) => [row.createdAt.toISOString(), row.id]);
}

export async function insertToken(
  tx: Transaction,
  scope: Scope,
  input: { id: string; name: string; role: Role; tokenHash: string; expiresAt: Date | null; createdAt: Date },
) {
  const { organisationId, userId } = scope;
  const [row] = await tx
    .insert(tokens)
    .values({ ...input, organisationId, userId })
    .returning();
  if (!row) throw new Error("insertToken returned no row");
  return row;
}

/** The token's name; null when there is no such token of this person. */
export async function deleteToken(tx: Transaction, scope: Scope, tokenId: string): Promise<string | null> {
  const gone = await tx
    .delete(tokens)
    .where(and(isOwn(scope), eq(tokens.id, tokenId)))
    .returning({ name: tokens.name });
  return gone[0]?.name ?? null;
}
