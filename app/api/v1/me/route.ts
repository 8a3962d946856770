import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { newSessionCookie } from "@/app/_server/session-cookie";
import { withScope } from "@/app/_server/with-scope";
import { Me, MePatch } from "@/lib/schemas/me";
import { readMe } from "@/lib/server/me/read-me";
import { updateMe } from "@/lib/server/me/update-me";

export const GET = withScope("me.own", async ({ container, scope, identity }) =>
  reply(Me, await readMe(container, scope, { isToken: identity.token !== null })),
);

export const PATCH = withScope("me.own", async ({ container, scope, identity, request }) => {
  const { stamp } = await updateMe(container, scope, await parseBody(MePatch, request));
  const response = reply(Me, await readMe(container, scope, { isToken: identity.token !== null }));
  if (stamp && !identity.token) {
    const { AUTH_SECRET: secret, baseUrl } = container.env;
    response.headers.append("set-cookie", await newSessionCookie({ userId: scope.userId, stamp }, { secret, baseUrl }));
  }
  return response;
});

export { refuseMethod as POST, refuseMethod as PUT, refuseMethod as DELETE } from "@/app/_server/refuse-method";
