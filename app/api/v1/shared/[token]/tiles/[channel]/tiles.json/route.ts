import { reply } from "@/app/_server/reply";
import { openSharedRequest } from "@/app/_server/share-pass";
import { withPublic } from "@/app/_server/with-scope";
import { TileJson } from "@/lib/schemas/logs";
import { sharedLogOfChannel } from "@/lib/server/shares/shared-log-of-channel";
import { describeTiles } from "@/lib/server/tiles/describe-tiles";

export const GET = withPublic<"token" | "channel">(async ({ container, params, request }) => {
  const { token, channel } = params;
  const opened = await openSharedRequest(request, token);
  const logId = sharedLogOfChannel(opened, channel);
  const own = `/api/v1/logs/${logId}/`;
  const tiles = await describeTiles(container, opened.scope, { logId, channel });
  const shared = tiles.tiles.map((url) => url.replace(own, `/api/v1/shared/${encodeURIComponent(token)}/`));
  return reply(TileJson, { ...tiles, name: channel, tiles: shared });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
