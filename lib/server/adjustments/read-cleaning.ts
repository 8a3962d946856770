import "server-only";
import { withOrganisation } from "@/db/client";
import { findLogResult, saveLogResult } from "@/db/queries/log-results";
import { listAdjustments } from "@/db/queries/adjustments";
import type { Adjustments } from "@/lib/adjustments/adjustments";
import { changeRules, type RuleFault } from "@/lib/cleaning/change-rules";
import { ruleFacts, type CleaningRules } from "@/lib/cleaning/rule-catalogue";
import { AppError } from "@/lib/errors";
import { packPlacedLog } from "@/lib/logs/packed-placed-log";
import { CleaningPreview, type Cleaning, type CleaningItem, type CleaningRulesChange } from "@/lib/schemas/cleaning";
import type { Scope } from "@/lib/scope";
import { askCleaningThread } from "@/lib/server/adjustments/ask-cleaning-thread";
import { loadAdjustments, type LogState } from "@/lib/server/adjustments/load-adjusted-log";
import { findRevision, reviseAdjustments, revertAdjustments } from "@/lib/server/adjustments/revise-adjustments";
import type { Container } from "@/lib/server/create-container";
import { getReadLog } from "@/lib/server/logs/find-placed-log";
import { loadPlacedLog, type LogVersion } from "@/lib/server/logs/load-placed-log";

/** Rules in force with what each takes out or would, what that makes of every channel, and earlier revisions. */
export async function readCleaning(container: Container, scope: Scope, logId: string): Promise<Cleaning> {
  const log = await getReadLog(scope, { logId });
  const { now, history } = await withOrganisation(scope, async (tx) => ({
    now: await findRevision(tx, scope, logId),
    history: await listAdjustments(tx, scope, logId),
  }));
  const { revision, delaysS } = now;
  const counted = await countKept(container, log, now);
  const entries = history.map((entry) => ({ ...entry, at: entry.at.toISOString() }));
  return { revision, ...counted, delaysS: { ...delaysS } as Record<string, number>, history: entries };
}

/** What these rules would do, without keeping them. @throws AppError `unprocessable` */
export async function previewCleaning(
  container: Container,
  scope: Scope,
  input: { logId: string; rules: CleaningRulesChange },
): Promise<CleaningPreview> {
  const log = await getReadLog(scope, input);
  const { cleaning, delaysS } = await withOrganisation(scope, (tx) => findRevision(tx, scope, input.logId));
  return countAdjusted(container, log, { delaysS, cleaning: changedRules(cleaning, input.rules) });
}

/** Changes the rules as a new revision. @throws AppError `unprocessable`, `not_found`, `conflict` before the first reading */
export async function changeCleaning(
  container: Container,
  scope: Scope,
  input: { logId: string; rules: CleaningRulesChange; note?: string },
): Promise<Cleaning> {
  const { logId, rules, note } = input;
  await getReadLog(scope, { logId });
  await reviseAdjustments(scope, logId, { cleaning: (now) => changedRules(now, rules), note });
  return readCleaning(container, scope, logId);
}

/** Goes back to an earlier revision, or to the one before. @throws AppError `conflict`, `unprocessable`, `not_found` */
export async function undoCleaning(
  container: Container,
  scope: Scope,
  input: { logId: string; revert?: number; note?: string },
): Promise<Cleaning> {
  const { logId, revert, note } = input;
  await getReadLog(scope, { logId });
  await revertAdjustments(scope, logId, { revert, note });
  return readCleaning(container, scope, logId);
}

function changedRules(now: CleaningRules, change: CleaningRulesChange): CleaningRules {
  const changed = changeRules(now, change);
  if (changed.ok) return changed.value;
  throw faultyRules(changed.error);
}

function faultyRules(faults: RuleFault[]): AppError {
  const said = faults.map(({ path, message }) => `${path}: ${message}`).join("; ");
  return new AppError("unprocessable", said, { places: faults });
}

/** Share of the readings in passes that the rules of a state leave out, as its cleaning tells it; 0 for a log as read. */
export async function readLeftOutShare(container: Container, log: LogState): Promise<number> {
  if (log.adjustmentRevision === 0) return 0;
  const adjustments = await loadAdjustments(log);
  const { total } = await countKept(container, log, { ...adjustments, revision: log.adjustmentRevision });
  return total.before > 0 ? (total.before - total.after) / total.before : 0;
}

/** Counts of the revision in force, worked out once for a version of the log and kept with it. */
async function countKept(
  container: Container,
  log: LogVersion,
  { revision, ...adjustments }: Adjustments & { revision: number },
): Promise<CleaningPreview> {
  const key = { logId: log.id, version: log.version, kind: `cleaning#${revision}` };
  const kept = CleaningPreview.safeParse(await withOrganisation(log, (tx) => findLogResult(tx, log, key)));
  // Counts are kept, words are those of today.
  if (kept.success) return { ...kept.data, items: kept.data.items.map(wordAnew) };
  const counted = await countAdjusted(container, log, adjustments);
  await withOrganisation(log, (tx) => saveLogResult(tx, log, { ...key, body: counted }));
  return counted;
}

function wordAnew(item: CleaningItem): CleaningItem {
  const { label, words, fixed } = ruleFacts(item.code);
  return { ...item, label, words, fixed };
}

async function countAdjusted(
  container: Container,
  log: LogVersion,
  { delaysS, cleaning }: Adjustments,
): Promise<CleaningPreview> {
  const packed = packPlacedLog(await loadPlacedLog(log, "all"));
  const logKey = `${log.id}:${log.version}`;
  const task = { kind: "counts", logKey, packed, adjustments: { delaysS, cleaning } } as const;
  return { rules: cleaning, ...(await askCleaningThread(container.env, task)) };
}
