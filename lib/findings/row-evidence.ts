import { resolveChannel, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { median } from "@/lib/statistics/median";
import { deviationFromOthers } from "@/lib/statistics/row-deviation";
import { rowSeries } from "@/lib/statistics/row-series";
import { distanceShare } from "@/lib/statistics/row-shares";
import { rowStatistics, type RowStatistics } from "@/lib/statistics/row-statistics";

/** All that the verdict needs of one per-row channel. */
export interface ChannelEvidence {
  channel: ResolvedChannel;
  statistics: RowStatistics;
}

/** Statistics of a per-row channel in newtons (or of contact); null where the log has it only for the whole machine or not at all. */
export function channelEvidence(
  placed: PlacedLog,
  id: string,
  given: { distances: Float32Array; statistics?: ReadonlyMap<string, RowStatistics> },
): ChannelEvidence | null {
  const channel = resolveChannel(placed, id);
  if (!channel || !channel.perRow) return null;
  return { channel, statistics: given.statistics?.get(id) ?? rowStatistics(placed, id, given) };
}

export interface RowStep {
  deviation: number;
  /** Share of the row's distance on which it differed from the others the same way. */
  shareSameWay: number;
  /** Typical deviation in each pass, for the interval. */
  byPass: number[];
}

/** How far a row (from 1) stands from the others, how constantly, and pass by pass. */
export function rowStep(
  { placed, distances }: { placed: PlacedLog; distances: Float32Array },
  evidence: ChannelEvidence,
  row: number,
): RowStep {
  const deviation = evidence.statistics.deviations[row - 1]!;
  const values = deviationFromOthers(evidence.channel.values, evidence.channel.rows);
  const series = rowSeries(placed, { values, rows: evidence.channel.rows }, distances, row - 1);
  const sameWay = (value: number) => (deviation < 0 ? value < 0 : value > 0);
  const readings = new Map<number, number[]>();
  series.records.forEach((record, k) => {
    const pass = placed.passOf[record]!;
    const list = readings.get(pass) ?? [];
    list.push(series.values[k]!);
    readings.set(pass, list);
  });
  const byPass = [...readings.values()].filter((list) => list.length >= 10).map((list) => median(list));
  return { deviation, shareSameWay: distanceShare(series, sameWay) ?? 0, byPass };
}
