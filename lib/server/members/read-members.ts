import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { getMember, listMembers as listMemberRows, type MemberRow } from "@/db/queries/members";
import { AppError } from "@/lib/errors";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Member } from "@/lib/schemas/people";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";

/** A member as the API shows it. */
export function describeMember(row: MemberRow): Member {
  return { ...row, createdAt: row.createdAt.toISOString() };
}

/** @throws AppError `not_found` */
export async function getMemberOrThrow(tx: Transaction, scope: Scope, membershipId: string): Promise<MemberRow> {
  const row = await getMember(tx, scope, membershipId);
  if (!row) throw new AppError("not_found", "There is no such member.");
  return row;
}

export async function listMembers(
  _container: Container,
  scope: Scope,
  query: ListQuery,
): Promise<{ items: Member[]; nextCursor: string | null }> {
  const { rows, nextCursor } = await withOrganisation(scope, (tx) => listMemberRows(tx, scope, query));
  return { items: rows.map(describeMember), nextCursor };
}

export async function readMember(_container: Container, scope: Scope, membershipId: string): Promise<Member> {
  return describeMember(await withOrganisation(scope, (tx) => getMemberOrThrow(tx, scope, membershipId)));
}
