import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { SwathsQuery } from "@/lib/schemas/log-queries";
import { SwathCollectionBody } from "@/lib/schemas/log-shapes";
import { readSwaths } from "@/lib/server/logs/read-places";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const swaths = await readSwaths(container, scope, { logId: params.logId, ...parseQuery(SwathsQuery, url) });
  return reply(SwathCollectionBody, swaths, { headers: { "content-type": "application/geo+json" } });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
