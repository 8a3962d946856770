/**
 * `weightedMean` and `weightedSd` of single-precision readings in one go: the same sums in the same order, with the element kinds
 * known to the compiler. NaN where nothing has weight.
 */
// kernel: hot loop over every reading
export function weightedMoments(values: Float32Array, weights: Float32Array): { mean: number; sd: number } {
  let sum = 0;
  let total = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    const weight = weights[i]!;
    if (value !== value || !(weight > 0)) continue;
    sum += weight * value;
    total += weight;
  }
  if (!(total > 0)) return { mean: NaN, sd: NaN };
  const mean = sum / total;
  let squares = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    const weight = weights[i]!;
    if (value !== value || !(weight > 0)) continue;
    squares += weight * ((value - mean) * (value - mean));
  }
  return { mean, sd: Math.sqrt(squares / total) };
}
