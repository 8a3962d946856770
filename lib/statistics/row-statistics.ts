import { resolveChannelOrReason, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import { AppError } from "@/lib/errors";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { describeNamedRows } from "@/lib/statistics/describe-named-rows";
import { median } from "@/lib/statistics/median";
import { middleReadings, type MiddleReadings } from "@/lib/statistics/middle-readings";
import { scoreRows, Z_LIMIT, type RowScores } from "@/lib/statistics/row-deviation";
import { rowReason } from "@/lib/statistics/row-reason";
import { rowFigures, type RowFigures } from "@/lib/statistics/row-figures";

/** What one row did over a log. Every mean, sd, quantile and share is weighted by the distance the row travelled. */
export interface RowStatisticsItem {
  row: number;
  n: number;
  /** Distance for which the row has readings. */
  distanceM: number;
  mean: number | null;
  sd: number | null;
  min: number | null;
  p05: number | null;
  p25: number | null;
  p50: number | null;
  p75: number | null;
  p95: number | null;
  max: number | null;
  shareUnderTarget: number | null;
  shareAtLimit: number | null;
  shareContactLost: number | null;
  longestUnderTargetM: number | null;
  deviationZ: number | null;
  flagged: boolean;
  reason: string | null;
  /** Of a channel of names: share of distance under each, by rising code from 1. */
  classShares?: number[];
}

export interface RowStatistics {
  channel: string;
  /** What was described. */
  readings: ResolvedChannel;
  unit: string;
  items: RowStatisticsItem[];
  /** Typical deviation of each row from the others less the median over rows, in the unit; NaN where unknown. */
  deviations: Float64Array;
  /** Median over rows of the rows' medians: what 5 % is taken of. */
  medianOfRows: number;
  wheelTrackRows: number[];
  censoredShare: number | null;
  /** What the rows were compared with at each record; null for a channel of the whole machine. */
  middles: MiddleReadings | null;
}

/** A row is flagged only where it is also this much of the median of all rows away from them. */
export const FLAG_DEVIATION_SHARE = 0.05;

/**
 * Statistics of every row in one channel, row 1 first; one item for a channel logged once for the whole machine.
 * @throws AppError unprocessable where the log cannot give the channel.
 */
export function rowStatistics(
  placed: PlacedLog,
  channelId: string,
  options: { distances?: Float32Array } = {},
): RowStatistics {
  const resolved = resolveChannelOrReason(placed, channelId);
  if (!resolved.ok) throw new AppError("unprocessable", resolved.error, { detailCode: "channel_not_available" });
  return describeRows(placed, resolved.value, options.distances ?? rowDistances(placed));
}

/**
 * The same of a channel that stands already, with the distances of `rowDistances`. `deviationZ` is the robust score of
 * `scoreRows`; a row is flagged where it exceeds 3.5 either way and the deviation is more than 5 % of the median of all rows.
 */
export function describeRows(placed: PlacedLog, channel: ResolvedChannel, distances: Float32Array): RowStatistics {
  const { codeCount } = channel;
  if (codeCount) return describeNamedRows(placed, channel, { distances, codeCount });
  const middles = channel.perRow ? middleReadings(channel.values, channel.rows) : null;
  const figures = rowFigures(placed, channel, { distances, middles });
  const described = figures.map(describeFigures);
  const scores = scoreRows(
    figures.map((one) => one.typicalDeviation),
    { maxTrackRows: Math.max(2, Math.floor(WHEEL_WIDTH_M / placed.geometry.widthM[0]!)) },
  );
  const medianOfRows = median(described.map((item) => item.p50 ?? NaN));
  const flagged = described.map((_, row) => isFlagged(scores, row, medianOfRows));
  const items = described.map((item, row) => ({
    ...item,
    deviationZ: scores.z[row] ?? null,
    flagged: flagged[row]!,
    reason: rowReason({ scores, row, flagged, medianOfRows, unit: channel.unit }),
  }));
  const { wheelTrackRows, deviation: deviations } = scores;
  const { censoredShare } = channel;
  const ofChannel = { channel: channel.id, readings: channel, unit: channel.unit, censoredShare };
  return { ...ofChannel, items, deviations, medianOfRows, wheelTrackRows, middles };
}

function isFlagged(scores: RowScores, row: number, medianOfRows: number): boolean {
  const z = scores.z[row] ?? null;
  const large = Math.abs(scores.deviation[row]!) > FLAG_DEVIATION_SHARE * Math.abs(medianOfRows);
  return z !== null && Math.abs(z) > Z_LIMIT && large;
}

/** A tractor's wheel or belt is at most about this wide. Common practice, no source. */
const WHEEL_WIDTH_M = 1;

type Described = Omit<RowStatisticsItem, "deviationZ" | "flagged" | "reason">;

function describeFigures({ quantiles, typicalDeviation: _, ...figures }: RowFigures, index: number): Described {
  const at = (k: number) => finiteOrNull(quantiles[k] ?? NaN);
  return {
    row: index + 1,
    n: figures.n,
    distanceM: figures.distanceM,
    mean: finiteOrNull(figures.mean),
    sd: finiteOrNull(figures.sd),
    min: finiteOrNull(figures.min),
    p05: at(0),
    p25: at(1),
    p50: at(2),
    p75: at(3),
    p95: at(4),
    max: finiteOrNull(figures.max),
    shareUnderTarget: figures.shareUnderTarget,
    shareAtLimit: figures.shareAtLimit,
    shareContactLost: figures.shareContactLost,
    longestUnderTargetM: figures.longestUnderTargetM,
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
