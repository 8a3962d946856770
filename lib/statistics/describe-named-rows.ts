import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { RowStatistics, RowStatisticsItem } from "@/lib/statistics/row-statistics";
import { mapRowSeries, type RowSeries } from "@/lib/statistics/row-series";

/** Why no row of such a channel is ranked. */
const REASON = "Readings of this channel are names, not amounts: rows are compared by the share of distance in each.";

/**
 * Rows of a channel whose readings are names numbered from 1: the share of distance under each name, and none of the figures
 * that only amounts have.
 */
export function describeNamedRows(
  placed: PlacedLog,
  channel: ResolvedChannel,
  { distances, codeCount }: { distances: Float32Array; codeCount: number },
): RowStatistics {
  const items = mapRowSeries(placed, channel, distances, (series, row) => describeNamedRow(series, { row, codeCount }));
  return {
    channel: channel.id,
    readings: channel,
    unit: channel.unit,
    items,
    deviations: new Float64Array(items.length).fill(NaN),
    medianOfRows: NaN,
    wheelTrackRows: [],
    censoredShare: null,
    middles: null,
  };
}

function describeNamedRow(
  { values, weightsM }: RowSeries,
  { row, codeCount }: { row: number; codeCount: number },
): RowStatisticsItem {
  const metres = new Array<number>(codeCount).fill(0);
  let distanceM = 0;
  values.forEach((code, i) => {
    metres[code - 1]! += weightsM[i]!;
    distanceM += weightsM[i]!;
  });
  const none = { mean: null, sd: null, min: null, p05: null, p25: null, p50: null, p75: null, p95: null, max: null };
  return {
    row,
    n: values.length,
    distanceM,
    ...none,
    shareUnderTarget: null,
    shareAtLimit: null,
    shareContactLost: null,
    longestUnderTargetM: null,
    deviationZ: null,
    flagged: false,
    reason: REASON,
    ...(distanceM > 0 ? { classShares: metres.map((classM) => classM / distanceM) } : {}),
  };
}
