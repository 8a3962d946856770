import type { Operation } from "@/lib/openapi/operation";
import { ListQuery } from "@/lib/schemas/listing";
import { Me, MePatch } from "@/lib/schemas/me";
import {
  AuditList,
  Member,
  MemberInput,
  MemberList,
  MemberPatch,
  TokenCreated,
  TokenInput,
  TokenList,
} from "@/lib/schemas/people";

const tag = "People";

const memberOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/members",
    tag,
    permission: "members.read",
    summary: "Members in the order they joined",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of members", schema: MemberList }],
  },
  {
    method: "POST",
    path: "/api/v1/members",
    tag,
    permission: "members.write",
    summary: "Add a person",
    description: "Somebody who has an account joins with it; the name and password given here are not used then.",
    body: MemberInput,
    replies: [{ status: 201, description: "The member", schema: Member }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/members/{memberId}",
    tag,
    permission: "members.read",
    summary: "One member",
    replies: [{ status: 200, description: "The member", schema: Member }],
  },
  {
    method: "PATCH",
    path: "/api/v1/members/{memberId}",
    tag,
    permission: "members.write",
    summary: "Change the role, or the fields given to a viewer or operator",
    description: "Takes effect at the person's next request. The last owner stays owner (409).",
    body: MemberPatch,
    replies: [{ status: 200, description: "The member as it is now", schema: Member }],
    errors: ["conflict"],
  },
  {
    method: "DELETE",
    path: "/api/v1/members/{memberId}",
    tag,
    permission: "members.write",
    summary: "End a membership",
    description: "The person's tokens here end with it. The last owner cannot leave (409).",
    replies: [{ status: 204, description: "Gone" }],
    errors: ["conflict"],
  },
];

const tokenOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/tokens",
    tag,
    permission: "tokens.own",
    summary: "Your own tokens, newest first",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of tokens, without their secrets", schema: TokenList }],
  },
  {
    method: "POST",
    path: "/api/v1/tokens",
    tag,
    permission: "tokens.own",
    summary: "Make a token for a script",
    description: "`token` is shown in this reply only. Its role may do nothing that yours may not.",
    body: TokenInput,
    replies: [{ status: 201, description: "The token with its secret", schema: TokenCreated }],
  },
  {
    method: "DELETE",
    path: "/api/v1/tokens/{tokenId}",
    tag,
    permission: "tokens.own",
    summary: "Withdraw a token",
    replies: [{ status: 204, description: "Gone" }],
  },
];

export const peopleOperations: Operation[] = [
  ...memberOperations,
  ...tokenOperations,
  {
    method: "GET",
    path: "/api/v1/me",
    tag,
    permission: "me.own",
    summary: "Who you are and which organisations you belong to",
    replies: [{ status: 200, description: "You", schema: Me }],
  },
  {
    method: "PATCH",
    path: "/api/v1/me",
    tag,
    permission: "me.own",
    summary: "Change your name, units or password",
    description: "A new password needs the current one and ends your other sessions.",
    body: MePatch,
    replies: [{ status: 200, description: "You, as you are now", schema: Me }],
    errors: ["too_many_requests"],
  },
  {
    method: "DELETE",
    path: "/api/v1/me/sessions",
    tag,
    permission: "me.own",
    summary: "Sign out everywhere",
    description: "Ends every session of yours; the one that asks goes on with the cookie of this reply. Tokens stay.",
    replies: [{ status: 204, description: "All other sessions have ended" }],
  },
  {
    method: "GET",
    path: "/api/v1/audit",
    tag,
    permission: "audit.read",
    summary: "What was changed, by whom, newest first",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of entries", schema: AuditList }],
  },
];
