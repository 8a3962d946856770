import { withScope } from "@/app/_server/with-scope";
import { AppError } from "@/lib/errors";
import { getLog } from "@/lib/server/logs/read-logs";

const refuse = withScope<"logId">("logs.read", async ({ container, scope, params }) => {
  await getLog(container, scope, params.logId);
  throw new AppError("not_implemented", "Cleaning rules of a log are not built yet.");
});

export { refuse as GET, refuse as POST };

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
