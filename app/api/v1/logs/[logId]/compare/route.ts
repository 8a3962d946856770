import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CompareQuery, ComparisonBody } from "@/lib/schemas/comparison";
import { readComparison } from "@/lib/server/comparison/read-comparison";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const query = parseQuery(CompareQuery, url);
  return reply(ComparisonBody, await readComparison(container, scope, { logId: params.logId, ...query }));
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
