import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Share } from "@/lib/schemas/shares";
import { readShare, revokeShare } from "@/lib/server/shares/manage-shares";

export const GET = withScope<"shareId">("shares.read", async ({ container, scope, params }) =>
  reply(Share, await readShare(container, scope, params.shareId)),
);

export const DELETE = withScope<"shareId">("shares.write", async ({ container, scope, params }) => {
  await revokeShare(container, scope, params.shareId);
  return replyNothing();
});

export { refuseMethod as POST, refuseMethod as PUT, refuseMethod as PATCH } from "@/app/_server/refuse-method";
