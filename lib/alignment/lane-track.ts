import type { PlacedLog, Pass } from "@/lib/logs/placed-log";
import { FLAGS } from "@/lib/cleaning/flags";
import { median } from "@/lib/statistics/median";
import { RADIANS_PER_DEGREE, turnDegrees } from "@/lib/geo/circular-mean";

/** Rows that are averaged to one signal: all of them, or a share of the width beside the left or right neighbour. */
export interface Lane {
  /** Share of the implement's width. */
  share: number;
  /** Side of the axis it lies on; 0 for the whole width. */
  side: -1 | 0 | 1;
  /** Right of the pass's own line, along the axis. */
  offsetM: number;
  /** One value a record, free of each row's own mean where rows are averaged; NaN where nothing was logged. */
  values: Float64Array;
}

/** One pass as seen along an axis shared by all passes that run with or against it. */
export interface LaneTrack {
  pass: number;
  /** 1 where it runs along the axis, -1 against it. */
  sense: 1 | -1;
  /** Right of the plane's origin, looking along the axis. */
  acrossM: number;
  fromM: number;
  toM: number;
  /** Seconds since the pass began; never falling. */
  timeS: Float64Array;
  /** Along the axis, of the line of rows. */
  alongM: Float64Array;
  speedMps: Float64Array;
  /** Channel values of the records, row-major. */
  readings: Float64Array;
  rows: number;
  records: number;
}

export interface LaneChannel {
  rows: number;
  perRow: boolean;
  values: Float32Array;
}

const UNFIT =
  FLAGS.turning |
  FLAGS["standing-still"] |
  FLAGS["impossible-step"] |
  FLAGS["duplicate-time"] |
  FLAGS["time-backwards"];

/** Rows nearer than this to the line of rows are taken to stand on it. */
const SAME_RANK_M = 0.1;
/** How far a pass may stray sideways from its own line, metres, and still count as straight. */
const STRAIGHT_WITHIN_M = 1.5;

/**
 * A pass along an axis, or null where it is not straight or has too little to say. Rows of other ranks are moved to the
 * line of rows along the track.
 */
export function layAlongAxis(placed: PlacedLog, channel: LaneChannel, pass: Pass, axisDeg: number): LaneTrack | null {
  const kept = usableRecords(placed, pass);
  if (kept.length < 10) return null;
  const sin = Math.sin(axisDeg * RADIANS_PER_DEGREE);
  const cos = Math.cos(axisDeg * RADIANS_PER_DEGREE);
  const alongM = Float64Array.from(kept, (i) => placed.originEastM[i]! * sin + placed.originNorthM[i]! * cos);
  const across = Float64Array.from(kept, (i) => placed.originEastM[i]! * cos - placed.originNorthM[i]! * sin);
  const acrossM = median(across);
  if (median(across.map((value) => Math.abs(value - acrossM))) > STRAIGHT_WITHIN_M) return null;
  const timeS = spreadTimes(kept.map((i) => placed.log.timeMs[i]! / 1000));
  if (!timeS) return null;
  const { rows } = channel;
  const sense = Math.abs(turnDegrees(axisDeg, pass.headingDeg)) < 90 ? 1 : -1;
  const readings = new Float64Array(kept.length * rows);
  for (let row = 0; row < rows; row++) {
    const forwardM = channel.perRow ? (placed.geometry.forwardM[row] ?? 0) : 0;
    const moved = Math.abs(forwardM) > SAME_RANK_M ? recordsBehind(alongM, sense * forwardM, sense) : null;
    for (let at = 0; at < kept.length; at++) {
      const from = moved ? moved[at]! : at;
      readings[at * rows + row] = from < 0 ? NaN : channel.values[kept[from]! * rows + row]!;
    }
  }
  return {
    pass: pass.pass,
    sense,
    acrossM,
    fromM: alongM.reduce((least, value) => Math.min(least, value), Infinity),
    toM: alongM.reduce((most, value) => Math.max(most, value), -Infinity),
    timeS,
    alongM,
    speedMps: Float64Array.from(kept, (i) => placed.speedMps[i]!),
    readings,
    rows,
    records: kept.length,
  };
}

/** For each record the one at which a row so far ahead stood where the line of rows stands now; -1 where there is none. */
function recordsBehind(alongM: Float64Array, aheadM: number, sense: 1 | -1): Int32Array {
  const found = new Int32Array(alongM.length).fill(-1);
  let from = 0;
  for (let at = 0; at < alongM.length; at++) {
    const target = sense * (alongM[at]! - aheadM);
    while (from > 0 && sense * alongM[from]! > target) from--;
    while (from + 1 < alongM.length && sense * alongM[from + 1]! <= target) from++;
    const next = Math.min(from + 1, alongM.length - 1);
    const isNextNearer = Math.abs(sense * alongM[next]! - target) < Math.abs(sense * alongM[from]! - target);
    const nearest = isNextNearer ? next : from;
    const stepM = Math.abs(alongM[next]! - alongM[from]!) || 1;
    if (Math.abs(sense * alongM[nearest]! - target) <= stepM) found[at] = nearest;
  }
  return found;
}

function usableRecords(placed: PlacedLog, pass: Pass): number[] {
  const kept: number[] = [];
  for (let i = pass.first; i < pass.first + pass.records; i++) {
    const stands = placed.passOf[i] === pass.pass && Number.isFinite(placed.originEastM[i]!);
    if (stands && (placed.flags[i]! & UNFIT) === 0 && Number.isFinite(placed.log.timeMs[i]!)) kept.push(i);
  }
  return kept;
}

/** Seconds from the first, records of one time spread evenly up to the next; null where time does not run. */
function spreadTimes(seconds: number[]): Float64Array | null {
  const from = seconds[0]!;
  const times = Float64Array.from(seconds, (value) => value - from);
  let at = 0;
  let stepS = 0;
  while (at < times.length) {
    let next = at + 1;
    while (next < times.length && times[next]! <= times[at]!) next++;
    if (next < times.length) stepS = (times[next]! - times[at]!) / (next - at);
    else if (at === 0) return null;
    for (let k = at + 1; k < next; k++) times[k] = times[at]! + stepS * (k - at);
    at = next;
  }
  return times;
}
