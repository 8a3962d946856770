import "server-only";
import type { AuthOptions } from "next-auth";
import CredentialsProvider from "next-auth/providers/credentials";
import { container } from "@/app/_server/container";
import { isSecure, SESSION_SECONDS } from "@/app/_server/session-cookie";
import { returnAddress } from "@/lib/access/return-address";
import { checkSignIn } from "@/lib/server/access/check-sign-in";

/** next-auth for credentials. The session carries only who it is; membership and role are looked up at every request. */
export function authOptions(): AuthOptions {
  const { env } = container();
  // next-auth reads its own address from here and nowhere else.
  process.env.NEXTAUTH_URL ??= env.baseUrl;
  return {
    secret: env.AUTH_SECRET,
    session: { strategy: "jwt", maxAge: SESSION_SECONDS },
    useSecureCookies: isSecure(env.baseUrl),
    pages: { signIn: "/sign-in", signOut: "/", error: "/sign-in" },
    providers: [
      CredentialsProvider({
        name: "email and password",
        credentials: { email: { type: "email" }, password: { type: "password" } },
        authorize: (credentials) => checkSignIn(credentials?.email ?? "", credentials?.password ?? ""),
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) => (user ? { sub: user.id, stamp: user.stamp } : token),
      redirect: ({ url, baseUrl }) => returnAddress(url, baseUrl),
      session: ({ session, token }) => ({ expires: session.expires, userId: token.sub ?? "" }),
    },
    logger: {
      error: (code, detail) => console.error(`next-auth ${code}:`, detail),
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
  }
}
