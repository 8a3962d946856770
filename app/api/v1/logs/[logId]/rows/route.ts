import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CleanedChannelQuery } from "@/lib/schemas/log-queries";
import { RowStatisticsBody } from "@/lib/schemas/logs";
import { getRowStatistics } from "@/lib/server/logs/read-answers";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const query = parseQuery(CleanedChannelQuery, url);
  return reply(RowStatisticsBody, await getRowStatistics(container, scope, { logId: params.logId, ...query }));
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
