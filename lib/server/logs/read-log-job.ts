import { withOrganisation } from "@/db/client";
import { endJobs, pauseJob, startJob } from "@/db/queries/jobs";
import { changeLog, findLogForChange, type LogRow } from "@/db/queries/logs";
import { lockLog } from "@/db/queries/system/log-lock";
import type { JobPayloads } from "@/lib/ports/job-queue";
import { LogFailure, LogInterrupted } from "@/lib/server/logs/log-failure";
import { LogProgress } from "@/lib/server/logs/log-progress";
import { readAndStore } from "@/lib/server/logs/read-and-store";
import type { ThreadPool } from "@/lib/server/logs/thread-pool";
import { collectSoon } from "@/lib/server/worker/collect-soon";
import { workerScope } from "@/lib/server/logs/worker-scope";

const MAX_ATTEMPTS = 3;

interface JobOptions {
  threads: ThreadPool;
  signal: AbortSignal;
}

/**
 * Reads one log from its stored file to a stored version. Safe to run twice and beside itself: a lock admits one worker a
 * log, a log that is not waiting is left alone, and the version is written in one transaction.
 */
export async function readLogJob(payload: JobPayloads["read-log"], options: JobOptions): Promise<void> {
  const lock = await lockLog(payload.logId);
  if (!lock) return;
  try {
    const begun = await beginWork(payload);
    if (begun) await work(begun, options);
  } finally {
    await lock.release();
    collectSoon();
  }
}

async function beginWork({ organisationId, logId }: JobPayloads["read-log"]): Promise<LogRow | null> {
  const scope = workerScope(organisationId);
  return withOrganisation(scope, async (tx) => {
    const log = await findLogForChange(tx, scope, logId);
    if (!log || !["queued", "reading", "building"].includes(log.status)) return null;
    const job = await startJob(tx, scope, logId);
    if (job && job.attempts > MAX_ATTEMPTS) {
      const message = `Reading this log was broken off ${MAX_ATTEMPTS} times, so it was given up. The file is kept: read it again, or upload a smaller part of it.`;
      await changeLog(tx, scope, logId, { status: "failed", error: { code: "interrupted", message }, progress: 0 });
      await endJobs(tx, scope, { subject: logId, state: "failed" });
      return null;
    }
    await changeLog(tx, scope, logId, { status: "reading", stage: "Opening the file", progress: 0, error: null });
    return log;
  });
}

async function work(log: LogRow, options: JobOptions): Promise<void> {
  const first = { status: "reading" as const, stage: "Opening the file", progress: 0 };
  const progress = new LogProgress(log.organisationId, log.id, first, options.signal);
  try {
    await readAndStore(log, options.threads, progress);
  } catch (error) {
    await progress.end();
    await settleFailure(log, error);
  } finally {
    await progress.end();
  }
}

type Settlement = Pick<LogRow, "status" | "stage" | "error">;

function settlementOf(error: unknown): Settlement | null {
  if (error instanceof LogFailure) return { status: "failed", stage: "Could not be read", error: error.place };
  if (!(error instanceof LogInterrupted)) return null;
  if (error.reason === "deleted") return null;
  if (error.reason === "shutdown") return { status: "queued", stage: "Waiting for its turn", error: null };
  const message = "Stopped because somebody asked for it. The file is kept: it can be read again.";
  return { status: "failed", stage: "Stopped", error: { code: "cancelled", message } };
}

/** Writes down how it ended. @throws what is no fault of the log (database or file store away): the queue tries again. */
async function settleFailure(log: LogRow, error: unknown): Promise<void> {
  const settlement = settlementOf(error);
  if (!settlement) {
    if (error instanceof LogInterrupted) return;
    throw error;
  }
  const scope = workerScope(log.organisationId);
  const isOver = settlement.status === "failed";
  await withOrganisation(scope, async (tx) => {
    await changeLog(tx, scope, log.id, { ...settlement, progress: 0, ...(isOver ? { cancelRequestedAt: null } : {}) });
    if (!isOver) return pauseJob(tx, scope, log.id);
    const isCancelled = settlement.error?.code === "cancelled";
    await endJobs(tx, scope, { subject: log.id, state: isCancelled ? "cancelled" : "failed" });
  });
}
