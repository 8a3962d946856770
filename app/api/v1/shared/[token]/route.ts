import { reply } from "@/app/_server/reply";
import { openSharedRequest } from "@/app/_server/share-pass";
import { withPublic } from "@/app/_server/with-scope";
import { SharedView } from "@/lib/schemas/shared";
import { countOpening } from "@/lib/server/shares/open-share";
import { readSharedView } from "@/lib/server/shares/read-shared-view";

export const GET = withPublic<"token">(async ({ container, params, request }) => {
  const opened = await openSharedRequest(request, params.token);
  await countOpening(container, opened.share);
  return reply(SharedView, await readSharedView(container, opened));
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
