import { openSharedRequest } from "@/app/_server/share-pass";
import { withPublic } from "@/app/_server/with-scope";
import { sharedLogOfChannel } from "@/lib/server/shares/shared-log-of-channel";
import { readTile } from "@/lib/server/tiles/read-tile";
import { parseTileInput, tileResponse } from "@/lib/server/tiles/tile-address-text";

export const GET = withPublic<"token" | "channel" | "z" | "x" | "y">(async ({ container, params, request, url }) => {
  const opened = await openSharedRequest(request, params.token);
  const logId = sharedLogOfChannel(opened, params.channel);
  const input = parseTileInput({ ...params, logId }, url);
  const response = tileResponse(await readTile(container, opened.scope, input), { input, request, url });
  // Asked for again each time: a link that was withdrawn must not go on drawing from the visitor's cache.
  response.headers.set("cache-control", "private, no-cache");
  return response;
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
