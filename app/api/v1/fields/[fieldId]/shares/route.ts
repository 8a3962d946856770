import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { ShareCreated, ShareInput, ShareList } from "@/lib/schemas/shares";
import { createShare } from "@/lib/server/shares/create-share";
import { listShares } from "@/lib/server/shares/manage-shares";

export const GET = withScope<"fieldId">("shares.read", async ({ container, scope, params, url }) =>
  reply(ShareList, await listShares(container, scope, { ...parseQuery(ListQuery, url), fieldId: params.fieldId })),
);

export const POST = withScope<"fieldId">("shares.write", async ({ container, scope, params, request }) => {
  const input = await parseBody(ShareInput, request);
  const share = await createShare(container, scope, { fieldId: params.fieldId, input });
  return reply(ShareCreated, share, { status: 201, headers: { location: `/api/v1/shares/${share.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
