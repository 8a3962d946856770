import "server-only";
import type { AuthOptions, CookieOption } from "next-auth";
import type { JWT } from "next-auth/jwt";
import CredentialsProvider from "next-auth/providers/credentials";
import { container } from "@/app/_server/container";
import { returnCookieName } from "@/app/_server/mend-sign-in";
import { isSecure, readClaims, SESSION_SECONDS } from "@/app/_server/session-cookie";
import { returnAddress } from "@/lib/access/return-address";
import { authenticateSession } from "@/lib/server/access/authenticate";
import { checkSignIn } from "@/lib/server/access/check-sign-in";
import { endSession } from "@/lib/server/access/end-session";
import { newSessionId } from "@/lib/server/access/secrets";

/** A cookie that was copied before its session ended must not be renewed. next-auth clears it when this throws. */
async function refuseEndedSession(token: JWT): Promise<JWT> {
  const claims = readClaims(token);
  if (!claims || !(await authenticateSession(claims))) throw new Error("the session has ended");
  return token;
}

/** next-auth cannot be told to overlook a cookie, only to use another: this one, until the unreadable one has gone. */
function spareReturnCookie(baseUrl: string): CookieOption {
  const secure = isSecure(baseUrl);
  return {
    name: `${returnCookieName(baseUrl)}-spare`,
    options: { httpOnly: true, sameSite: "lax", path: "/", secure },
  };
}

/** next-auth for credentials. The session carries only who it is; membership and role are looked up at every request. */
export function authOptions({ ignoresReturnCookie = false } = {}): AuthOptions {
  const { env } = container();
  // next-auth reads its own address from here and nowhere else.
  process.env.NEXTAUTH_URL ??= env.baseUrl;
  return {
    secret: env.AUTH_SECRET,
    session: { strategy: "jwt", maxAge: SESSION_SECONDS },
    useSecureCookies: isSecure(env.baseUrl),
    ...(ignoresReturnCookie ? { cookies: { callbackUrl: spareReturnCookie(env.baseUrl) } } : {}),
    pages: { signIn: "/sign-in", signOut: "/", error: "/sign-in" },
    providers: [
      CredentialsProvider({
        name: "email and password",
        credentials: { email: { type: "email" }, password: { type: "password" } },
        authorize: (credentials) => checkSignIn(credentials?.email ?? "", credentials?.password ?? ""),
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) =>
        user ? { sub: user.id, stamp: user.stamp, sid: newSessionId() } : refuseEndedSession(token),
      redirect: ({ url, baseUrl }) => returnAddress(url, baseUrl),
      session: ({ session, token }) => ({ expires: session.expires, userId: token.sub ?? "" }),
    },
    events: {
      signOut: async ({ token }) => {
        const claims = readClaims(token);
        if (claims) await endSession(container(), { ...claims, livesS: SESSION_SECONDS });
      },
    },
    logger: {
      error: (code, detail) => {
        if (code !== "JWT_SESSION_ERROR") console.error(`next-auth ${code}:`, detail);
      },
      warn: () => undefined,
      debug: () => undefined,
    },
  };
}

declare module "next-auth" {
  interface User {
    stamp: string;
  }
  interface Session {
    userId: string;
  }
}

declare module "next-auth/jwt" {
  interface JWT {
    stamp?: string;
    sid?: string;
  }
}
