import { withOrganisation, type Transaction } from "@/db/client";
import { findLogResult, saveLogResult } from "@/db/queries/log-results";
import { findBoundaryOfLog, findLogForChange, type LogRow } from "@/db/queries/logs";
import { lockLog } from "@/db/queries/system/log-lock";
import { mainDelayChannels } from "@/lib/alignment/delay-channels";
import { packPlacedLog } from "@/lib/logs/packed-placed-log";
import type { JobPayloads } from "@/lib/ports/job-queue";
import { openLookThread, type LookThread } from "@/lib/server/alignment/open-look-thread";
import { settleLookNotes } from "@/lib/server/alignment/settle-look-notes";
import { delayKind, LOOK, Look, MIRRORED } from "@/lib/server/alignment/stored-look";
import type { Scope } from "@/lib/scope";
import type { Environment } from "@/lib/server/env";
import { isBusy } from "@/lib/server/logs/describe-log";
import { loadPlacedLog } from "@/lib/server/logs/load-placed-log";
import { LogInterrupted } from "@/lib/server/logs/log-failure";
import { workerScope } from "@/lib/server/logs/worker-scope";

const MAX_ATTEMPTS = 3;

interface LookOptions {
  env: Pick<Environment, "BUILD_DIR" | "WORKER_MEMORY_MIB">;
  signal: AbortSignal;
  /** Resolves when no log is being read by this worker: readings first. */
  whenIdle(): Promise<void>;
}

/**
 * The second look at a log that is ready: how late its channels were logged, and whether left and right are mirrored. What
 * it finds is kept step by step under the log's version and told in notes. Safe to run twice and beside itself: a lock
 * admits one worker a log, and what is known already is not worked out again.
 */
export async function lookCloser(payload: JobPayloads["look-closer"], options: LookOptions): Promise<void> {
  const lock = await lockLog(`look:${payload.logId}`);
  if (!lock) return;
  try {
    const begun = await beginLook(payload);
    if (begun) await look(begun.log, begun.look, options);
  } finally {
    await lock.release();
  }
}

interface BegunLook {
  log: LogRow;
  look: Look;
}

async function beginLook({ organisationId, logId }: JobPayloads["look-closer"]): Promise<BegunLook | null> {
  const scope = workerScope(organisationId);
  return withOrganisation(scope, async (tx) => {
    const log = await findLogForChange(tx, scope, logId);
    // One that is being read again is looked at when that has ended.
    if (!log || log.version === 0 || isBusy(log.status)) return null;
    const key = { logId, version: log.version, kind: LOOK };
    const stored = await findLogResult(tx, scope, key);
    const before: Look = stored
      ? Look.parse(stored)
      : { state: "waiting", attempts: 0, progress: 0, channels: mainDelayChannels(log.channels.map(({ id }) => id)) };
    if (before.state === "done" || before.state === "failed") return null;
    const isGivenUp = before.attempts >= MAX_ATTEMPTS;
    const next: Look = { ...before, state: isGivenUp ? "failed" : "working", attempts: before.attempts + 1 };
    await saveLogResult(tx, scope, { ...key, body: next });
    return isGivenUp ? null : { log, look: next };
  });
}

async function look(log: LogRow, begun: Look, options: LookOptions): Promise<void> {
  const thread = openLookThread(options.env, options.signal);
  try {
    const steps = [...begun.channels.map(delayKind), MIRRORED];
    for (const [done, kind] of steps.entries()) {
      await options.whenIdle();
      options.signal.throwIfAborted();
      if (!(await isKnown(log, kind))) await keep(log, kind, await workOut(log, kind, thread));
      await keepLook(log, (now) => ({ ...now, progress: (done + 1) / (steps.length + 1) }));
    }
    await finishLook(log, begun);
  } catch (error) {
    if (!(error instanceof LogInterrupted)) throw error;
    // Put back as if it had not been tried; a log that was deleted or read again meanwhile has nothing to put back.
    if (error.reason === "shutdown") {
      const putBack = (now: Look): Look => ({ ...now, state: "waiting", attempts: Math.max(0, now.attempts - 1) });
      await keepLook(log, putBack).catch(passOver);
    }
  } finally {
    await thread.close();
  }
}

async function workOut(log: LogRow, kind: string, thread: LookThread): Promise<unknown> {
  if (kind !== MIRRORED) {
    const channel = kind.slice(delayKind("").length);
    return thread.ask({ kind: "delay", channel, packed: packPlacedLog(await loadPlacedLog(log, channel)) });
  }
  const scope = workerScope(log.organisationId);
  const boundary = await withOrganisation(scope, (tx) => findBoundaryOfLog(tx, scope, log.fieldId));
  const placed = await loadPlacedLog(log, "all");
  return thread.ask({ kind: "mirrored", packed: packPlacedLog(placed), boundary });
}

async function isKnown({ organisationId, id, version }: LogRow, kind: string): Promise<boolean> {
  const scope = workerScope(organisationId);
  return withOrganisation(scope, async (tx) => (await findLogResult(tx, scope, { logId: id, version, kind })) !== null);
}

/** Keeps what was found. @throws LogInterrupted where the log is gone or has another version: it would speak of nothing */
async function keep({ organisationId, id, version }: LogRow, kind: string, body: unknown): Promise<void> {
  const scope = workerScope(organisationId);
  await withOrganisation(scope, async (tx) => {
    const now = await findLogForChange(tx, scope, id);
    if (now?.version !== version) throw new LogInterrupted("deleted");
    await saveLogResult(tx, scope, { logId: id, version, kind, body });
  });
}

/** Changes the state of the look, and in the same moment whatever `also` does. @throws LogInterrupted as `keep` */
async function keepLook(
  log: LogRow,
  change: (now: Look) => Look,
  also?: (tx: Transaction, scope: Scope) => Promise<void>,
): Promise<void> {
  const scope = workerScope(log.organisationId);
  await withOrganisation(scope, async (tx) => {
    const now = await findLogForChange(tx, scope, log.id);
    if (now?.version !== log.version) throw new LogInterrupted("deleted");
    const key = { logId: log.id, version: log.version, kind: LOOK };
    const body = change(Look.parse(await findLogResult(tx, scope, key)));
    await saveLogResult(tx, scope, { ...key, body });
    await also?.(tx, scope);
  });
}

/** The look is done and the notes say what it found, in one moment; more channels asked for meanwhile keep it waiting. */
async function finishLook(log: LogRow, begun: Look): Promise<void> {
  const end = (now: Look): Look => {
    const isAll = now.channels.every((channel) => begun.channels.includes(channel));
    return { ...now, state: isAll ? "done" : "waiting", attempts: isAll ? now.attempts : 0, progress: isAll ? 1 : 0 };
  };
  await keepLook(log, end, (tx, scope) => settleLookNotes(tx, scope, log.id));
}

function passOver(error: unknown): void {
  if (!(error instanceof LogInterrupted)) throw error;
}
