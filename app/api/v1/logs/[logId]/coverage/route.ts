import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CoverageBody } from "@/lib/schemas/logs";
import { getCoverage } from "@/lib/server/logs/read-answers";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params }) =>
  reply(CoverageBody, await getCoverage(container, scope, params.logId)),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
