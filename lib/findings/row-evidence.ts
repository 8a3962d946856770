import { resolveChannel, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { median } from "@/lib/statistics/median";
import { deviationSeries, rowSeries, type RowSeries } from "@/lib/statistics/row-series";
import { distanceShare } from "@/lib/statistics/row-shares";
import { describeRows, type RowStatistics } from "@/lib/statistics/row-statistics";

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
  const known = given.statistics?.get(id);
  const channel = known ? known.readings : resolveChannel(placed, id);
  if (!channel?.perRow) return null;
  return { channel, statistics: known ?? describeRows(placed, channel, given.distances) };
}

export interface RowStep {
  deviation: number;
  /** Share of the row's distance on which it differed from the others the same way. */
  shareSameWay: number;
  /** Typical deviation in each pass, for the interval. */
  byPass: number[];
  /**
   * True where nearly every pass shows it, whichever way it was driven: then it goes with the machine. A band of residue
   * driven along falls on other rows when the machine comes back.
   */
  constant: boolean;
}

/** A pass shows a deviation when it has its sign and at least this share of its size. */
const SHOWS_FROM = 0.4;
/** Nearly every pass. */
const CONSTANT_FROM = 0.75;

/** How far each of `rows` (from 1) stands from the others, how constantly, and pass by pass. */
export function rowSteps(
  { placed, distances }: { placed: PlacedLog; distances: Float32Array },
  evidence: ChannelEvidence,
  rows: readonly number[],
): Map<number, RowStep> {
  const { channel, statistics } = evidence;
  const { middles } = statistics;
  if (rows.length === 0 || !middles) return new Map();
  return new Map(
    rows.map((row) => {
      const series = deviationSeries(rowSeries(placed, channel, distances, row - 1), middles);
      return [row, describeStep(placed, series, statistics.deviations[row - 1]!)];
    }),
  );
}

function describeStep(placed: PlacedLog, series: RowSeries, deviation: number): RowStep {
  const sign = deviation < 0 ? -1 : 1;
  const readings = new Map<number, number[]>();
  series.records.forEach((record, k) => {
    const pass = placed.passOf[record]!;
    const list = readings.get(pass) ?? [];
    list.push(series.values[k]!);
    readings.set(pass, list);
  });
  const byPass = [...readings.values()].filter((list) => list.length >= 10).map((list) => median(list));
  const showing = byPass.filter((value) => sign * value >= SHOWS_FROM * Math.abs(deviation));
  return {
    deviation,
    shareSameWay: distanceShare(series, (value) => sign * value > 0) ?? 0,
    byPass,
    constant: showing.length >= CONSTANT_FROM * byPass.length,
  };
}
