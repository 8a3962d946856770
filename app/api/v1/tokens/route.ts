import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { TokenCreated, TokenInput, TokenList } from "@/lib/schemas/people";
import { createToken, listTokens } from "@/lib/server/tokens/manage-tokens";

export const GET = withScope("tokens.own", async ({ container, scope, url }) =>
  reply(TokenList, await listTokens(container, scope, parseQuery(ListQuery, url))),
);

export const POST = withScope("tokens.own", async ({ container, scope, identity, request }) => {
  const input = await parseBody(TokenInput, request);
  const token = await createToken(container, scope, { ...input, madeWith: identity.token });
  return reply(TokenCreated, token, { status: 201, headers: { location: `/api/v1/tokens/${token.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
