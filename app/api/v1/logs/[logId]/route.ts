import { parseBody } from "@/app/_server/parse-body";
import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Log, LogPatch } from "@/lib/schemas/logs";
import { changeLog } from "@/lib/server/logs/change-log";
import { deleteLog } from "@/lib/server/logs/delete-log";
import { getLog } from "@/lib/server/logs/read-logs";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params }) =>
  reply(Log, await getLog(container, scope, params.logId)),
);

export const PATCH = withScope<"logId">("logs.map", async ({ container, scope, params, request }) => {
  const change = await parseBody(LogPatch, request);
  return reply(Log, await changeLog(container, scope, { logId: params.logId, ...change }));
});

export const DELETE = withScope<"logId">("logs.remove", async ({ container, scope, params }) => {
  await deleteLog(container, scope, params.logId);
  return replyNothing();
});

export { refuseMethod as POST, refuseMethod as PUT } from "@/app/_server/refuse-method";
