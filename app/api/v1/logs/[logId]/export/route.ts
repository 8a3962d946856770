import { parseQuery } from "@/app/_server/parse-body";
import { withScope } from "@/app/_server/with-scope";
import { ExportQuery } from "@/lib/schemas/export";
import { exportHeaders } from "@/lib/server/export/export-headers";
import { exportLog } from "@/lib/server/export/export-log";

export const GET = withScope<"logId">("logs.export", async ({ container, scope, params, url }) => {
  const query = parseQuery(ExportQuery, url);
  const file = await exportLog(container, scope, { logId: params.logId, query });
  return new Response(file.body, { headers: exportHeaders(file, query, url) });
});

export {
  // Without this, Next would answer HEAD by making the whole file for nobody.
  refuseMethod as HEAD,
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
