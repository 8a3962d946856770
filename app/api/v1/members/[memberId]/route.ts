import { parseBody } from "@/app/_server/parse-body";
import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Member, MemberPatch } from "@/lib/schemas/people";
import { removeMember, updateMember } from "@/lib/server/members/change-members";
import { readMember } from "@/lib/server/members/read-members";

export const GET = withScope<"memberId">("members.read", async ({ container, scope, params }) =>
  reply(Member, await readMember(container, scope, params.memberId)),
);

export const PATCH = withScope<"memberId">("members.write", async ({ container, scope, params, request }) => {
  const patch = await parseBody(MemberPatch, request);
  return reply(Member, await updateMember(container, scope, { membershipId: params.memberId, patch }));
});

export const DELETE = withScope<"memberId">("members.write", async ({ container, scope, params }) => {
  await removeMember(container, scope, params.memberId);
  return replyNothing();
});

export { refuseMethod as POST, refuseMethod as PUT } from "@/app/_server/refuse-method";
