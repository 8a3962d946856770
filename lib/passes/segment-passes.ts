import { axialDifferenceDeg, turnDegrees } from "@/lib/geo/circular-mean";
import { drivableM, longestStepS } from "@/lib/passes/drivable-distance";
import { median } from "@/lib/statistics/median";

/** One entry a record. */
export interface PassInput {
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  headingDeg: ArrayLike<number>;
  timeMs: ArrayLike<number>;
  /** As logged; NaN or null where the log has none. */
  speedMps: ArrayLike<number> | null;
  /** 1 where the record works and has a usable position. */
  works: ArrayLike<number>;
  /** Pass numbers as logged: a change starts a new pass. */
  loggedPass: ArrayLike<number> | null;
}

/** Records `first .. end - 1`; those in between that do not work belong to a drop-out that was bridged. */
export interface PassRange {
  first: number;
  end: number;
}

export interface PassRanges {
  ranges: PassRange[];
  /** 1 where the heading turns by more than 45 degrees within 15 m. */
  turning: Uint8Array;
}

export const PASS_RULES = {
  /** A lift or a silence longer than this ends a pass; a shorter one on the same line is bridged. */
  maxOffS: 2,
  /** Used for a lift when the log has no times. */
  maxOffM: 5,
  /** A jump longer than this, than `maxDistanceSteps` median steps and than the machine can have driven ends a pass. */
  maxDistanceM: 3,
  maxDistanceSteps: 3,
  sameLineDeg: 20,
  turnDeg: 45,
  turnWithinM: 15,
} as const;

interface Limits {
  gapS: number;
  gapM: number;
}

/**
 * Splits a track into passes: a lift over 2 s, a time gap over three median steps (and 2 s), a jump over 3 m, three
 * median steps and (where times are known) 1.5 v dt + 1 m, a change of the logged pass number, or a turn of more than 45 degrees within 15 m. A drop-out under 2 s on
 * the same line is bridged. Turns driven with the machine down are cut where half of each 180 degrees is done.
 */
export function segmentPasses(input: PassInput): PassRanges {
  const runs = workingRuns(input, measureLimits(input));
  const turning = new Uint8Array(input.works.length);
  const ranges = runs.flatMap((run) => cutTurns(input, run, turning));
  return { ranges, turning };
}

function stepM(input: PassInput, from: number, to: number): number {
  return Math.hypot(input.eastM[to]! - input.eastM[from]!, input.northM[to]! - input.northM[from]!);
}

function measureLimits(input: PassInput): Limits {
  const steps: number[] = [];
  for (let i = 1; i < input.works.length; i++) {
    if (input.works[i] !== 1 || input.works[i - 1] !== 1) continue;
    const step = stepM(input, i - 1, i);
    if (step > 0) steps.push(step);
  }
  const usualM = steps.length > 0 ? median(steps) : 0;
  return {
    gapS: longestStepS(input.timeMs),
    gapM: Math.max(PASS_RULES.maxDistanceM, PASS_RULES.maxDistanceSteps * usualM),
  };
}

function workingRuns(input: PassInput, limits: Limits): PassRange[] {
  const runs: PassRange[] = [];
  let open: PassRange | null = null;
  // The latest time of the open pass, so that one record with a wrong clock does not cut it.
  let latestMs = NaN;
  for (let i = 0; i < input.works.length; i++) {
    if (input.works[i] !== 1) continue;
    const seconds = (input.timeMs[i]! - latestMs) / 1000;
    if (open && continues(input, limits, { from: open.end - 1, to: i, seconds })) {
      open.end = i + 1;
      if (!(input.timeMs[i]! <= latestMs)) latestMs = Number.isNaN(input.timeMs[i]!) ? latestMs : input.timeMs[i]!;
    } else {
      open = { first: i, end: i + 1 };
      latestMs = input.timeMs[i]!;
      runs.push(open);
    }
  }
  return runs;
}

interface Step {
  /** The last working record of the pass so far, and the one that may carry it on. */
  from: number;
  to: number;
  /** Since the latest time of the pass; NaN without times, below 0 where the clock ran back: distance decides then. */
  seconds: number;
}

/** True where working record `to` carries on the pass. */
function continues(input: PassInput, limits: Limits, { from, to, seconds }: Step): boolean {
  if (input.loggedPass && input.loggedPass[from] !== input.loggedPass[to]) return false;
  const metres = stepM(input, from, to);
  const offRecords = to - from - 1;
  const driven = () => metres <= drivableM(input, { from, to, maxS: limits.gapS });
  if (offRecords === 0) return !(seconds > limits.gapS) && (metres <= limits.gapM || driven());
  const sameLine = axialDifferenceDeg(input.headingDeg[from]!, input.headingDeg[to]!) <= PASS_RULES.sameLineDeg;
  const offSeconds = seconds * (offRecords / (offRecords + 1));
  const short = !(seconds >= 0) ? metres <= PASS_RULES.maxOffM : offSeconds < PASS_RULES.maxOffS;
  const reachM = Math.max(limits.gapM, (limits.gapM / PASS_RULES.maxDistanceSteps) * (offRecords + 2));
  return short && sameLine && (metres <= reachM || driven());
}

/** Marks the turning records of a run and cuts it in the middle of each half turn. */
function cutTurns(input: PassInput, run: PassRange, turning: Uint8Array): PassRange[] {
  markTurning(input, run, turning);
  const pieces: PassRange[] = [];
  let first = run.first;
  for (let i = run.first; i < run.end;) {
    if (turning[i] !== 1) {
      i++;
      continue;
    }
    let end = i + 1;
    while (end < run.end && turning[end] === 1) end++;
    for (const cut of halfTurns(input, i, end)) {
      pieces.push({ first, end: cut });
      first = cut;
    }
    i = end;
  }
  pieces.push({ first, end: run.end });
  return pieces.filter((piece) => piece.end > piece.first);
}

function markTurning(input: PassInput, run: PassRange, turning: Uint8Array): void {
  const members: number[] = [];
  for (let i = run.first; i < run.end; i++) if (input.works[i] === 1) members.push(i);
  const travelled = new Float64Array(members.length);
  for (let k = 1; k < members.length; k++)
    travelled[k] = travelled[k - 1]! + stepM(input, members[k - 1]!, members[k]!);
  let back = 0;
  let ahead = 0;
  for (let k = 0; k < members.length; k++) {
    while (travelled[k]! - travelled[back]! > PASS_RULES.turnWithinM / 2) back++;
    while (ahead + 1 < members.length && travelled[ahead + 1]! - travelled[k]! <= PASS_RULES.turnWithinM / 2) ahead++;
    const turn = turnDegrees(input.headingDeg[members[back]!]!, input.headingDeg[members[ahead]!]!);
    if (Math.abs(turn) > PASS_RULES.turnDeg) turning[members[k]!] = 1;
  }
}

/** Records at which a turning stretch is cut: one for every 180 degrees turned, evenly spaced by heading. */
function halfTurns(input: PassInput, first: number, end: number): number[] {
  const turned: number[] = [0];
  for (let i = first + 1; i < end; i++) {
    const step = input.works[i] === 1 ? turnDegrees(input.headingDeg[i - 1]!, input.headingDeg[i]!) : 0;
    turned.push(turned[turned.length - 1]! + (Number.isNaN(step) ? 0 : step));
  }
  const total = Math.abs(turned[turned.length - 1]!);
  const count = Math.max(1, Math.round(total / 180));
  const cuts = Array.from({ length: count }, (_, k) => {
    const wanted = (total * (k + 0.5)) / count;
    const at = turned.findIndex((value) => Math.abs(value) >= wanted);
    return first + Math.max(1, at);
  });
  return [...new Set(cuts)].filter((cut) => cut < end);
}
