import { sortWeighted, type SortedWeighted } from "@/lib/statistics/sort-weighted";

/** Index of the first cumulative weight that is at least `target`; the last index where none is. */
function firstAtLeast(cumulative: Float64Array, target: number): number {
  let low = 0;
  let high = cumulative.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (cumulative[middle]! >= target) high = middle;
    else low = middle + 1;
  }
  return low;
}

/**
 * Weighted quantile by the midpoint definition, the one this product reports: value i stands at
 * (cumulative weight - half its own) / total, between them by straight line, the end values beyond. With equal weights it
 * is Hyndman & Fan's type 5. NaN for an empty list.
 */
export function weightedQuantileSorted(sorted: SortedWeighted, p: number): number {
  const total = sorted.cumulative[sorted.cumulative.length - 1];
  return total === undefined ? NaN : weightedValueAt(sorted, p * total);
}

/** The value where the running weight, counted to the middle of each reading's own, reaches `target`. */
export function weightedValueAt({ values, weights, cumulative }: SortedWeighted, target: number): number {
  const n = values.length;
  if (n === 0) return NaN;
  const midpoint = (i: number) => cumulative[i]! - weights[i]! / 2;
  let upper = firstAtLeast(cumulative, target);
  if (midpoint(upper) < target) upper++;
  if (upper <= 0) return values[0]!;
  if (upper >= n) return values[n - 1]!;
  const from = midpoint(upper - 1);
  const share = (target - from) / (midpoint(upper) - from);
  return values[upper - 1]! + share * (values[upper]! - values[upper - 1]!);
}

/** Weighted quantile by the midpoint definition of values in any order. */
export function weightedQuantile(values: ArrayLike<number>, weights: ArrayLike<number>, p: number): number {
  return weightedQuantileSorted(sortWeighted(values, weights), p);
}

/** Weighted quantile by the step definition: the smallest value whose cumulative weight reaches p of the total. */
export function weightedQuantileLower(values: ArrayLike<number>, weights: ArrayLike<number>, p: number): number {
  const sorted = sortWeighted(values, weights);
  const n = sorted.values.length;
  if (n === 0) return NaN;
  const total = sorted.cumulative[n - 1]!;
  return sorted.values[firstAtLeast(sorted.cumulative, p * total - 1e-12 * total)]!;
}
