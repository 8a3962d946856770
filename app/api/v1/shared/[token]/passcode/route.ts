import { addressOf } from "@/app/_server/identify-request";
import { parseBody } from "@/app/_server/parse-body";
import { refuseForeignOrigin } from "@/app/_server/refuse-foreign-origin";
import { replyNothing } from "@/app/_server/reply";
import { isSecure } from "@/app/_server/session-cookie";
import { PASS_SECONDS, passCookieName } from "@/app/_server/share-pass";
import { withPublic } from "@/app/_server/with-scope";
import { SharePasscode } from "@/lib/schemas/shared";
import { issuePass, openShare } from "@/lib/server/shares/open-share";

export const POST = withPublic<"token">(async ({ container, params, request }) => {
  const { baseUrl } = container.env;
  refuseForeignOrigin(request, baseUrl);
  const { passcode } = await parseBody(SharePasscode, request);
  const { token } = params;
  const { share } = await openShare(container, { token, passcode, from: addressOf(request) });
  const response = replyNothing();
  const pass = `${passCookieName(token)}=${encodeURIComponent(issuePass(container, share))}`;
  const secure = isSecure(baseUrl) ? "; Secure" : "";
  response.headers.append("set-cookie", `${pass}; Path=/; HttpOnly; SameSite=Lax; Max-Age=${PASS_SECONDS}${secure}`);
  return response;
});

export {
  refuseMethod as GET,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
