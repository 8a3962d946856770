import { z } from "zod";
import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Log } from "@/lib/schemas/logs";
import { putMapping } from "@/lib/server/logs/map-columns";

export const PUT = withScope<"logId">("logs.map", async ({ container, scope, params, request }) => {
  // The reader of mappings names the column and the rule; a bare schema could only name a path.
  const body = await parseBody(z.unknown(), request);
  return reply(Log, await putMapping(container, scope, { logId: params.logId, body }), { status: 202 });
});

export {
  refuseMethod as GET,
  refuseMethod as POST,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
