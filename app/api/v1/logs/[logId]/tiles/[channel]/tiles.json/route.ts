import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CleanedQuery } from "@/lib/schemas/cleaning";
import { TileJson } from "@/lib/schemas/logs";
import { describeTiles } from "@/lib/server/tiles/describe-tiles";

export const GET = withScope<"logId" | "channel">("logs.read", async ({ container, scope, params, request, url }) => {
  // Tiles are asked for under the name by which the caller reached this server.
  const host = request.headers.get("host");
  const origin = host ? `${new URL(container.env.baseUrl).protocol}//${host}` : undefined;
  return reply(
    TileJson,
    await describeTiles(container, scope, { ...params, origin, ...parseQuery(CleanedQuery, url) }),
  );
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
