import { withScope } from "@/app/_server/with-scope";
import { readTile } from "@/lib/server/tiles/read-tile";
import { parseTileInput, tileResponse } from "@/lib/server/tiles/tile-address-text";

export const GET = withScope<"logId" | "channel" | "z" | "x" | "y">(
  "logs.read",
  async ({ container, scope, params, request, url }) => {
    const input = parseTileInput(params, url);
    return tileResponse(await readTile(container, scope, input), { input, request, url });
  },
  { recallsAccess: true },
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
