import { resolveChannel, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import type { ChannelSummary, CleaningEffect } from "@/lib/schemas/cleaning";
import { underTargetBelowN } from "@/lib/statistics/row-shares";
import { selectQuantiles } from "@/lib/statistics/select-quantiles";

/** A channel with all its rows together. */
export interface SummarisedChannel {
  channel: string;
  unit: string;
  summary: ChannelSummary;
}

/** Every channel of a log, opener resistance among them where the log can give it. */
export function summariseChannels(placed: PlacedLog): SummarisedChannel[] {
  const distances = rowDistances(placed);
  const ids = [...placed.log.channels.map((channel) => channel.id), "resistance"];
  return ids.flatMap((id) => {
    const channel = resolveChannel(placed, id);
    return channel ? [{ channel: id, unit: channel.unit, summary: summarise(placed, channel, distances) }] : [];
  });
}

/** What cleaning and delays make of every channel. */
export function describeEffect(
  asLogged: readonly SummarisedChannel[],
  cleaned: readonly SummarisedChannel[],
): CleaningEffect[] {
  return asLogged.flatMap(({ channel, unit, summary }) => {
    const then = cleaned.find((one) => one.channel === channel);
    return then ? [{ channel, unit, asLogged: summary, cleaned: then.summary }] : [];
  });
}

const orNull = (value: number | undefined) => (value !== undefined && Number.isFinite(value) ? value : null);

/** Every reading of a channel in passes, weighted by the distance its row travelled. */
function summarise(placed: PlacedLog, channel: ResolvedChannel, distances: Float32Array): ChannelSummary {
  const { values, weightsM } = gatherReadings(placed, channel, distances);
  const under = underTargetBelowN(placed, channel);
  const [p05, p50, p95] = selectQuantiles(values, weightsM, [0.05, 0.5, 0.95]).quantiles;
  let weight = 0;
  let weighted = 0;
  let underM = 0;
  for (let i = 0; i < values.length; i++) {
    weight += weightsM[i]!;
    weighted += weightsM[i]! * values[i]!;
    if (under !== null && values[i]! < under) underM += weightsM[i]!;
  }
  const mean = weighted / weight;
  let squares = 0;
  for (let i = 0; i < values.length; i++) squares += weightsM[i]! * (values[i]! - mean) ** 2;
  return {
    n: values.length,
    mean: orNull(mean),
    sd: orNull(Math.sqrt(squares / weight)),
    p05: orNull(p05),
    p50: orNull(p50),
    p95: orNull(p95),
    shareUnderTarget: under === null ? null : orNull(underM / weight),
  };
}

// kernel: walks every reading
function gatherReadings(
  placed: PlacedLog,
  { values, rows, perRow }: ResolvedChannel,
  distances: Float32Array,
): { values: Float32Array; weightsM: Float32Array } {
  const all = { values: new Float32Array(values.length), weightsM: new Float32Array(values.length) };
  const geometryRows = placed.geometry.rows;
  let n = 0;
  for (let record = 0; record < placed.log.records; record++) {
    if (placed.passOf[record] === 0) continue;
    for (let row = 0; row < rows; row++) {
      const value = values[record * rows + row]!;
      if (value !== value) continue;
      all.values[n] = value;
      // A channel of the whole machine is weighed by the middle row's distance.
      all.weightsM[n++] = distances[record * geometryRows + (perRow ? row : geometryRows >> 1)]!;
    }
  }
  return { values: all.values.subarray(0, n), weightsM: all.weightsM.subarray(0, n) };
}
