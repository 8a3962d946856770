import { quantileType7, sortFinite } from "@/lib/statistics/quantile";

/** Median of the finite values; NaN where there are none. */
export function median(values: ArrayLike<number>): number {
  return quantileType7(sortFinite(values), 0.5);
}
