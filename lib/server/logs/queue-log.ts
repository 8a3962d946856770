import { nanoid } from "nanoid";
import type { Transaction } from "@/db/client";
import { insertJob } from "@/db/queries/jobs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";

/** Notes the work in the transaction of the change that calls for it. */
export async function noteReadLog(tx: Transaction, scope: Scope, logId: string): Promise<void> {
  const payload = { organisationId: scope.organisationId, logId };
  await insertJob(tx, scope, { id: `job_${nanoid()}`, name: "read-log", subject: logId, payload });
}

/**
 * Wakes the worker, after the commit. A queue that does not answer loses nothing: the worker finds waiting logs by
 * itself.
 */
export async function sendReadLog(container: Container, scope: Scope, logId: string): Promise<void> {
  try {
    await container.queue.send("read-log", { organisationId: scope.organisationId, logId }, { key: logId });
  } catch (error) {
    console.error(`queue: ${logId} waits for the worker's own look: ${error instanceof Error ? error.message : error}`);
  }
}
