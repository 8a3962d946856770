import { quantileType7 } from "@/lib/statistics/quantile";

/** What the flag rules need to know about a track, one entry a record. */
export interface StepInput {
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  timeMs: ArrayLike<number>;
  /** As logged; NaN or null where the log has none. */
  speedMps: ArrayLike<number> | null;
}

/** A new place is believed once this many records in a row agree about it: then it was a move, not a jump. */
const AGREEING_RECORDS = 5;

/** Median seconds between records that have a later time than the one before; NaN without times. */
export function medianStepSeconds(timeMs: ArrayLike<number>): number {
  const steps: number[] = [];
  for (let i = 1; i < timeMs.length; i++) {
    const step = (timeMs[i]! - timeMs[i - 1]!) / 1000;
    if (step > 0) steps.push(step);
  }
  return steps.length === 0 ? NaN : quantileType7(Float64Array.from(steps).sort(), 0.5);
}

/** Speed to expect where none is logged: the 95th percentile of step over time, so that a few jumps do not set it. */
function usualSpeedMps(input: StepInput, medianDtS: number): number {
  const speeds: number[] = [];
  for (let i = 1; i < input.eastM.length; i++) {
    const step = distanceM(input, i - 1, i);
    const dt = (input.timeMs[i]! - input.timeMs[i - 1]!) / 1000;
    const speed = step / (dt > 0 ? dt : medianDtS);
    if (Number.isFinite(speed)) speeds.push(speed);
  }
  return speeds.length === 0 ? NaN : quantileType7(Float64Array.from(speeds).sort(), 0.95);
}

function distanceM(input: StepInput, from: number, to: number): number {
  return Math.hypot(input.eastM[to]! - input.eastM[from]!, input.northM[to]! - input.northM[from]!);
}

/**
 * Marks records whose position cannot be reached from the last good one: step > 1.5 v dt + 1 m. Five or more records that
 * agree about a new place were a move (a log without the turns), and are not marked.
 */
export function markImpossibleSteps(input: StepInput): Uint8Array {
  const marks = new Uint8Array(input.eastM.length);
  const medianDtS = medianStepSeconds(input.timeMs);
  const usual = usualSpeedMps(input, medianDtS);
  const reach = (from: number, to: number) => {
    const dt = (input.timeMs[to]! - input.timeMs[from]!) / 1000;
    const seconds = dt > 0 ? dt : Number.isFinite(medianDtS) ? medianDtS * Math.max(1, to - from) : NaN;
    const logged = Math.max(input.speedMps?.[from] ?? NaN, input.speedMps?.[to] ?? NaN);
    const speed = Number.isFinite(logged) ? Math.max(logged, 0.5) : usual;
    const allowed = 1.5 * speed * seconds + 1;
    return Number.isFinite(allowed) ? distanceM(input, from, to) <= allowed : true;
  };
  let good: number[] = [];
  let doubtful: number[] = [];
  for (let i = 0; i < marks.length; i++) {
    if (!Number.isFinite(input.eastM[i]!)) continue;
    const last = good[good.length - 1];
    if (last === undefined || reach(last, i)) {
      for (const jump of doubtful) marks[jump] = 1;
      doubtful = [];
      good = good.length >= AGREEING_RECORDS ? [...good.slice(1), i] : [...good, i];
      continue;
    }
    const before = doubtful[doubtful.length - 1];
    if (before !== undefined && !reach(before, i)) {
      for (const jump of doubtful) marks[jump] = 1;
      doubtful = [];
    }
    doubtful.push(i);
    if (doubtful.length < AGREEING_RECORDS) continue;
    if (good.length < AGREEING_RECORDS) for (const stray of good) marks[stray] = 1;
    good = doubtful;
    doubtful = [];
  }
  for (const jump of doubtful) marks[jump] = 1;
  return marks;
}
