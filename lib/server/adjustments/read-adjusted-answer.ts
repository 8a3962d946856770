import "server-only";
import { withOrganisation } from "@/db/client";
import { findLogResult, saveLogResult } from "@/db/queries/log-results";
import { packPlacedLog } from "@/lib/logs/packed-placed-log";
import { askCleaningThread } from "@/lib/server/adjustments/ask-cleaning-thread";
import { loadAdjustments, stateKey, type LogState } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { loadPlacedLog } from "@/lib/server/logs/load-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";

/** Name under which an answer is kept: those of a log as read under their plain names, those of a revision with its number. */
export function answerKind(log: LogState, kind: string): string {
  return log.adjustmentRevision === 0 ? kind : `${kind}#${log.adjustmentRevision}`;
}

/** A stored answer about a log in this state; null where it was not kept. The caller has found the log under its own scope. */
export async function findAnswer(log: LogState, kind: string): Promise<unknown> {
  const key = { logId: log.id, version: log.version, kind: answerKind(log, kind) };
  return withOrganisation(log, (tx) => findLogResult(tx, log, key));
}

/**
 * The same; those of a revision that nobody asked for yet are worked out in the cleaning thread, once, and kept: rows of
 * every channel and the verdict together. Null for what is not among them.
 */
export async function readAdjustedAnswer(container: Container, log: LogState, kind: string): Promise<unknown> {
  const stored = await findAnswer(log, kind);
  if (stored !== null || log.adjustmentRevision === 0) return stored;
  await cachedForLog(`${stateKey(log)}:answers`, async () => {
    await keepAnswers(container, log);
    return { value: true, bytes: 1 };
  });
  // As the database gives it back, so that the first reader is told the very same as the next.
  return findAnswer(log, kind);
}

async function keepAnswers(container: Container, log: LogState): Promise<void> {
  const adjustments = await loadAdjustments(log);
  const packed = packPlacedLog(await loadPlacedLog(log, "all"));
  const logKey = `${log.id}:${log.version}`;
  const answers = await askCleaningThread(container.env, { kind: "answers", logKey, packed, adjustments });
  await withOrganisation(log, async (tx) => {
    for (const { kind, body } of answers) {
      const key = { logId: log.id, version: log.version, kind: answerKind(log, kind) };
      await saveLogResult(tx, log, { ...key, body });
    }
  });
}
