import "server-only";
import { container } from "@/app/_server/container";
import { readCookie, readSessionClaims, sessionCookieName } from "@/app/_server/session-cookie";
import { AppError } from "@/lib/errors";
import { hashSecret } from "@/lib/server/access/secrets";
import { authenticateSession, authenticateToken, type Identity } from "@/lib/server/access/authenticate";

/** Remembers the organisation a person looked at last. */
export const ORGANISATION_COOKIE = "coulterbook-organisation";

/** Where a request comes from, for counting attempts: the nearest proxy's word, or Next's own of the socket. */
export function addressOf(request: Request): string {
  return request.headers.get("x-forwarded-for")?.split(",").at(-1)?.trim() || "unknown";
}

async function identityOfCookie(header: string | null): Promise<Identity | null> {
  const { env } = container();
  const claims = await readSessionClaims(readCookie(header, sessionCookieName(env.baseUrl)), env.AUTH_SECRET);
  return claims ? authenticateSession(claims) : null;
}

/** Names all that the answer to "who asks, and in which organisation" depends on, without holding a secret. */
export function credentialsOf({ headers }: Request): string {
  const cookies = headers.get("cookie");
  const session = readCookie(cookies, sessionCookieName(container().env.baseUrl)) ?? null;
  const organisation = readCookie(cookies, ORGANISATION_COOKIE) ?? null;
  return hashSecret(
    JSON.stringify([headers.get("authorization"), session, organisation, headers.get("x-organisation")]),
  );
}

/** Who sends this request: a personal token wins over a session. @throws AppError 401 */
export async function identifyRequest(request: Request): Promise<Identity> {
  const bearer = /^Bearer\s+(\S+)$/i.exec(request.headers.get("authorization") ?? "")?.[1];
  if (bearer) return authenticateToken(bearer, addressOf(request), container().clock.now());
  const identity = await identityOfCookie(request.headers.get("cookie"));
  if (!identity) throw new AppError("unauthorized", "Sign in, or send a personal token as Authorization: Bearer.");
  return identity;
}
