import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { MiddleReadings } from "@/lib/statistics/middle-readings";
import { deviationSeries, emptySeries, mapRowSeries, type RowSeries } from "@/lib/statistics/row-series";
import {
  atLimitFromN,
  contactLostShare,
  distanceShare,
  longestBelowM,
  longestStretch,
  underTargetBelowN,
} from "@/lib/statistics/row-shares";
import { selectQuantiles } from "@/lib/statistics/select-quantiles";
import { describeTally, tallyLost, tallyShare } from "@/lib/statistics/tally-figures";
import { mapRowTallies, type RowTally } from "@/lib/statistics/tally-rows";
import { weightedMoments } from "@/lib/statistics/weighted-moments";

/** What one row did by its own readings; every figure without a reading to it is NaN, a share without distance null. */
export interface RowFigures {
  n: number;
  distanceM: number;
  mean: number;
  sd: number;
  min: number;
  max: number;
  /** At `LEVELS`. */
  quantiles: number[];
  shareUnderTarget: number | null;
  shareAtLimit: number | null;
  shareContactLost: number | null;
  longestUnderTargetM: number | null;
  /** Weighted median of the deviations from the other rows. */
  typicalDeviation: number;
}

export const LEVELS = [0.05, 0.25, 0.5, 0.75, 0.95];

interface Given {
  distances: Float32Array;
  /** Null for a channel of the whole machine. */
  middles: MiddleReadings | null;
}

/** Figures of every row of a channel, row 1 first: from tallies of its values where it has few, else from its series. */
export function rowFigures(placed: PlacedLog, channel: ResolvedChannel, given: Given): RowFigures[] {
  const { distances, middles } = given;
  const tallied = middles && figuresByTally(placed, channel, { distances, middles });
  if (tallied) return tallied;
  const room = emptySeries(placed.log.records);
  return mapRowSeries(placed, channel, distances, (series) => ({
    ...figuresOfSeries(placed, channel, series),
    typicalDeviation: middles ? medianOf(deviationSeries(series, middles, room)) : NaN,
  }));
}

function figuresByTally(
  placed: PlacedLog,
  channel: ResolvedChannel,
  given: { distances: Float32Array; middles: MiddleReadings },
): RowFigures[] | null {
  const found = mapRowTallies(placed, channel, given, (tally) => figuresOfTally(placed, channel, tally));
  if (!found) return null;
  const under = underTargetBelowN(placed, channel);
  // The order along the pass is no matter of a tally.
  const longest = under === null ? null : longestBelowM(placed, channel, given.distances, under);
  const figures = found.map((one, row) => ({ ...one, longestUnderTargetM: longest && longest[row]! }));
  if (figures.every(isComplete)) return figures;
  const room = emptySeries(placed.log.records);
  return mapRowSeries(placed, channel, given.distances, (series, row) => ({
    ...figures[row - 1]!,
    typicalDeviation: medianOf(deviationSeries(series, given.middles, room)),
  }));
}

type TalliedFigures = Omit<RowFigures, "typicalDeviation"> & { typicalDeviation: number | null };

function isComplete(figures: TalliedFigures): figures is RowFigures {
  return figures.typicalDeviation !== null;
}

function longestUnderM(placed: PlacedLog, series: RowSeries, under: number): number {
  return longestStretch(placed, series, (value) => value < under)?.lengthM ?? 0;
}

function figuresOfTally(placed: PlacedLog, channel: ResolvedChannel, tally: RowTally): TalliedFigures {
  const under = underTargetBelowN(placed, channel);
  const limit = atLimitFromN(placed, channel);
  return {
    ...describeTally(tally, LEVELS),
    shareUnderTarget: under === null ? null : tallyShare(tally, (value) => value < under),
    shareAtLimit: limit === null ? null : tallyShare(tally, (value) => value >= limit),
    shareContactLost: tallyLost(tally, channel),
    longestUnderTargetM: null,
    typicalDeviation: tally.typicalDeviation,
  };
}

function figuresOfSeries(
  placed: PlacedLog,
  channel: ResolvedChannel,
  series: RowSeries,
): Omit<RowFigures, "typicalDeviation"> {
  const { values, weightsM } = series;
  const { min, max, weight, quantiles } = selectQuantiles(values, weightsM, LEVELS);
  const under = underTargetBelowN(placed, channel);
  const limit = atLimitFromN(placed, channel);
  return {
    n: values.length,
    distanceM: weight,
    ...weightedMoments(values, weightsM),
    min,
    max,
    quantiles,
    shareUnderTarget: under === null ? null : distanceShare(series, (value) => value < under),
    shareAtLimit: limit === null ? null : distanceShare(series, (value) => value >= limit),
    shareContactLost: contactLostShare(series, channel),
    longestUnderTargetM: under === null ? null : longestUnderM(placed, series, under),
  };
}

function medianOf({ values, weightsM }: RowSeries): number {
  return selectQuantiles(values, weightsM, [0.5]).quantiles[0] ?? NaN;
}
