import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { AuditList } from "@/lib/schemas/people";
import { listAudit } from "@/lib/server/audit/list-audit";

export const GET = withScope("audit.read", async ({ container, scope, url }) =>
  reply(AuditList, await listAudit(container, scope, parseQuery(ListQuery, url))),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
