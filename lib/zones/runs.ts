import { classOf, hysteresisOf, nextClass } from "@/lib/zones/classify";
import { mergeShortRuns } from "@/lib/zones/merge-short-runs";
import type { RowTrack } from "@/lib/zones/row-track";
import { smoothTrack } from "@/lib/zones/smooth-track";

/** Steps `first .. last` of a row's track in one class. */
export interface ClassRun {
  class: number;
  first: number;
  last: number;
  lengthM: number;
}

export interface RunOptions {
  /** Ascending class edges. */
  breaks: readonly number[];
  /** 0: the plain runs of consecutive readings in one class. Else runs after smoothing, hysteresis and merging up to this length. */
  minLengthM: number;
  /** Classes are names: nothing is smoothed between them, and a short run goes to its longer neighbour. */
  isNamed?: boolean;
}

/** Missing readings over less than this take the class about them; a longer silence ends a run. */
const BRIDGE_MISSING_M = 2;

/** Splits a row's track into runs of one class. Missing readings belong to no class. */
export function classRuns(track: RowTrack, { breaks, minLengthM, isNamed = false }: RunOptions): ClassRun[] {
  if (minLengthM <= 0)
    return collectRuns(
      track,
      Array.from(track.values, (value) => plainClass(value, breaks)),
    );
  const smoothed = isNamed ? bridged(track.values) : smoothTrack(track.values, track.lengthsM, minLengthM / 2);
  const missing = longSilences(track);
  const hysteresis = isNamed ? 0 : hysteresisOf(breaks);
  let current: number | null = null;
  const classes = Array.from(smoothed, (value, i) => {
    current = missing[i] === 1 || Number.isNaN(value) ? null : nextClass(current, value, breaks, hysteresis);
    return current;
  });
  return mergeShortRuns(collectRuns(track, classes), { minLengthM, isNamed });
}

/** Values with missing ones like the one before. */
function bridged(values: Float64Array): Float64Array {
  let last = NaN;
  return values.map((value) => (last = Number.isNaN(value) ? last : value));
}

function plainClass(value: number, breaks: readonly number[]): number | null {
  return Number.isNaN(value) ? null : classOf(value, breaks);
}

function longSilences({ values, lengthsM }: RowTrack): Uint8Array {
  const silent = new Uint8Array(values.length);
  for (let i = 0; i < values.length;) {
    let end = i;
    let metres = 0;
    while (end < values.length && Number.isNaN(values[end]!)) metres += lengthsM[end++]!;
    if (metres >= BRIDGE_MISSING_M || i === 0 || end === values.length) silent.fill(1, i, end);
    i = Math.max(end, i + 1);
  }
  return silent;
}

function collectRuns(track: RowTrack, classes: (number | null)[]): ClassRun[] {
  const runs: ClassRun[] = [];
  classes.forEach((kind, i) => {
    if (kind === null) return;
    const open = runs[runs.length - 1];
    const lengthM = track.lengthsM[i]!;
    if (open && open.class === kind && open.last === i - 1) {
      open.last = i;
      open.lengthM += lengthM;
    } else runs.push({ class: kind, first: i, last: i, lengthM });
  });
  return runs;
}
