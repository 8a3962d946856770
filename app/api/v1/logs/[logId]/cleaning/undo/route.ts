import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Cleaning, CleaningUndo } from "@/lib/schemas/cleaning";
import { undoCleaning } from "@/lib/server/adjustments/read-cleaning";

export const POST = withScope<"logId">("logs.clean", async ({ container, scope, params, request }) => {
  const body = await parseBody(CleaningUndo, request);
  return reply(Cleaning, await undoCleaning(container, scope, { logId: params.logId, ...body }));
});

export {
  refuseMethod as GET,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
