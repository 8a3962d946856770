import { eachReading, type ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { addReading, emptySums, type PassSums } from "@/lib/pass-figures/resample-passes";
import { atLimitFromN, underTargetBelowN } from "@/lib/statistics/row-shares";

/** What is summed over all rows, after one part for each row. */
export const WHOLE_PARTS = ["mean", "square", "under", "limit", "lost"] as const;
export type WholePart = (typeof WHOLE_PARTS)[number];

/** Place of a sum over all rows among the parts. */
export function wholePart(rows: number, name: WholePart): number {
  return rows + WHOLE_PARTS.indexOf(name);
}

/**
 * Weighted sums of a channel pass by pass: one part for each row, then those of `WHOLE_PARTS` over all rows. A share that the
 * channel or machine does not have stays without weight. `centre` is taken off before squaring, against loss of figures.
 */
export function passTotals(from: ChannelOnGround, centre: number): PassSums {
  const { placed, channel } = from;
  const { rows } = channel;
  const sums = emptySums(placed.passes.length, rows + WHOLE_PARTS.length);
  const under = underTargetBelowN(placed, channel);
  const limit = atLimitFromN(placed, channel);
  const lostOf = contactLost(channel);
  placed.passes.forEach((pass, p) => {
    eachReading(from, pass, (value, weightM, _, row) => {
      addReading(sums, p, row, value, weightM);
      addReading(sums, p, rows, value, weightM);
      addReading(sums, p, rows + 1, (value - centre) ** 2, weightM);
      if (under !== null) addReading(sums, p, rows + 2, +(value < under), weightM);
      if (limit !== null) addReading(sums, p, rows + 3, +(value >= limit), weightM);
      if (lostOf !== null) addReading(sums, p, rows + 4, lostOf(value), weightM);
    });
  });
  return sums;
}

/** As `contactLostShare` counts it, a reading at a time. */
function contactLost({ id, unit }: ChannelOnGround["channel"]): ((value: number) => number) | null {
  if (id === "margin" && unit === "N") return (value) => +(value <= 0);
  if (id === "contact" && (unit === "fraction" || unit === "boolean")) return (value) => 1 - value;
  return null;
}

/** Mean of one part in each pass; NaN for a pass without it. */
export function passMeans({ passes, parts, sums, weights }: PassSums, part: number): Float64Array {
  return Float64Array.from({ length: passes }, (_, pass) => sums[pass * parts + part]! / weights[pass * parts + part]!);
}
