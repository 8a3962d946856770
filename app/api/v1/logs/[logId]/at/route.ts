import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { PlaceQuery } from "@/lib/schemas/log-queries";
import { ReadingAt } from "@/lib/schemas/logs";
import { readAt } from "@/lib/server/logs/read-places";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) =>
  reply(ReadingAt, await readAt(container, scope, { logId: params.logId, ...parseQuery(PlaceQuery, url) })),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
