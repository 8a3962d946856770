import { replyNothing } from "@/app/_server/reply";
import { newSessionCookie } from "@/app/_server/session-cookie";
import { withScope } from "@/app/_server/with-scope";
import { endAllSessions } from "@/lib/server/access/end-session";

export const DELETE = withScope("me.own", async ({ container, scope, identity }) => {
  const { stamp } = await endAllSessions(container, scope);
  const response = replyNothing();
  if (!identity.token) {
    const { AUTH_SECRET: secret, baseUrl } = container.env;
    response.headers.append("set-cookie", await newSessionCookie({ userId: scope.userId, stamp }, { secret, baseUrl }));
  }
  return response;
});

export {
  refuseMethod as GET,
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
} from "@/app/_server/refuse-method";
