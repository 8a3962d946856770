import "server-only";
import { decode, encode, type JWT } from "next-auth/jwt";
import type { SessionClaims } from "@/lib/server/access/authenticate";
import { newSessionId } from "@/lib/server/access/secrets";

/** How long a sign-in lasts. */
export const SESSION_SECONDS = 14 * 24 * 60 * 60;

export function isSecure(baseUrl: string): boolean {
  return baseUrl.startsWith("https:");
}

export function sessionCookieName(baseUrl: string): string {
  return `${isSecure(baseUrl) ? "__Secure-" : ""}next-auth.session-token`;
}

/** Who a decoded token speaks for; null where it is none of ours. */
export function readClaims(token: JWT): SessionClaims | null {
  const { sub, stamp, sid } = token;
  if (typeof sub !== "string" || typeof stamp !== "string" || typeof sid !== "string") return null;
  return { userId: sub, stamp, sessionId: sid };
}

/** The claims in a session cookie's value; null for anything forged, expired or malformed. */
export async function readSessionClaims(value: string | undefined, secret: string): Promise<SessionClaims | null> {
  if (!value) return null;
  try {
    const claims = await decode({ token: value, secret });
    return claims ? readClaims(claims) : null;
  } catch {
    return null;
  }
}

/** A Set-Cookie line that opens a new session, for after a change that ended the one before. */
export async function newSessionCookie(
  claims: Pick<SessionClaims, "userId" | "stamp">,
  settings: { secret: string; baseUrl: string },
) {
  const value = await encode({
    token: { sub: claims.userId, stamp: claims.stamp, sid: newSessionId() },
    secret: settings.secret,
    maxAge: SESSION_SECONDS,
  });
  const secure = isSecure(settings.baseUrl) ? "; Secure" : "";
  return `${sessionCookieName(settings.baseUrl)}=${value}; Path=/; HttpOnly; SameSite=Lax; Max-Age=${SESSION_SECONDS}${secure}`;
}

function decodeValue(value: string): string {
  try {
    return decodeURIComponent(value);
  } catch {
    return value;
  }
}

/** One cookie of a request. */
export function readCookie(header: string | null, name: string): string | undefined {
  for (const part of (header ?? "").split(";")) {
    const separator = part.indexOf("=");
    if (separator > 0 && part.slice(0, separator).trim() === name) return decodeValue(part.slice(separator + 1).trim());
  }
  return undefined;
}
