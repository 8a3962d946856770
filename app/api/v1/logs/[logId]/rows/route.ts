import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ChannelQuery } from "@/lib/schemas/log-queries";
import { RowStatisticsBody } from "@/lib/schemas/logs";
import { getRowStatistics } from "@/lib/server/logs/read-answers";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const { channel } = parseQuery(ChannelQuery, url);
  return reply(RowStatisticsBody, await getRowStatistics(container, scope, { logId: params.logId, channel }));
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
