import { withScope } from "@/app/_server/with-scope";
import { eventBody, watchLog } from "@/lib/server/logs/log-events";
import { getLog } from "@/lib/server/logs/read-logs";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, request }) => {
  const first = await getLog(container, scope, params.logId);
  const events = watchLog(container, scope, { logId: params.logId, first, signal: request.signal });
  return new Response(eventBody(events), {
    headers: {
      "content-type": "text/event-stream; charset=utf-8",
      "cache-control": "private, no-cache, no-transform",
      "x-accel-buffering": "no",
    },
  });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
