import "server-only";
import { findPersonById, listMembershipsOfPerson, type MembershipRow } from "@/db/queries/system/people";
import type { Role } from "@/lib/access/permissions";
import { AppError } from "@/lib/errors";
import type { Me } from "@/lib/schemas/me";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";

function describeOrganisation(membership: MembershipRow, role: Role): Me["organisation"] {
  return { id: membership.organisationId, slug: membership.slug, name: membership.organisationName, role };
}

const NO_OWN_UNITS = { force: null, depth: null, area: null, speed: null };

/** The person and the organisations; a token sees only its own organisation, with its own role. */
export async function readMe(_container: Container, scope: Scope, input: { isToken: boolean }): Promise<Me> {
  const person = await findPersonById(scope.userId);
  const all = await listMembershipsOfPerson(scope.userId);
  const current = all.find((membership) => membership.organisationId === scope.organisationId);
  if (!person || !current) throw new AppError("unauthorized", "This account is gone.");
  const organisation = describeOrganisation(current, scope.role);
  const organisations = input.isToken ? [organisation] : all.map((row) => describeOrganisation(row, row.role));
  const { id, email, name, unitSystem, contrast } = person;
  const unitPreferences = { ...NO_OWN_UNITS, ...person.unitPreferences };
  return { id, email, name, unitSystem, unitPreferences, contrast, organisation, organisations };
}
