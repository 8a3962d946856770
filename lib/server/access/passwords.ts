import "server-only";
import { Algorithm, hash, verify } from "@node-rs/argon2";

// OWASP Password Storage Cheat Sheet, argon2id: 19 MiB, 2 iterations, 1 lane.
const COST = { algorithm: 2 as Algorithm.Argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };

let nobody: Promise<string> | null = null;

export function hashPassword(password: string): Promise<string> {
  return hash(password, COST);
}

/** Whether the password fits. Unknown people cost the same time as known ones: a hash of nobody is checked instead. */
export async function isPasswordRight(password: string, passwordHash: string | null): Promise<boolean> {
  nobody ??= hashPassword("a password that belongs to nobody");
  const fits = await verify(passwordHash ?? (await nobody), password);
  return fits && passwordHash !== null;
}
