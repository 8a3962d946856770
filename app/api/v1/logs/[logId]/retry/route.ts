import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Log } from "@/lib/schemas/logs";
import { retryLog } from "@/lib/server/logs/cancel-log";

export const POST = withScope<"logId">("logs.map", async ({ container, scope, params }) =>
  reply(Log, await retryLog(container, scope, params.logId), { status: 202 }),
);

export {
  refuseMethod as GET,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
