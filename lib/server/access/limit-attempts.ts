import "server-only";
import { RateLimiterPostgres, RateLimiterRes } from "rate-limiter-flexible";
import { attemptsPool } from "@/db/queries/system/rate-limits";
import { AppError } from "@/lib/errors";
import { hashSecret } from "@/lib/server/access/secrets";

/** Attempts allowed within so many seconds. */
export const ATTEMPT_LIMITS = {
  /** One address guessing at one account. */
  "sign-in-from": { points: 10, duration: 900 },
  /** One account, from everywhere: the sender's address can be forged where no proxy stands in front. */
  "sign-in": { points: 50, duration: 900 },
  /** Unknown personal tokens from one address. */
  token: { points: 30, duration: 300 },
  /** Unknown share links and wrong passcodes from one address. */
  share: { points: 30, duration: 300 },
  /** Wrong passcodes for one share, from everywhere. */
  passcode: { points: 20, duration: 900 },
  /** Share links mailed by one organisation. */
  mail: { points: 50, duration: 3600 },
  /** Share links mailed by one person. */
  "mail-from": { points: 20, duration: 3600 },
  /** Wrong old passwords when changing one's password. */
  password: { points: 10, duration: 900 },
} as const;
export type AttemptKind = keyof typeof ATTEMPT_LIMITS;

const limiters = new Map<AttemptKind, { limiter: RateLimiterPostgres; pool: unknown }>();

function limiterOf(kind: AttemptKind): RateLimiterPostgres {
  const pool = attemptsPool();
  const known = limiters.get(kind);
  if (known?.pool === pool) return known.limiter;
  const limiter = new RateLimiterPostgres({
    storeClient: pool,
    storeType: "pool",
    keyPrefix: kind,
    tableName: "rate_limits",
    tableCreated: true,
    clearExpiredByTimeout: true,
    ...ATTEMPT_LIMITS[kind],
  });
  limiters.set(kind, { limiter, pool });
  return limiter;
}

function slowDown(result: RateLimiterRes): AppError {
  const retryAfterS = Math.max(1, Math.ceil(result.msBeforeNext / 1000));
  return new AppError("too_many_requests", `Too many attempts. Try again in ${retryAfterS} seconds.`, {
    extra: { retryAfterS },
  });
}

/** Counts one attempt. @throws AppError `too_many_requests` once the limit is passed. */
export async function countAttempt(kind: AttemptKind, key: string): Promise<void> {
  try {
    await limiterOf(kind).consume(hashSecret(key));
  } catch (rejection) {
    throw rejection instanceof RateLimiterRes ? slowDown(rejection) : rejection;
  }
}

/** Refuses when the limit was passed already, without counting. */
export async function refuseWhenLimited(kind: AttemptKind, key: string): Promise<void> {
  const state = await limiterOf(kind).get(hashSecret(key));
  if (state && state.consumedPoints > ATTEMPT_LIMITS[kind].points) throw slowDown(state);
}

/** Forgets the attempts after a right one. */
export async function forgetAttempts(kind: AttemptKind, key: string): Promise<void> {
  await limiterOf(kind).delete(hashSecret(key));
}
