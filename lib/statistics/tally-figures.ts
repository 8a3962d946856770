import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import { BUCKETS, valueAt } from "@/lib/statistics/select-quantiles";
import type { RowTally } from "@/lib/statistics/tally-rows";

export interface TallyFigures {
  n: number;
  distanceM: number;
  mean: number;
  sd: number;
  min: number;
  max: number;
  quantiles: number[];
}

/** Number, distance, mean, spread, extremes and quantiles of a tallied row. Every figure but `n` is NaN (0 for the distance) without a reading. */
export function describeTally(tally: RowTally, ps: readonly number[]): TallyFigures {
  const { steps, sums, n, min, max } = tally;
  let [distanceM, sum, squares] = [0, 0, 0];
  for (let step = 0; step < BUCKETS; step++) {
    if (!(sums[step]! > 0)) continue;
    distanceM += sums[step]!;
    sum += sums[step]! * steps.values[step]!;
  }
  const mean = sum / distanceM;
  for (let step = 0; step < BUCKETS; step++) {
    if (sums[step]! > 0) squares += sums[step]! * (steps.values[step]! - mean) ** 2;
  }
  const quantiles = ps.map((p) => (distanceM > 0 ? valueAt(steps, sums, p * distanceM) : NaN));
  return { n, distanceM, mean, sd: Math.sqrt(squares / distanceM), min, max, quantiles };
}

/** Share of the tallied distance on which the value satisfies `holds`; null without distance. */
export function tallyShare({ steps, sums }: RowTally, holds: (value: number) => boolean): number | null {
  let [held, total] = [0, 0];
  for (let step = 0; step < BUCKETS; step++) {
    total += sums[step]!;
    if (sums[step]! > 0 && holds(steps.values[step]!)) held += sums[step]!;
  }
  return total > 0 ? held / total : null;
}

/** As `contactLostShare` of a series. */
export function tallyLost(tally: RowTally, channel: Pick<ResolvedChannel, "id" | "unit">): number | null {
  if (channel.id === "margin" && channel.unit === "N") return tallyShare(tally, (value) => value <= 0);
  if (channel.id !== "contact" || (channel.unit !== "fraction" && channel.unit !== "boolean")) return null;
  const { steps, sums } = tally;
  let [lost, total] = [0, 0];
  for (let step = 0; step < BUCKETS; step++) {
    if (!(sums[step]! > 0)) continue;
    lost += sums[step]! * (1 - steps.values[step]!);
    total += sums[step]!;
  }
  return total > 0 ? lost / total : null;
}
