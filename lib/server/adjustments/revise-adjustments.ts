import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import {
  findAdjustments,
  findNewestAdjustments,
  insertAdjustments,
  type AdjustmentRow,
} from "@/db/queries/adjustments";
import { recordAudit } from "@/db/queries/audit";
import { changeLog } from "@/db/queries/logs";
import { isAsRead, noAdjustments, type Adjustments } from "@/lib/adjustments/adjustments";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import { settleLookNotes } from "@/lib/server/alignment/settle-look-notes";
import { getLogForChange } from "@/lib/server/logs/change-log";

export interface AdjustmentsChange {
  /** Delays to take the place of those in force; left out to keep them. */
  delaysS?: (now: Adjustments["delaysS"]) => Adjustments["delaysS"];
  /** Rules to take the place of those in force; left out to keep them. */
  cleaning?: (now: Adjustments["cleaning"]) => Adjustments["cleaning"];
  note?: string;
}

/** A revision in force. */
export interface Revision extends Adjustments {
  /** 0: as read. */
  revision: number;
  isAsRead: boolean;
}

const AS_READ = 0;

/** What a stored revision says; the log as read for none. */
export function toRevision(row: AdjustmentRow | null): Revision {
  if (!row) return { revision: AS_READ, isAsRead: true, ...noAdjustments() };
  const { revision, delaysS, cleaning } = row;
  // A rule that came after the revision was kept stands as it does for everybody: with its usual numbers.
  return { revision, isAsRead: row.isAsRead, delaysS, cleaning: { ...noAdjustments().cleaning, ...cleaning } };
}

/** The adjustments in force. The caller has found the log under its own scope. */
export async function findRevision(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  logId: string,
): Promise<Revision> {
  return toRevision(await findNewestAdjustments(tx, scope, logId));
}

/**
 * Changes how a log is read, as a new revision: channels' delays, cleaning rules, or both. Nothing of the log is touched.
 * A change that changes nothing makes no revision. @throws AppError `not_found`
 */
export async function reviseAdjustments(scope: Scope, logId: string, change: AdjustmentsChange): Promise<Revision> {
  return withOrganisation(scope, async (tx) => {
    await getLogForChange(tx, scope, logId);
    const now = await findRevision(tx, scope, logId);
    const delaysS = withoutNothing(change.delaysS ? change.delaysS(now.delaysS) : now.delaysS);
    const cleaning = change.cleaning ? change.cleaning(now.cleaning) : now.cleaning;
    if (isSame(now, { delaysS, cleaning })) return now;
    return keepRevision(tx, scope, { logId, now, next: { delaysS, cleaning }, note: change.note, revertedTo: null });
  });
}

/**
 * Goes back to an earlier revision (0: as read; left out: the one before the revision in force) by making a new one equal
 * to it. @throws AppError `not_found`, `unprocessable` for a revision that is not there, `conflict` where there is nothing to undo
 */
export async function revertAdjustments(
  scope: Scope,
  logId: string,
  { revert, note }: { revert?: number; note?: string },
): Promise<Revision> {
  return withOrganisation(scope, async (tx) => {
    await getLogForChange(tx, scope, logId);
    const now = await findRevision(tx, scope, logId);
    if (now.revision === AS_READ) {
      const message = "This log stands as it was read: there is nothing to undo.";
      throw new AppError("conflict", message, { detailCode: "nothing_to_undo" });
    }
    const wanted = revert ?? now.revision - 1;
    const row = wanted === AS_READ ? null : await findAdjustments(tx, scope, { logId, revision: wanted });
    if (wanted !== AS_READ && !row) {
      const message = `there is no revision ${wanted} of this log`;
      throw new AppError("unprocessable", `revert: ${message}.`, { places: [{ path: "revert", message }] });
    }
    const { delaysS, cleaning } = toRevision(row);
    return keepRevision(tx, scope, { logId, now, next: { delaysS, cleaning }, note, revertedTo: wanted });
  });
}

interface NewRevision {
  logId: string;
  now: Revision;
  next: Adjustments;
  note: string | undefined;
  revertedTo: number | null;
}

async function keepRevision(tx: Transaction, scope: Scope, input: NewRevision): Promise<Revision> {
  const { logId, now, next, note, revertedTo } = input;
  const revision = now.revision + 1;
  const kept = { ...next, revision, isAsRead: isAsRead(next) };
  await insertAdjustments(tx, scope, { logId, ...kept, note: note || null, revertedTo });
  await changeLog(tx, scope, logId, { adjustmentRevision: kept.isAsRead ? AS_READ : revision });
  await settleLookNotes(tx, scope, logId);
  const detail = { revision, ...(revertedTo === null ? {} : { revertedTo }), changes: changesOf(now, next) };
  await recordAudit(tx, scope, { action: "log.adjust", subject: logId, detail });
  return kept;
}

/** What was changed, with what it was before, for the audit. */
function changesOf(before: Adjustments, after: Adjustments): Record<string, unknown> {
  const was = new Map<string, unknown>(Object.entries({ ...before.cleaning, delaysS: before.delaysS }));
  const now = Object.entries({ ...after.cleaning, delaysS: after.delaysS });
  const changed = now.filter(([name, value]) => asText(value) !== asText(was.get(name)));
  return Object.fromEntries(changed.map(([name, value]) => [name, { before: was.get(name), after: value }]));
}

function withoutNothing(delaysS: Adjustments["delaysS"]): Adjustments["delaysS"] {
  return Object.fromEntries(Object.entries(delaysS).filter(([, delay]) => delay));
}

function isSame(a: Adjustments, b: Adjustments): boolean {
  return asText(a.delaysS) === asText(b.delaysS) && asText(a.cleaning) === asText(b.cleaning);
}

/** The same text for the same content, whatever the order of keys (the database keeps its own). */
function asText(value: unknown): string {
  return JSON.stringify(value, (_, inner: unknown) =>
    inner && typeof inner === "object" && !Array.isArray(inner)
      ? Object.fromEntries(Object.entries(inner).sort(([a], [b]) => (a < b ? -1 : 1)))
      : inner,
  );
}
