import type { LogChannel } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { passMembers } from "@/lib/cleaning/rule-mask";

/**
 * The channel as it happened, not as it was logged: the reading of a record is that logged `delayS` later, taken from the
 * record of the same pass that is nearest in time; NaN where that would lie beyond the pass by more than half a step, and
 * where times are missing. Records in no pass keep what they have. Nothing is interpolated.
 */
export function shiftChannel(placed: PlacedLog, channel: LogChannel, delayS: number): LogChannel {
  if (delayS === 0) return channel;
  const values = new Float32Array(new SharedArrayBuffer(channel.values.byteLength));
  values.set(channel.values);
  const { rows } = channel;
  for (const pass of placed.passes) {
    const members = passMembers(placed, pass);
    const sources = sourceRecords(placed.log.timeMs, members, delayS * 1000);
    members.forEach((record, k) => {
      const from = sources[k]!;
      if (from < 0) values.fill(NaN, record * rows, (record + 1) * rows);
      else values.set(channel.values.subarray(from * rows, (from + 1) * rows), record * rows);
    });
  }
  return { ...channel, values };
}

/** For each member the one whose time is nearest to its own plus `delayMs`; -1 where there is none. */
function sourceRecords(timeMs: Float64Array, members: readonly number[], delayMs: number): Int32Array {
  const sources = new Int32Array(members.length).fill(-1);
  const timed = members.filter((record) => Number.isFinite(timeMs[record]!));
  timed.sort((a, b) => timeMs[a]! - timeMs[b]! || a - b);
  if (timed.length === 0) return sources;
  const first = timeMs[timed[0]!]!;
  const last = timeMs[timed.at(-1)!]!;
  const half = timed.length > 1 ? (last - first) / (timed.length - 1) / 2 : 0;
  members.forEach((record, k) => {
    const wanted = timeMs[record]! + delayMs;
    if (!(wanted >= first - half && wanted <= last + half)) return;
    sources[k] = nearest(timeMs, timed, wanted);
  });
  return sources;
}

/** Of records sorted by time the one nearest to a moment; the earlier of two equally near. */
function nearest(timeMs: Float64Array, sorted: readonly number[], wantedMs: number): number {
  let low = 0;
  let high = sorted.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (timeMs[sorted[middle]!]! < wantedMs) low = middle + 1;
    else high = middle;
  }
  const after = sorted[low]!;
  const before = sorted[Math.max(0, low - 1)]!;
  return Math.abs(wantedMs - timeMs[before]!) <= Math.abs(timeMs[after]! - wantedMs) ? before : after;
}
