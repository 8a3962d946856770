import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Cleaning, CleaningChange } from "@/lib/schemas/cleaning";
import { changeCleaning, readCleaning } from "@/lib/server/adjustments/read-cleaning";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params }) =>
  reply(Cleaning, await readCleaning(container, scope, params.logId)),
);

export const POST = withScope<"logId">("logs.clean", async ({ container, scope, params, request }) => {
  const body = await parseBody(CleaningChange, request);
  return reply(Cleaning, await changeCleaning(container, scope, { logId: params.logId, ...body }));
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
