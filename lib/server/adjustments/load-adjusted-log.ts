import "server-only";
import { withOrganisation } from "@/db/client";
import { findAdjustments } from "@/db/queries/adjustments";
import type { KnownAdjustments } from "@/lib/adjustments/adjust-part";
import type { Adjustments } from "@/lib/adjustments/adjustments";
import { shiftChannel } from "@/lib/adjustments/shift-channel";
import { withoutLeftOut, type LeftOut } from "@/lib/cleaning/left-out";
import type { LogChannel } from "@/lib/logs/machine-log";
import { packPlacedLog } from "@/lib/logs/packed-placed-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { askCleaningThread } from "@/lib/server/adjustments/ask-cleaning-thread";
import { toRevision } from "@/lib/server/adjustments/revise-adjustments";
import type { Container } from "@/lib/server/create-container";
import { loadPlacedLog, type LogVersion } from "@/lib/server/logs/load-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";

/** A version of a log with the adjustments it is to be read with; revision 0 for the log as it was read. */
export interface LogState extends LogVersion {
  adjustmentRevision: number;
}

/** What names a log's readings: its version, and the revision of its adjustments. */
export function stateText({ version, adjustmentRevision }: LogState): string {
  return `${version}.${adjustmentRevision}`;
}

export function stateKey(log: LogState): string {
  return `${log.id}:${stateText(log)}`;
}

/** The adjustments of a state, kept: a revision never changes. */
export async function loadAdjustments(log: LogState): Promise<Adjustments> {
  return cachedForLog(`${log.id}:adjustments.${log.adjustmentRevision}`, async () => {
    const key = { logId: log.id, revision: log.adjustmentRevision };
    const row = await withOrganisation(log, (tx) => findAdjustments(tx, log, key));
    if (!row) throw new Error(`log ${log.id} has no revision ${log.adjustmentRevision} of its adjustments`);
    const { delaysS, cleaning } = toRevision(row);
    return { value: { delaysS, cleaning }, bytes: 4_000 };
  });
}

/** What the rules of a state leave out, worked out once in the cleaning thread. */
export async function loadLeftOut(container: Container, log: LogState): Promise<LeftOut | null> {
  if (log.adjustmentRevision === 0) return null;
  return cachedForLog(`${stateKey(log)}:left-out`, async () => {
    const adjustments = await loadAdjustments(log);
    const packed = packPlacedLog(await loadPlacedLog(log, "all"));
    const logKey = `${log.id}:${log.version}`;
    const value = await askCleaningThread(container.env, { kind: "left-out", logKey, packed, adjustments });
    return { value, bytes: value ? bytesOf(value) : 1 };
  });
}

function bytesOf({ records, cells, whole, channels }: LeftOut): number {
  return [records, cells, whole, ...channels.values()].reduce((sum, array) => sum + (array?.byteLength ?? 0), 1);
}

/**
 * A log with its adjustments, with the readings that `channel` needs (all of them for `"all"`, none for null). The caller has
 * found `log` under its own scope. @throws AppError `conflict` before the first version
 */
export async function loadAdjustedLog(
  container: Container,
  log: LogState,
  channel: string | "all" | null,
): Promise<PlacedLog> {
  const placed = await loadPlacedLog(log, channel);
  if (log.adjustmentRevision === 0 || (placed.log.channels.length === 0 && channel !== "flags")) return placed;
  const adjustments = await loadAdjustments(log);
  const leftOut = await loadLeftOut(container, log);
  const channels = await Promise.all(
    placed.log.channels.map((one) => adjustChannel(log, { placed, channel: one, adjustments, leftOut })),
  );
  return { ...placed, ...(leftOut ? { leftOut } : {}), log: { ...placed.log, channels } };
}

interface ChannelToAdjust {
  placed: PlacedLog;
  channel: LogChannel;
  adjustments: Adjustments;
  leftOut: LeftOut | null;
}

/** As `adjustLog` makes it, kept: a copy only where something changes. */
async function adjustChannel(
  log: LogState,
  { placed, channel, adjustments, leftOut }: ChannelToAdjust,
): Promise<LogChannel> {
  return cachedForLog(`${stateKey(log)}:${channel.id}`, async () => {
    const shifted = shiftChannel(placed, channel, adjustments.delaysS[channel.id] ?? 0);
    const value = leftOut ? withoutLeftOut(shifted, leftOut) : shifted;
    return { value, bytes: value === channel ? 1 : value.values.byteLength };
  });
}

/** Adjustments and what they leave out, for a log that is read part by part; null for a log as it was read. */
export async function loadKnownAdjustments(container: Container, log: LogState): Promise<KnownAdjustments | null> {
  if (log.adjustmentRevision === 0) return null;
  return { ...(await loadAdjustments(log)), leftOut: await loadLeftOut(container, log) };
}
