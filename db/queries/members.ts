import { and, asc, eq, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { fieldGrants, memberships, tokens, users } from "@/db/schema";
import type { Role } from "@/lib/access/permissions";
import { cursorInstant, decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

function selectMembers(tx: Transaction, scope: Scope) {
  const grants = tx
    .select({
      userId: fieldGrants.userId,
      fieldIds: sql<string[]>`array_agg(${fieldGrants.fieldId} order by ${fieldGrants.fieldId})`.as("field_ids"),
    })
    .from(fieldGrants)
    .where(eq(fieldGrants.organisationId, scope.organisationId))
    .groupBy(fieldGrants.userId)
    .as("grants");
  return tx
    .select({
      id: memberships.id,
      userId: memberships.userId,
      name: users.name,
      email: users.email,
      role: memberships.role,
      fieldIds: sql<string[]>`coalesce(${grants.fieldIds}, '{}')`,
      createdAt: memberships.createdAt,
    })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .leftJoin(grants, eq(grants.userId, memberships.userId));
}

export type MemberRow = Awaited<ReturnType<typeof selectMembers>>[number];

function isMembership(scope: Scope, membershipId: string) {
  return and(eq(memberships.organisationId, scope.organisationId), eq(memberships.id, membershipId));
}

/** Members in the order they joined. */
export async function listMembers(tx: Transaction, scope: Scope, query: ListQuery) {
  const after = decodeCursor(query.cursor);
  const later = after
    ? sql`(date_trunc('milliseconds', ${memberships.createdAt}), ${memberships.id}) > (${cursorInstant(after).toISOString()}::timestamptz, ${after[1]})`
    : undefined;
  const rows = await selectMembers(tx, scope)
    .where(and(eq(memberships.organisationId, scope.organisationId), later))
    .orderBy(asc(sql`date_trunc('milliseconds', ${memberships.createdAt})`), asc(memberships.id))
    .limit(query.limit + 1);
  return pageOf(rows, query.limit, (row) => [row.createdAt.toISOString(), row.id]);
}

export async function getMember(tx: Transaction, scope: Scope, membershipId: string): Promise<MemberRow | null> {
  const [row] = await selectMembers(tx, scope).where(isMembership(scope, membershipId));
  return row ?? null;
}

/** False when the person is a member already. */
export async function insertMembership(
  tx: Transaction,
  scope: Scope,
  input: { id: string; userId: string; role: Role },
): Promise<boolean> {
  const made = await tx
    .insert(memberships)
    .values({ ...input, organisationId: scope.organisationId })
    .onConflictDoNothing()
    .returning({ id: memberships.id });
  return made.length > 0;
}

/** The owners, locked until the transaction ends: two of them leaving at once must not leave none. */
export async function lockOwners(tx: Transaction, scope: Scope): Promise<string[]> {
  const rows = await tx
    .select({ id: memberships.id })
    .from(memberships)
    .where(and(eq(memberships.organisationId, scope.organisationId), eq(memberships.role, "owner")))
    .orderBy(asc(memberships.id))
    .for("update");
  return rows.map((row) => row.id);
}

export async function updateRole(
  tx: Transaction,
  scope: Scope,
  input: { membershipId: string; role: Role },
): Promise<void> {
  await tx.update(memberships).set({ role: input.role }).where(isMembership(scope, input.membershipId));
}

/** Gives exactly these fields to the person. */
export async function replaceGrants(
  tx: Transaction,
  scope: Scope,
  input: { userId: string; fieldIds: string[] },
): Promise<void> {
  const { organisationId } = scope;
  const own = and(eq(fieldGrants.organisationId, organisationId), eq(fieldGrants.userId, input.userId));
  await tx.delete(fieldGrants).where(own);
  const rows = [...new Set(input.fieldIds)].map((fieldId) => ({ organisationId, userId: input.userId, fieldId }));
  if (rows.length > 0) await tx.insert(fieldGrants).values(rows);
}

/** Ends a membership with everything that hung on it: fields given and personal tokens. The person remains. */
export async function deleteMembership(
  tx: Transaction,
  scope: Scope,
  input: { membershipId: string; userId: string },
): Promise<void> {
  const { organisationId } = scope;
  await tx
    .delete(fieldGrants)
    .where(and(eq(fieldGrants.organisationId, organisationId), eq(fieldGrants.userId, input.userId)));
  await tx.delete(tokens).where(and(eq(tokens.organisationId, organisationId), eq(tokens.userId, input.userId)));
  await tx.delete(memberships).where(isMembership(scope, input.membershipId));
}
