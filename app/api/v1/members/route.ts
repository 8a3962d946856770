import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { Member, MemberInput, MemberList } from "@/lib/schemas/people";
import { addMember } from "@/lib/server/members/add-member";
import { listMembers } from "@/lib/server/members/read-members";

export const GET = withScope("members.read", async ({ container, scope, url }) =>
  reply(MemberList, await listMembers(container, scope, parseQuery(ListQuery, url))),
);

export const POST = withScope("members.write", async ({ container, scope, request }) => {
  const member = await addMember(container, scope, await parseBody(MemberInput, request));
  return reply(Member, member, { status: 201, headers: { location: `/api/v1/members/${member.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
