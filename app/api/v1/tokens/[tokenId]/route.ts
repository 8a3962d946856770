import { replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { revokeToken } from "@/lib/server/tokens/manage-tokens";

export const DELETE = withScope<"tokenId">("tokens.own", async ({ container, scope, params }) => {
  await revokeToken(container, scope, params.tokenId);
  return replyNothing();
});

export {
  refuseMethod as GET,
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
} from "@/app/_server/refuse-method";
