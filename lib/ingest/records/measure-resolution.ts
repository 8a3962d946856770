/** Readings looked at: a log's rounding shows in any tenth of a million of them. */
const SAMPLE = 65_536;

/**
 * Smallest step between two distinct values, in the values' unit, rounded to three figures in the file's own unit
 * (`factor` SI units), because Float32 storage blurs the step. Null when the value never changes.
 * Looks at up to 65,536 values spread evenly. Cost: one sort of the sample.
 */
export function measureResolution(values: Float32Array, factor: number): number | null {
  const stride = Math.max(1, Math.floor(values.length / SAMPLE));
  const sample = new Float32Array(Math.ceil(values.length / stride));
  let count = 0;
  for (let i = 0; i < values.length; i += stride) {
    const value = values[i] ?? NaN;
    if (value === value) sample[count++] = value;
  }
  const sorted = sample.subarray(0, count).sort();
  let smallest = Infinity;
  for (let i = 1; i < sorted.length; i++) {
    const step = (sorted[i] ?? 0) - (sorted[i - 1] ?? 0);
    if (step > 0 && step < smallest) smallest = step;
  }
  if (smallest === Infinity) return null;
  return Number((smallest / factor).toPrecision(3)) * factor;
}
