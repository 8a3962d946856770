import "server-only";
import { findPersonById, type PersonRow } from "@/db/queries/system/people";
import { findTokenByHash, recordTokenUse, type TokenRow } from "@/db/queries/system/tokens";
import { AppError } from "@/lib/errors";
import { countAttempt } from "@/lib/server/access/limit-attempts";
import { hashSecret, sessionStamp } from "@/lib/server/access/secrets";

/** Last use is written at most this often, so that reading does not write every time. */
const USE_RECORDED_EVERY_MS = 60_000;

export interface Identity {
  person: PersonRow;
  /** Set when a personal token was used; its organisation and role bound the request. */
  token: TokenRow | null;
}

export interface SessionClaims {
  userId: string;
  /** See `sessionStamp`. */
  stamp: string;
  sessionId: string;
}

/** The person of a session; null when gone, signed out, or when the password has changed since. */
export async function authenticateSession(claims: SessionClaims): Promise<Identity | null> {
  const person = await findPersonById(claims.userId);
  if (!person || sessionStamp(person) !== claims.stamp) return null;
  if (person.endedSessions.some((ended) => ended.id === claims.sessionId)) return null;
  return { person, token: null };
}

/** The person of a personal token. @throws AppError 401 for an unknown or expired one, 429 after too many guesses */
export async function authenticateToken(secret: string, from: string, now: Date): Promise<Identity> {
  const token = await findTokenByHash(hashSecret(secret));
  const person = token ? await findPersonById(token.userId) : null;
  if (!token || !person) {
    await countAttempt("token", from);
    throw new AppError("unauthorized", "This token is unknown or was withdrawn.", { detailCode: "unknown_token" });
  }
  if (token.expiresAt && token.expiresAt <= now) {
    throw new AppError("unauthorized", "This token has expired.", { detailCode: "expired_token" });
  }
  if (!token.lastUsedAt || now.getTime() - token.lastUsedAt.getTime() > USE_RECORDED_EVERY_MS) {
    await recordTokenUse(token, now);
  }
  return { person, token };
}
