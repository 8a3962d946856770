import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { LogAccepted, LogList } from "@/lib/schemas/logs";
import { listLogs } from "@/lib/server/logs/read-logs";
import { uploadLog } from "@/lib/server/logs/upload-log";

export const GET = withScope<"fieldId">("logs.read", async ({ container, scope, params, url }) =>
  reply(LogList, await listLogs(container, scope, { fieldId: params.fieldId, query: parseQuery(ListQuery, url) })),
);

export const POST = withScope<"fieldId">("logs.upload", async ({ container, scope, params, request, url }) => {
  const again = url.searchParams.get("again") === "1";
  const together = url.searchParams.get("together") === "1";
  const { id } = await uploadLog(container, scope, { fieldId: params.fieldId, again, together, request });
  return reply(LogAccepted, { id, status: "queued" }, { status: 202, headers: { location: `/api/v1/logs/${id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
