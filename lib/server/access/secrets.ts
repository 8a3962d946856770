import "server-only";
import { createHash, randomBytes } from "node:crypto";

/** SHA-256 in hexadecimal: how tokens and share links are kept. They are random, so no salt or slow hash is needed. */
export function hashSecret(secret: string): string {
  return createHash("sha256").update(secret).digest("hex");
}

/** A personal token: `cbk_` and 192 random bits. */
export function newPersonalToken(): string {
  return `cbk_${randomBytes(24).toString("base64url")}`;
}

/** The secret part of a share link: 160 random bits, short enough to type. */
export function newShareToken(): string {
  return randomBytes(20).toString("base64url");
}

/** What a session stands on. */
export interface SessionGround {
  passwordHash: string;
  sessionSalt: string;
}

/** Marks what a session was opened with: a new password, and signing out everywhere, end the sessions before. */
export function sessionStamp({ passwordHash, sessionSalt }: SessionGround): string {
  return hashSecret(`${sessionSalt}${passwordHash}`).slice(0, 16);
}

/** Tells one sign-in from another, so that it can be ended alone. */
export function newSessionId(): string {
  return randomBytes(12).toString("base64url");
}

export function newSessionSalt(): string {
  return randomBytes(12).toString("base64url");
}
