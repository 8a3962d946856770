import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { PassList } from "@/lib/schemas/logs";
import { listPasses } from "@/lib/server/logs/read-answers";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) =>
  reply(PassList, await listPasses(container, scope, { logId: params.logId, query: parseQuery(ListQuery, url) })),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
