import { sortFinite } from "@/lib/statistics/quantile";

/** Mean after floor(n * share) values are left out at each end; the median's neighbours where share reaches 0.5. */
export function trimmedMean(values: ArrayLike<number>, share: number): number {
  const sorted = sortFinite(values);
  const cut = Math.min(Math.floor(sorted.length * share), Math.floor((sorted.length - 1) / 2));
  const kept = sorted.subarray(cut, sorted.length - cut);
  return kept.length === 0 ? NaN : kept.reduce((sum, value) => sum + value, 0) / kept.length;
}
