import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CleanedChannelQuery } from "@/lib/schemas/log-queries";
import { PassStatisticsBody } from "@/lib/schemas/pass-figures";
import { readPassStatistics } from "@/lib/server/pass-figures/read-pass-figures";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const query = parseQuery(CleanedChannelQuery, url);
  return reply(PassStatisticsBody, await readPassStatistics(container, scope, { logId: params.logId, ...query }));
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
