import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { DelaysAsked, DelaysBody, DelaysChange } from "@/lib/schemas/alignment";
import { askDelays, changeDelays, readDelays } from "@/lib/server/alignment/read-delays";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params }) =>
  reply(DelaysBody, await readDelays(container, scope, params.logId)),
);

export const POST = withScope<"logId">("logs.clean", async ({ container, scope, params, request }) => {
  const body = await parseBody(DelaysAsked, request);
  const location = `/api/v1/logs/${params.logId}/delays`;
  const known = await askDelays(container, scope, { logId: params.logId, ...body });
  return reply(DelaysBody, known, { status: 202, headers: { Location: location } });
});

export const PUT = withScope<"logId">("logs.clean", async ({ container, scope, params, request }) => {
  const body = await parseBody(DelaysChange, request);
  return reply(DelaysBody, await changeDelays(container, scope, { logId: params.logId, ...body }));
});

export { refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
