import { sortWeighted } from "@/lib/statistics/sort-weighted";
import { weightedValueAt } from "@/lib/statistics/weighted-quantile";

export interface WeightedSummary {
  /** Over every finite value, whatever its weight; NaN without any. */
  min: number;
  max: number;
  /** Sum of the weights above 0. */
  weight: number;
  /** One a probability asked for; NaN where nothing has weight. */
  quantiles: number[];
}

const BUCKETS = 4096;
/** Bucket of a reading that counts for nothing. */
const NOWHERE = 0xffff;

/**
 * Weighted quantiles by the midpoint definition without sorting everything: readings are counted into 4096 even steps from
 * least to most. A log's readings are multiples of its own rounding, so mostly each step holds one value and the quantile
 * follows from the weights alone; only where a step at the quantile holds several values are they picked out and sorted.
 */
export function selectQuantiles(values: Float32Array, weights: Float32Array, ps: readonly number[]): WeightedSummary {
  const { min, max } = rangeOf(values);
  const histogram = countBuckets(values, weights, min, max);
  let weight = 0;
  for (const sum of histogram.sums) weight += sum;
  const quantiles = ps.map((p) => (weight > 0 ? selectAt(values, weights, histogram, p * weight) : NaN));
  return { min, max, weight, quantiles };
}

interface Histogram {
  /** Bucket of every reading. */
  bucketOf: Uint16Array;
  /** Of each bucket: total weight, the weights of its first and last reading, its value, and 1 where it holds several values. */
  sums: Float64Array;
  firsts: Float32Array;
  lasts: Float32Array;
  values: Float32Array;
  mixed: Uint8Array;
}

function rangeOf(values: Float32Array): { min: number; max: number } {
  let min = Infinity;
  let max = -Infinity;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (value < min) min = value;
    if (value > max) max = value;
  }
  return max < min ? { min: NaN, max: NaN } : { min, max };
}

// kernel: hot, so positional
function countBuckets(values: Float32Array, weights: Float32Array, min: number, max: number): Histogram {
  const histogram = {
    bucketOf: new Uint16Array(values.length),
    sums: new Float64Array(BUCKETS),
    firsts: new Float32Array(BUCKETS),
    lasts: new Float32Array(BUCKETS),
    values: new Float32Array(BUCKETS),
    mixed: new Uint8Array(BUCKETS),
  };
  const scale = max > min ? (BUCKETS - 1) / (max - min) : 0;
  for (let i = 0; i < values.length; i++) {
    const weight = weights[i]!;
    const value = values[i]!;
    if (!(weight > 0) || value !== value) {
      histogram.bucketOf[i] = NOWHERE;
      continue;
    }
    const bucket = ((value - min) * scale) | 0;
    histogram.bucketOf[i] = bucket;
    if (histogram.sums[bucket] === 0) {
      histogram.firsts[bucket] = weight;
      histogram.values[bucket] = value;
    } else if (histogram.values[bucket] !== value) histogram.mixed[bucket] = 1;
    histogram.sums[bucket]! += weight;
    histogram.lasts[bucket] = weight;
  }
  return histogram;
}

// kernel: hot, so positional
function selectAt(values: Float32Array, weights: Float32Array, histogram: Histogram, target: number): number {
  const { sums, mixed } = histogram;
  let bucket = 0;
  let below = 0;
  while (bucket < BUCKETS - 1 && below + sums[bucket]! < target) below += sums[bucket++]!;
  // Rounding may leave the last step with weight short of the whole: it holds the quantile then.
  while (bucket > 0 && sums[bucket] === 0) below -= sums[--bucket]!;
  let low = bucket - 1;
  while (low >= 0 && sums[low] === 0) low--;
  let high = bucket + 1;
  while (high < BUCKETS && sums[high] === 0) high++;
  const isMixed = mixed[bucket] === 1 || mixed[low] === 1 || mixed[high] === 1;
  if (!isMixed) return valueBetween(histogram, { low, bucket, high }, target - below);
  if (low >= 0) below -= sums[low]!;
  const some = gatherBuckets(values, weights, histogram.bucketOf, { low: Math.max(0, low), high });
  const sorted = sortWeighted(some.values, some.weights);
  return weightedValueAt(sorted, target - below);
}

/**
 * The value at `within`, the weight counted from where the bucket begins, where it and its neighbours hold one value each: that
 * value from the middle of its first reading to the middle of its last, a straight line to the neighbour's beyond.
 */
function valueBetween(
  { sums, firsts, lasts, values }: Histogram,
  { low, bucket, high }: { low: number; bucket: number; high: number },
  within: number,
): number {
  const value = values[bucket]!;
  const first = firsts[bucket]! / 2;
  const last = sums[bucket]! - lasts[bucket]! / 2;
  if (within < first && low >= 0) {
    const from = -lasts[low]! / 2;
    return values[low]! + ((within - from) / (first - from)) * (value - values[low]!);
  }
  if (within > last && high < BUCKETS) {
    const to = sums[bucket]! + firsts[high]! / 2;
    return value + ((within - last) / (to - last)) * (values[high]! - value);
  }
  return value;
}

// kernel: hot, so positional
function gatherBuckets(
  values: Float32Array,
  weights: Float32Array,
  bucketOf: Uint16Array,
  { low, high }: { low: number; high: number },
): { values: Float32Array; weights: Float32Array } {
  let n = 0;
  for (let i = 0; i < bucketOf.length; i++) if (bucketOf[i]! >= low && bucketOf[i]! <= high) n++;
  const picked = { values: new Float32Array(n), weights: new Float32Array(n) };
  for (let i = 0, k = 0; k < n; i++) {
    if (bucketOf[i]! < low || bucketOf[i]! > high) continue;
    picked.values[k] = values[i]!;
    picked.weights[k++] = weights[i]!;
  }
  return picked;
}
