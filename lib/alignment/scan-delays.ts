import { DELAY_SETTINGS as SET } from "@/lib/alignment/delay-settings";
import { delaySteps } from "@/lib/alignment/delay-steps";
import { correlationAt, fitDelay, matchAt, mostCompared, sumSides } from "@/lib/alignment/fit-delay";
import type { Lane } from "@/lib/alignment/lane-track";
import { measureMatches } from "@/lib/alignment/match-surface";
import type { PreparedTracks } from "@/lib/alignment/prepare-tracks";
import { readyLanes } from "@/lib/alignment/ready-lanes";
import type { DelayRefusal } from "@/lib/schemas/alignment";
import { median } from "@/lib/statistics/median";
import { MAD_TO_SD } from "@/lib/statistics/median-absolute-deviation";

/** All delays tried coarsely, on the rows that tell them apart best. */
export interface Scan {
  /** Share of the width whose rows are compared. */
  share: number;
  /** Steps of the grid by which the pattern lies askew; 0 where allowing for it gained nothing. */
  skew: number;
  bestS: number;
  isInside: boolean;
  /** 1 - least J / median J. */
  sharpness: number;
  curve: { delayS: number; j: number }[];
  /** Correlation of the passes at each delay of the curve. */
  correlations: number[];
}

const COARSE_S = delaySteps(SET.leastDelayS, SET.mostDelayS, SET.coarseStepS);
const MOST_ROUNDS = 4;

/** Scans all delays, and again with other ends left out until the answer stays. Null where nothing varies. */
export function scanDelays(prepared: PreparedTracks): Scan | null {
  let scan: Scan | null = null;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const assumedS: number = scan?.bestS ?? 0;
    const lanes = readyLanes(prepared, assumedS);
    const all = [...new Set(lanes.flatMap((ofTrack) => ofTrack.map((lane) => lane.share)))];
    const shares: number[] = scan ? [scan.share] : all;
    const scans: Scan[] = shares.flatMap((share) => scanShare(prepared, lanes, share) ?? []);
    scan = scans.reduce<Scan | null>((best, one) => (best && best.sharpness >= one.sharpness ? best : one), null);
    if (!scan || (round > 0 && Math.abs(scan.bestS - assumedS) <= 2 * SET.coarseStepS)) return scan;
  }
  return scan;
}

function scanShare(prepared: PreparedTracks, lanes: Lane[][], share: number): Scan | null {
  const { tracks, pairs, stepM } = prepared;
  const reach = Math.round(SET.mostSkewM / stepM);
  const surface = measureMatches({ tracks, lanes, pairs, share, delaysS: COARSE_S, stepM, lagReach: reach });
  const sums = sumSides(surface);
  const leastCount = Math.max(1, SET.leastGroundShare * mostCompared(sums, surface));
  const fitSkews = (from: number, to: number) =>
    fitDelay(sums, surface, { distanceSteps: 0, skewSteps: { from, to } }, leastCount);
  const straight = fitSkews(0, 0);
  const skewed = fitSkews(-reach, reach);
  if (!straight || !skewed) return null;
  const best = skewed.j < (1 - SET.skewGain) * straight.j ? skewed : straight;
  const skew = Math.round(best.skewM / stepM);
  const tried = COARSE_S.map((delayS, row) => ({
    delayS,
    j: matchAt(sums, surface, [row, skew, 0], leastCount),
    correlation: correlationAt(sums, surface, row, skew),
  })).filter(({ j }) => !Number.isNaN(j));
  const middle = median(tried.map(({ j }) => j));
  if (!(middle > 0)) return null;
  const least = tried.reduce((lowest, one, row) => (one.j < tried[lowest]!.j ? row : lowest), 0);
  return {
    share,
    skew,
    bestS: best.delayS,
    isInside: least > 0 && least < tried.length - 1,
    sharpness: 1 - tried[least]!.j / middle,
    curve: tried.map(({ delayS, j }) => ({ delayS, j })),
    correlations: tried.map(({ correlation }) => correlation),
  };
}

/** What speaks against the scan's answer; null for nothing. */
export function judgeScan(scan: Scan): DelayRefusal | null {
  const isChance = scan.sharpness < SET.surelyNoChance && dipInSds(scan) < SET.leastDipSds;
  if (1 - scan.sharpness > SET.flatAbove || isChance) return "flat";
  if (!scan.isInside) return "at-the-edge";
  if (isMirrored(scan)) return "mirrored";
  return hasOtherDip(scan) ? "two-answers" : null;
}

/** Depth of the dip against how unsteady J is from one delay to the next (robust, from second differences). */
function dipInSds({ curve }: Scan): number {
  const bends = curve.slice(2).map(({ j }, k) => Math.abs(curve[k]!.j - 2 * curve[k + 1]!.j + j));
  const unsteadiness = (MAD_TO_SD * median(bends)) / Math.sqrt(6);
  const js = curve.map(({ j }) => j);
  return (median(js) - Math.min(...js)) / unsteadiness;
}

function isMirrored({ correlations }: Scan): boolean {
  const most = Math.max(...correlations);
  return most < SET.agreesAnyway && -Math.min(...correlations) > SET.mirror.share * most - SET.mirror.less;
}

function hasOtherDip({ curve, bestS }: Scan): boolean {
  const middle = median(curve.map(({ j }) => j));
  const least = Math.min(...curve.map(({ j }) => j));
  return curve.some(({ delayS, j }, row) => {
    const isDip = j <= (curve[row - 1]?.j ?? Infinity) && j <= (curve[row + 1]?.j ?? Infinity);
    const isOther = Math.abs(delayS - bestS) >= SET.otherDipFromS;
    return isDip && isOther && middle - j > SET.otherDipShare * (middle - least);
  });
}
