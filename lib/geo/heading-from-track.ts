import { RADIANS_PER_DEGREE, wrapDegrees } from "@/lib/geo/circular-mean";

/** A track in a metre plane; one entry a record. */
export interface Track {
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  speedMps: ArrayLike<number>;
  /** 1 where the track does not continue from the record before (a gap, a jump, the first record). */
  breaks: ArrayLike<number>;
}

/** Below this speed a heading from positions is noise: the last one is held. */
export const HOLD_HEADING_BELOW_MPS = 0.3;
/** Travel that one heading is taken over. */
const WINDOW_M = 4;

/**
 * Course over ground, degrees clockwise from north: the circular mean of the steps, weighted by their length, over a
 * window of 4 m of travel centred on the record (one-sided at the ends of a stretch). The last heading is held under
 * 0.3 m/s and where a position is missing; NaN before the first one known.
 */
export function headingFromTrack(track: Track): Float32Array {
  const headingDeg = new Float32Array(track.eastM.length).fill(NaN);
  for (let first = 0; first < headingDeg.length;) {
    let end = first + 1;
    while (end < headingDeg.length && track.breaks[end] !== 1) end++;
    fillStretch(track, moversOf(track, first, end), headingDeg);
    first = end;
  }
  holdLast(headingDeg);
  return headingDeg;
}

/** Records of a stretch that have a position and move: the only ones that say anything about direction. */
function moversOf(track: Track, first: number, end: number): number[] {
  const movers: number[] = [];
  for (let i = first; i < end; i++) {
    const slow = (track.speedMps[i] ?? NaN) < HOLD_HEADING_BELOW_MPS;
    if (!slow && Number.isFinite(track.eastM[i] ?? NaN)) movers.push(i);
  }
  return movers;
}

function fillStretch(track: Track, movers: number[], headingDeg: Float32Array): void {
  const travelled = new Float64Array(movers.length);
  for (let k = 1; k < movers.length; k++) travelled[k] = travelled[k - 1]! + stepM(track, movers[k - 1]!, movers[k]!);
  const lengthM = travelled[movers.length - 1] ?? 0;
  let back = 0;
  let ahead = 0;
  for (let k = 0; k < movers.length; k++) {
    const here = travelled[k]!;
    const from = Math.max(0, Math.min(here - WINDOW_M / 2, lengthM - WINDOW_M));
    const to = Math.min(lengthM, Math.max(here + WINDOW_M / 2, WINDOW_M));
    while (back + 1 < movers.length && travelled[back + 1]! <= from) back++;
    while (ahead + 1 < movers.length && travelled[ahead]! < to) ahead++;
    const course = courseDeg(track, movers[back]!, movers[ahead]!);
    headingDeg[movers[k]!] = course;
  }
}

function stepM(track: Track, from: number, to: number): number {
  return Math.hypot(track.eastM[to]! - track.eastM[from]!, track.northM[to]! - track.northM[from]!);
}

function courseDeg(track: Track, from: number, to: number): number {
  const east = track.eastM[to]! - track.eastM[from]!;
  const north = track.northM[to]! - track.northM[from]!;
  if (east === 0 && north === 0) return NaN;
  return wrapDegrees(Math.atan2(east, north) / RADIANS_PER_DEGREE);
}

/** Each NaN takes the value before it; NaN at the start stay. */
export function holdLast(values: Float32Array): void {
  for (let i = 1; i < values.length; i++) if (Number.isNaN(values[i]!)) values[i] = values[i - 1]!;
}
