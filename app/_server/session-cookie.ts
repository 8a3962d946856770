import "server-only";
import { decode, encode } from "next-auth/jwt";

/** How long a sign-in lasts. */
export const SESSION_SECONDS = 14 * 24 * 60 * 60;

export interface SessionClaims {
  userId: string;
  /** See `passwordStamp`. */
  stamp: string;
}

export function isSecure(baseUrl: string): boolean {
  return baseUrl.startsWith("https:");
}

export function sessionCookieName(baseUrl: string): string {
  return `${isSecure(baseUrl) ? "__Secure-" : ""}next-auth.session-token`;
}

/** The claims in a session cookie's value; null for anything forged, expired or malformed. */
export async function readSessionClaims(value: string | undefined, secret: string): Promise<SessionClaims | null> {
  if (!value) return null;
  try {
    const claims = await decode({ token: value, secret });
    if (typeof claims?.sub !== "string" || typeof claims.stamp !== "string") return null;
    return { userId: claims.sub, stamp: claims.stamp };
  } catch {
    return null;
  }
}

/** A Set-Cookie line that opens a new session, for after a password change. */
export async function newSessionCookie(claims: SessionClaims, settings: { secret: string; baseUrl: string }) {
  const value = await encode({
    token: { sub: claims.userId, stamp: claims.stamp },
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
