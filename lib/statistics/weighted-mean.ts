/** Sum of w x over sum of w; values that are NaN and weights that are not above 0 are left out; NaN where none is left. */
export function weightedMean(values: ArrayLike<number>, weights: ArrayLike<number>): number {
  let sum = 0;
  let total = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    const weight = weights[i]!;
    if (Number.isNaN(value) || !(weight > 0)) continue;
    sum += weight * value;
    total += weight;
  }
  return total > 0 ? sum / total : NaN;
}
