import type { ValueDistribution } from "@/lib/legend/value-distribution";
import { naturalBreaks } from "@/lib/statistics/natural-breaks";

/** Groups of values that the breaks are chosen between: more cost time (with their square) and no longer move an edge visibly. */
const MOST_GROUPS = 400;

/**
 * Class edges at natural breaks: those that leave the least sum of squares within classes, each metre driven counting alike.
 * An edge is the lowest value of the class above it. Fewer where values are few.
 */
export function naturalEdges(distribution: ValueDistribution, count: number): number[] {
  const { values, weights } = groupValues(distribution);
  const found = naturalBreaks(values, count, weights);
  if (!found) return [];
  return found.upper.slice(0, -1).map((upper) => values.find((value) => value > upper)!);
}

/** Neighbouring values in groups of equal width, each at the lowest value in it. */
function groupValues({ offset, step, codes, distancesM }: ValueDistribution): { values: number[]; weights: number[] } {
  const [least = 0, greatest = 0] = [codes[0], codes.at(-1)];
  const perGroup = Math.max(1, (greatest - least + 1) / MOST_GROUPS);
  const values: number[] = [];
  const weights: number[] = [];
  let group = -1;
  codes.forEach((code, index) => {
    const mine = Math.floor((code - least) / perGroup);
    if (mine !== group) {
      values.push(offset + code * step);
      weights.push(0);
      group = mine;
    }
    weights[weights.length - 1]! += distancesM[index]!;
  });
  return { values, weights };
}
