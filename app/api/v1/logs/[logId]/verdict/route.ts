import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CleanedQuery } from "@/lib/schemas/cleaning";
import { VerdictBody } from "@/lib/schemas/logs";
import { getVerdict } from "@/lib/server/logs/read-answers";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) =>
  reply(VerdictBody, await getVerdict(container, scope, { logId: params.logId, ...parseQuery(CleanedQuery, url) })),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
