import "server-only";
import type { z } from "zod";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { countFields } from "@/db/queries/fields";
import { deleteMembership, lockOwners, replaceGrants, updateRole } from "@/db/queries/members";
import type { Role } from "@/lib/access/permissions";
import { describeChanges } from "@/lib/audit/describe-changes";
import { AppError } from "@/lib/errors";
import type { Member, MemberPatch } from "@/lib/schemas/people";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { describeMember, getMemberOrThrow } from "@/lib/server/members/read-members";

async function refuseLastOwner(tx: Transaction, scope: Scope, membershipId: string): Promise<void> {
  const owners = await lockOwners(tx, scope);
  if (owners.length > 1 || !owners.includes(membershipId)) return;
  throw new AppError("conflict", "An organisation needs an owner. Make someone else owner first.", {
    detailCode: "last_owner",
  });
}

async function changeRole(tx: Transaction, scope: Scope, input: { membershipId: string; role: Role }): Promise<void> {
  if (input.role !== "owner") await refuseLastOwner(tx, scope, input.membershipId);
  await updateRole(tx, scope, input);
}

async function giveFields(tx: Transaction, scope: Scope, input: { userId: string; fieldIds: string[] }): Promise<void> {
  const wanted = new Set(input.fieldIds);
  if ((await countFields(tx, scope, [...wanted])) < wanted.size) {
    throw new AppError("unprocessable", "One of these fields does not exist.", {
      places: [{ path: "fieldIds", message: "names a field that does not exist" }],
    });
  }
  await replaceGrants(tx, scope, input);
}

/** Changes the role, the fields given, or both; takes effect at the person's next request. */
export async function updateMember(
  _container: Container,
  scope: Scope,
  input: { membershipId: string; patch: z.output<typeof MemberPatch> },
): Promise<Member> {
  const { membershipId, patch } = input;
  return withOrganisation(scope, async (tx) => {
    const known = await getMemberOrThrow(tx, scope, membershipId);
    const { userId, name } = known;
    if (patch.role) await changeRole(tx, scope, { membershipId, role: patch.role });
    if (patch.fieldIds) await giveFields(tx, scope, { userId, fieldIds: patch.fieldIds });
    await recordAudit(tx, scope, {
      action: "member.update",
      subject: membershipId,
      detail: { name, ...describeChanges(known, patch) },
    });
    return describeMember(await getMemberOrThrow(tx, scope, membershipId));
  });
}

/** Ends a membership and withdraws the person's tokens here. The last owner stays. */
export async function removeMember(_container: Container, scope: Scope, membershipId: string): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const { userId, role, name } = await getMemberOrThrow(tx, scope, membershipId);
    if (role === "owner") await refuseLastOwner(tx, scope, membershipId);
    await deleteMembership(tx, scope, { membershipId, userId });
    await recordAudit(tx, scope, { action: "member.remove", subject: membershipId, detail: { name, userId, role } });
  });
}
