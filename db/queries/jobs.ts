import { and, desc, eq, inArray, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { jobs } from "@/db/schema";
import type { Scope } from "@/lib/scope";

type Organisation = Pick<Scope, "organisationId">;
export type JobRow = typeof jobs.$inferSelect;
type EndState = "done" | "failed" | "cancelled";

/** Notes that work was asked for; in the same transaction as the row it is about, so that neither is lost alone. */
export async function insertJob(
  tx: Transaction,
  scope: Organisation,
  input: { id: string; name: string; subject: string; payload: Record<string, unknown> },
): Promise<void> {
  await tx.insert(jobs).values({ ...input, organisationId: scope.organisationId });
}

function isOpen(scope: Organisation, subject: string) {
  return and(
    eq(jobs.organisationId, scope.organisationId),
    eq(jobs.subject, subject),
    inArray(jobs.state, ["queued", "running"]),
  );
}

/** Counts one more attempt of the newest open job about this; null when none is open. */
export async function startJob(tx: Transaction, scope: Organisation, subject: string): Promise<JobRow | null> {
  const [open] = await tx.select().from(jobs).where(isOpen(scope, subject)).orderBy(desc(jobs.createdAt)).limit(1);
  if (!open) return null;
  const [started] = await tx
    .update(jobs)
    .set({ state: "running", attempts: sql`${jobs.attempts} + 1`, startedAt: new Date() })
    .where(and(eq(jobs.organisationId, scope.organisationId), eq(jobs.id, open.id)))
    .returning();
  return started ?? null;
}

/** Closes every open job about this. */
export async function endJobs(
  tx: Transaction,
  scope: Organisation,
  input: { subject: string; state: EndState },
): Promise<void> {
  await tx.update(jobs).set({ state: input.state, endedAt: new Date() }).where(isOpen(scope, input.subject));
}

/** Puts the job back as if it had not been tried: the worker was told to stop. */
export async function pauseJob(tx: Transaction, scope: Organisation, subject: string): Promise<void> {
  await tx
    .update(jobs)
    .set({ state: "queued", attempts: sql`greatest(${jobs.attempts} - 1, 0)` })
    .where(isOpen(scope, subject));
}
