import { DELAY_SETTINGS as SET } from "@/lib/alignment/delay-settings";
import { delaySteps } from "@/lib/alignment/delay-steps";
import { fitDelay, mostCompared, sumSides, type DelayFit, type FitFreedom } from "@/lib/alignment/fit-delay";
import { measureMatches, type MatchSurface } from "@/lib/alignment/match-surface";
import { prepareTracks, type PreparedTracks } from "@/lib/alignment/prepare-tracks";
import { readyLanes } from "@/lib/alignment/ready-lanes";
import { resamplePairs, type ResampledFit } from "@/lib/alignment/resample-pairs";
import { judgeScan, scanDelays, type Scan } from "@/lib/alignment/scan-delays";
import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { DelayRefusal } from "@/lib/schemas/alignment";
import { quantileType7, sortFinite } from "@/lib/statistics/quantile";

export interface DelayEstimate {
  state: "estimated" | "refused";
  refusal: DelayRefusal | null;
  delayS: number | null;
  delayIntervalS: [number, number] | null;
  distanceM: number | null;
  distanceIntervalM: [number, number] | null;
  shiftM: number | null;
  shiftIntervalM: [number, number] | null;
  separable: boolean;
  usualSpeedMps: number | null;
  pairs: number;
  sharpness: number | null;
  curve: { delayS: number; j: number }[];
  /** Share of the width whose rows were compared; 1 for all of it. */
  share: number | null;
  usedPasses: number;
  /** Passes left out because there were more than need be. */
  leftOut: number;
}

/** The figures of a delay that is not known, or not known yet. */
export const UNKNOWN_DELAY = {
  delayS: null,
  delayIntervalS: null,
  distanceM: null,
  distanceIntervalM: null,
  shiftM: null,
  shiftIntervalM: null,
  separable: false,
  usualSpeedMps: null,
  pairs: 0,
  sharpness: null,
  curve: [],
} satisfies Partial<DelayEstimate>;

const NOTHING: DelayEstimate = {
  ...UNKNOWN_DELAY,
  state: "refused",
  refusal: null,
  share: null,
  usedPasses: 0,
  leftOut: 0,
};

/**
 * How late a channel is written down, from neighbouring passes driven in opposite directions: what lies on the ground is
 * displaced forward in both, so the delay that makes them agree is the true one (time-lag method, e.g. Chung, Sudduth &
 * Drummond 2002, Trans. ASAE 45(4)). Refused with a reason where the log cannot tell. Same log, same answer.
 */
export function estimateDelay(placed: PlacedLog, channel: ResolvedChannel): DelayEstimate {
  const prepared = prepareTracks(placed, channel);
  const { pairs, tracks } = prepared;
  const usedPasses = new Set(pairs.flatMap(({ forward, backward }) => [forward, backward])).size;
  const base = { ...NOTHING, pairs: pairs.length, usedPasses, leftOut: prepared.leftOut };
  if (tracks.length === 0 && placed.passes.length > 0) return { ...base, refusal: whyNoTracks(placed) };
  if (pairs.length < SET.leastPairs) return { ...base, refusal: "few-pairs" };
  const ofSide = (side: number) => pairs.filter((pair) => pair.side === side).length;
  if (Math.min(ofSide(1), ofSide(-1)) < SET.leastPairsOfASide) return { ...base, refusal: "one-sided-pairs" };
  const scan = scanDelays(prepared);
  if (!scan) return { ...base, refusal: "nothing-varies" };
  const known = { ...base, curve: scan.curve, sharpness: scan.sharpness, share: scan.share };
  const refusal = judgeScan(scan);
  if (refusal) return { ...known, refusal };
  return { ...known, ...fineEstimate(prepared, scan) };
}

function whyNoTracks(placed: PlacedLog): DelayRefusal {
  return placed.log.timeMs.some(Number.isFinite) ? "few-pairs" : "no-times";
}

/** The fine search about the scan's answer, with its intervals. */
function fineEstimate(prepared: PreparedTracks, scan: Scan): Partial<DelayEstimate> {
  const { tracks, pairs, stepM } = prepared;
  const lanes = readyLanes(prepared, scan.bestS);
  const delaysS = delaySteps(scan.bestS - SET.fineReachS, scan.bestS + SET.fineReachS, SET.fineStepS);
  const distanceSteps = Math.round(SET.mostDistanceM / stepM);
  const lagReach = 2 * distanceSteps + Math.abs(scan.skew) + 2;
  const surface = measureMatches({ tracks, lanes, pairs, share: scan.share, delaysS, stepM, lagReach });
  const { usualMps, spread } = describeSpeeds(prepared);
  const skewSteps = scan.skew === 0 ? { from: 0, to: 0 } : { from: scan.skew - 2, to: scan.skew + 2 };
  const sum = fitWith(surface, { distanceSteps: 0, skewSteps }, usualMps);
  if (!sum) return { refusal: "too-wide" };
  const both = spread >= SET.leastSpeedSpread ? fitWith(surface, { distanceSteps, skewSteps }, usualMps) : null;
  const isSeparable = both !== null && 2 * both.spread.delayS.halfWidth <= SET.widestIntervalS;
  const { fit, spread: known } = isSeparable ? both : sum;
  if (2 * known.delayS.halfWidth > SET.widestIntervalS) return { refusal: "too-wide", usualSpeedMps: usualMps };
  const shiftM = fit.distanceM + usualMps * fit.delayS;
  const about = (value: number, half: number): [number, number] => [value - half, value + half];
  return {
    state: "estimated",
    delayS: fit.delayS,
    delayIntervalS: about(fit.delayS, known.delayS.halfWidth),
    distanceM: isSeparable ? fit.distanceM : null,
    distanceIntervalM: isSeparable ? about(fit.distanceM, known.distanceM.halfWidth) : null,
    shiftM,
    shiftIntervalM: about(shiftM, known.shiftM.halfWidth),
    separable: isSeparable,
    usualSpeedMps: usualMps,
  };
}

function fitWith(
  surface: MatchSurface,
  freedom: FitFreedom,
  usualSpeedMps: number,
): { fit: DelayFit; spread: ResampledFit } | null {
  const sums = sumSides(surface);
  const leastCount = Math.max(1, SET.leastGroundShare * mostCompared(sums, surface));
  const fit = fitDelay(sums, surface, freedom, leastCount);
  if (!fit?.isInside) return null;
  const spread = resamplePairs(surface, {
    resamples: SET.resamples,
    usualSpeedMps,
    fit: (drawn) => fitDelay(drawn, surface, freedom, leastCount / 2),
  });
  return spread && { fit, spread };
}

/** The usual speed of the compared passes, and how far speeds differ: p95 - p05 as a share of it. */
function describeSpeeds({ tracks, pairs }: PreparedTracks): { usualMps: number; spread: number } {
  const used = new Set(pairs.flatMap(({ forward, backward }) => [forward, backward]));
  const speeds = sortFinite([...used].flatMap((index) => [...tracks[index]!.speedMps]));
  const usualMps = quantileType7(speeds, 0.5);
  return { usualMps, spread: (quantileType7(speeds, 0.95) - quantileType7(speeds, 0.05)) / usualMps };
}
