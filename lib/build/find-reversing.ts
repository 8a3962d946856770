import { RADIANS_PER_DEGREE, turnDegrees } from "@/lib/geo/circular-mean";
import { HOLD_HEADING_BELOW_MPS } from "@/lib/geo/heading-from-track";
import { longestStepS } from "@/lib/passes/drivable-distance";

/** One entry a record. */
export interface ReversingInput {
  eastM: ArrayLike<number>;
  northM: ArrayLike<number>;
  speedMps: ArrayLike<number>;
  timeMs: ArrayLike<number>;
  /** 1 where the record works: machines work going forward. */
  works: ArrayLike<number>;
  /** 1 where the track does not continue from the record before. */
  breaks: ArrayLike<number>;
}

export interface Reversing {
  /** 1 from where the machine begins to run backwards to where it stops doing so. */
  backwards: Uint8Array;
  /** 1 at the first record of each change between forwards and backwards. */
  cusps: Uint8Array;
}

const RULES = {
  /** The way is looked at over this distance before and after; no machine turns by 135 degrees within twice of it. */
  chordM: 2,
  flipDeg: 135,
  /** With longer steps a turn and a change of gear look alike. */
  longestStepM: 3,
  /** A shorter run the other way is a wandering position. */
  leastM: 1,
};

/**
 * Finds where a machine reverses by its manoeuvre: the way it moves flips by 135 degrees or more within 2 m, without a turn.
 * Between such cusps it runs forwards and backwards by turns; forwards is the sense in which it works the greater distance
 * (travels, where it does not work) between two breaks of the track. Nothing is claimed over longer steps or silences.
 */
export function findReversing(input: ReversingInput): Reversing {
  const records = input.eastM.length;
  const found = { backwards: new Uint8Array(records), cusps: new Uint8Array(records) };
  const maxS = longestStepS(input.timeMs);
  let movers: number[] = [];
  for (let i = 0; i <= records; i++) {
    const moves = i < records && Number.isFinite(input.eastM[i]!) && !(input.speedMps[i]! < HOLD_HEADING_BELOW_MPS);
    const isCut = i === records || input.breaks[i] === 1 || (moves && isSilent(input, movers.at(-1), i, maxS));
    if (isCut && movers.length > 0) {
      markStretch(input, movers, found);
      movers = [];
    }
    if (moves) movers.push(i);
  }
  return found;
}

/** True where the machine was out of sight between two records; standing still in sight is no silence. */
// kernel: hot, so positional
function isSilent({ timeMs }: ReversingInput, from: number | undefined, to: number, maxS: number): boolean {
  if (from === undefined) return false;
  for (let i = from + 1; i <= to; i++) if ((timeMs[i]! - timeMs[i - 1]!) / 1000 > maxS) return true;
  return false;
}

function markStretch(input: ReversingInput, movers: readonly number[], { backwards, cusps }: Reversing): void {
  const cuts = findCusps(input, movers);
  if (cuts.length === 0) return;
  const runs = [0, ...cuts].map((from, k) => ({ from, end: cuts[k] ?? movers.length }));
  const weights = runs.map((run) => weigh(input, movers, run));
  if (weights.some((weight) => weight.travelledM < RULES.leastM)) return;
  const sum = (parity: number, key: "workedM" | "travelledM") =>
    weights.reduce((all, weight, k) => all + (k % 2 === parity ? weight[key] : 0), 0);
  const key = sum(0, "workedM") === sum(1, "workedM") ? "travelledM" : "workedM";
  const reverse = sum(0, key) >= sum(1, key) ? 1 : 0;
  runs.forEach(({ from, end }, k) => {
    if (k > 0) cusps[movers[from]!] = 1;
    if (k % 2 === reverse) backwards.fill(1, movers[from]!, movers[end - 1]! + 1);
  });
}

/** Places in `movers` at which the way flips. */
function findCusps(input: ReversingInput, movers: readonly number[]): number[] {
  const cusps: number[] = [];
  for (let k = 1; k + 1 < movers.length; k++) {
    // Cheap first: the steps on either side must oppose each other.
    const before = step(input, movers[k - 1]!, movers[k]!);
    const after = step(input, movers[k]!, movers[k + 1]!);
    if (before.east * after.east + before.north * after.north >= 0) continue;
    const from = walk(input, movers, k, -1);
    const to = walk(input, movers, k, 1);
    if (from === null || to === null) continue;
    const inDeg = courseDeg(step(input, movers[from]!, movers[k]!));
    const outDeg = courseDeg(step(input, movers[k]!, movers[to]!));
    if (Math.abs(turnDegrees(inDeg, outDeg)) < RULES.flipDeg) continue;
    cusps.push(k + 1);
    k = to - 1;
  }
  return cusps;
}

/** The mover `chordM` of travel away; the last one before the end of the stretch; null over too long a step. */
// kernel: hot, so positional
function walk(input: ReversingInput, movers: readonly number[], k: number, direction: 1 | -1): number | null {
  let travelledM = 0;
  let at = k;
  while (travelledM < RULES.chordM && movers[at + direction] !== undefined) {
    const { lengthM } = step(input, movers[at]!, movers[at + direction]!);
    if (lengthM > RULES.longestStepM) return null;
    travelledM += lengthM;
    at += direction;
  }
  return travelledM >= RULES.leastM ? at : null;
}

function weigh(
  input: ReversingInput,
  movers: readonly number[],
  { from, end }: { from: number; end: number },
): { travelledM: number; workedM: number } {
  let [travelledM, workedM] = [0, 0];
  for (let k = Math.max(1, from); k < end; k++) {
    const { lengthM } = step(input, movers[k - 1]!, movers[k]!);
    travelledM += lengthM;
    if (input.works[movers[k]!] === 1) workedM += lengthM;
  }
  return { travelledM, workedM };
}

function step({ eastM, northM }: ReversingInput, from: number, to: number) {
  const [east, north] = [eastM[to]! - eastM[from]!, northM[to]! - northM[from]!];
  return { east, north, lengthM: Math.hypot(east, north) };
}

function courseDeg({ east, north }: { east: number; north: number }): number {
  return Math.atan2(east, north) / RADIANS_PER_DEGREE;
}
