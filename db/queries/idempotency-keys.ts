import { and, eq, isNull, lt } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { idempotencyKeys } from "@/db/schema";
import type { Scope } from "@/lib/scope";

export interface KeptReply {
  status: number;
  location: string | null;
  /** Sealed body; see app/_server/only-once.ts. */
  body: string;
}

export interface RequestKey {
  /** SHA-256 of the Idempotency-Key. */
  key: string;
  route: string;
}

function isThisRequest(scope: Scope, request: RequestKey) {
  return and(
    eq(idempotencyKeys.organisationId, scope.organisationId),
    eq(idempotencyKeys.userId, scope.userId),
    eq(idempotencyKeys.route, request.route),
    eq(idempotencyKeys.key, request.key),
  );
}

/** Takes the key for this request; false when another request has it. */
export async function claimKey(
  tx: Transaction,
  scope: Scope,
  input: RequestKey & { fingerprint: string; staleBefore: Date; expiredBefore: Date },
): Promise<boolean> {
  const { staleBefore, expiredBefore, ...claim } = input;
  const own = eq(idempotencyKeys.organisationId, scope.organisationId);
  await tx.delete(idempotencyKeys).where(and(own, lt(idempotencyKeys.createdAt, expiredBefore)));
  // A claim without a reply after this long belongs to a process that died.
  await tx
    .delete(idempotencyKeys)
    .where(
      and(isThisRequest(scope, input), isNull(idempotencyKeys.status), lt(idempotencyKeys.createdAt, staleBefore)),
    );
  const made = await tx
    .insert(idempotencyKeys)
    .values({ ...claim, organisationId: scope.organisationId, userId: scope.userId, status: null })
    .onConflictDoNothing()
    .returning({ key: idempotencyKeys.key });
  return made.length > 0;
}

export async function findKey(
  tx: Transaction,
  scope: Scope,
  request: RequestKey,
): Promise<{ fingerprint: string; reply: KeptReply | null } | null> {
  const [row] = await tx.select().from(idempotencyKeys).where(isThisRequest(scope, request));
  return row ? { fingerprint: row.fingerprint, reply: row.status } : null;
}

export async function keepReply(
  tx: Transaction,
  scope: Scope,
  input: RequestKey & { reply: KeptReply },
): Promise<void> {
  await tx.update(idempotencyKeys).set({ status: input.reply }).where(isThisRequest(scope, input));
}

/** Gives the key back after a failure, so that a repeated request is tried again. */
export async function releaseKey(tx: Transaction, scope: Scope, request: RequestKey): Promise<void> {
  await tx.delete(idempotencyKeys).where(isThisRequest(scope, request));
}
