import "server-only";
import { listMembershipsOfPerson, type MembershipRow } from "@/db/queries/system/people";
import { narrowerRole } from "@/lib/access/narrower-role";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import type { Identity } from "@/lib/server/access/authenticate";

export interface ChosenScope {
  scope: Scope;
  membership: MembershipRow;
}

interface Wishes {
  /** Slug or id that must be one of the person's organisations. */
  demanded?: string | null;
  /** Slug remembered from an earlier visit; ignored when it no longer fits. */
  preferred?: string | null;
}

function names(membership: MembershipRow, wish: string): boolean {
  return membership.slug === wish || membership.organisationId === wish;
}

/** The membership that a request acts under. @throws AppError 404 not a member of the demanded one, 403 member of none */
export async function chooseOrganisation(identity: Identity, wishes: Wishes): Promise<ChosenScope> {
  const { person, token } = identity;
  const all = await listMembershipsOfPerson(person.id);
  const own = token ? all.filter((membership) => membership.organisationId === token.organisationId) : all;
  const { demanded, preferred } = wishes;
  const membership = demanded
    ? own.find((candidate) => names(candidate, demanded))
    : (own.find((candidate) => preferred && names(candidate, preferred)) ?? own[0]);
  if (!membership && demanded) throw new AppError("not_found", `There is no organisation "${demanded}".`);
  if (!membership) throw new AppError("forbidden", "You belong to no organisation.", { detailCode: "no_organisation" });
  const role = token ? narrowerRole(token.role, membership.role) : membership.role;
  return { scope: { organisationId: membership.organisationId, userId: person.id, role }, membership };
}
