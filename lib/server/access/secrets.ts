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

/** Marks the password a session was opened with: a new password ends the sessions of the old one. */
export function passwordStamp(passwordHash: string): string {
  return hashSecret(passwordHash).slice(0, 16);
}
