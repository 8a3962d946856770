import { withScope } from "@/app/_server/with-scope";
import { readOriginal } from "@/lib/server/logs/read-original";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const sha256 = url.searchParams.get("sha256");
  const { body, fileName, fileBytes } = await readOriginal(container, scope, { logId: params.logId, sha256 });
  return new Response(body, {
    headers: {
      "content-type": "application/octet-stream",
      ...(fileBytes === null ? {} : { "content-length": String(fileBytes) }),
      "content-disposition": `attachment; filename*=UTF-8''${encodeURIComponent(fileName)}`,
      "cache-control": "private, no-store",
    },
  });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
