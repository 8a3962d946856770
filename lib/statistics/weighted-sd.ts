import { weightedMean } from "@/lib/statistics/weighted-mean";

/**
 * Weighted standard deviation sqrt(sum w (x - mean)^2 / sum w): the spread over the ground itself, so no n - 1.
 * Two passes, so a large offset costs no digits. NaN where nothing has weight.
 */
export function weightedSd(values: ArrayLike<number>, weights: ArrayLike<number>): number {
  const mean = weightedMean(values, weights);
  let sum = 0;
  let total = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    const weight = weights[i]!;
    if (Number.isNaN(value) || !(weight > 0)) continue;
    sum += weight * (value - mean) ** 2;
    total += weight;
  }
  return total > 0 ? Math.sqrt(sum / total) : NaN;
}
