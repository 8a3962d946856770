import "server-only";
import type { z } from "zod";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { insertMembership } from "@/db/queries/members";
import { findOrCreatePerson } from "@/db/queries/system/people";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import type { Member, MemberInput } from "@/lib/schemas/people";
import type { Scope } from "@/lib/scope";
import { hashPassword } from "@/lib/server/access/passwords";
import type { Container } from "@/lib/server/container";
import { describeMember, getMemberOrThrow } from "@/lib/server/members/read-members";

/**
 * Adds a person. One who has an account already (in any organisation) joins with it: the name and password given here
 * are not used then, since an owner must not set the password of a person known elsewhere.
 */
export async function addMember(
  _container: Container,
  scope: Scope,
  input: z.output<typeof MemberInput>,
): Promise<Member> {
  const passwordHash = await hashPassword(input.password);
  const { email, name, role } = input;
  const { person } = await findOrCreatePerson({ id: newId("user"), email, name, passwordHash });
  const id = newId("membership");
  return withOrganisation(scope, async (tx) => {
    if (!(await insertMembership(tx, scope, { id, userId: person.id, role }))) {
      throw new AppError("conflict", `${person.email} is a member already.`, { detailCode: "already_member" });
    }
    await recordAudit(tx, scope, {
      action: "member.add",
      subject: id,
      detail: { name: person.name, userId: person.id, role },
    });
    return describeMember(await getMemberOrThrow(tx, scope, id));
  });
}
