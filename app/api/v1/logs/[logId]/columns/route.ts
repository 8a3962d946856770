import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { LogColumns } from "@/lib/schemas/logs";
import { getColumns } from "@/lib/server/logs/map-columns";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params }) =>
  reply(LogColumns, await getColumns(container, scope, params.logId)),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
