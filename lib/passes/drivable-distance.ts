import { medianStepSeconds } from "@/lib/cleaning/position-steps";

/** One entry a record. */
export interface TimedTrack {
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  timeMs: ArrayLike<number>;
  /** As logged; NaN or null where the log has none. */
  speedMps: ArrayLike<number> | null;
}

/** A silence longer than this, seconds, is a gap: two seconds and three median steps. */
export function longestStepS(timeMs: ArrayLike<number>): number {
  return Math.max(2, 3 * (medianStepSeconds(timeMs) || 0));
}

/**
 * How far the machine may have driven from one record to a later one, metres: 1.5 v dt + 1 m, v the larger logged speed at
 * either end, else the larger of the speeds of the step before and the step after. 0 where time or speed cannot tell: no
 * time, a clock that stands or ran back, or longer than `maxS`, in which the machine may have turned.
 */
export function drivableM(track: TimedTrack, { from, to, maxS }: { from: number; to: number; maxS: number }): number {
  const seconds = secondsBetween(track, from, to);
  if (!(seconds > 0 && seconds <= maxS)) return 0;
  const logged = larger(track.speedMps?.[from], track.speedMps?.[to]);
  const speedMps = logged ?? larger(impliedMps(track, from - 1, from), impliedMps(track, to, to + 1));
  return speedMps === undefined ? 0 : 1.5 * speedMps * seconds + 1;
}

function secondsBetween(track: TimedTrack, from: number, to: number): number {
  return (track.timeMs[to]! - track.timeMs[from]!) / 1000;
}

function impliedMps(track: TimedTrack, from: number, to: number): number {
  const seconds = secondsBetween(track, from, to);
  if (!(seconds > 0)) return NaN;
  return Math.hypot(track.eastM[to]! - track.eastM[from]!, track.northM[to]! - track.northM[from]!) / seconds;
}

/** The larger of two numbers that may be missing. */
function larger(a: number | undefined, b: number | undefined): number | undefined {
  const known = [a, b].filter((value) => value !== undefined && Number.isFinite(value)) as number[];
  return known.length > 0 ? Math.max(...known) : undefined;
}
