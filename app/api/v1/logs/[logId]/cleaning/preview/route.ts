import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CleaningPreview, CleaningPreviewBody } from "@/lib/schemas/cleaning";
import { previewCleaning } from "@/lib/server/adjustments/read-cleaning";

export const POST = withScope<"logId">("logs.read", async ({ container, scope, params, request }) => {
  const body = await parseBody(CleaningPreviewBody, request);
  return reply(CleaningPreview, await previewCleaning(container, scope, { logId: params.logId, ...body }));
});

export {
  refuseMethod as GET,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
