import "server-only";
import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from "node:crypto";

function keyOf(secret: string, salt: string): Uint8Array {
  return new Uint8Array(hkdfSync("sha256", secret, salt, "kept reply", 32));
}

/** Encrypts text under the application's secret and a salt that is not kept beside it (AES-256-GCM). */
export function sealText(text: string, secret: string, salt: string): string {
  const nonce = randomBytes(12);
  const cipher = createCipheriv("aes-256-gcm", keyOf(secret, salt), nonce);
  const sealed = Buffer.concat([cipher.update(text, "utf8"), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString("base64");
}

/** @throws Error when the secret or the salt is another one */
export function openText(sealed: string, secret: string, salt: string): string {
  const bytes = Buffer.from(sealed, "base64");
  const decipher = createDecipheriv("aes-256-gcm", keyOf(secret, salt), bytes.subarray(0, 12));
  decipher.setAuthTag(bytes.subarray(12, 28));
  return Buffer.concat([decipher.update(bytes.subarray(28)), decipher.final()]).toString("utf8");
}
