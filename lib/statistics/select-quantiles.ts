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

const BUCKETS = 2048;
/** Bucket of a reading that counts for nothing. */
const NOWHERE = 0xffff;

/**
 * Weighted quantiles by the midpoint definition without sorting everything: readings are counted into 2048 even steps from
 * least to most, and only the step that holds the quantile and its neighbours are sorted. O(n) a quantile.
 */
export function selectQuantiles(values: Float32Array, weights: Float32Array, ps: readonly number[]): WeightedSummary {
  const { min, max } = rangeOf(values);
  const histogram = countBuckets(values, weights, min, max);
  let weight = 0;
  for (const bucket of histogram.weights) weight += bucket;
  const quantiles = ps.map((p) => (weight > 0 ? selectAt(values, weights, histogram, p * weight) : NaN));
  return { min, max, weight, quantiles };
}

interface Histogram {
  bucketOf: Uint16Array;
  weights: Float64Array;
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
  const bucketOf = new Uint16Array(values.length).fill(NOWHERE);
  const sums = new Float64Array(BUCKETS);
  const scale = max > min ? (BUCKETS - 1) / (max - min) : 0;
  for (let i = 0; i < values.length; i++) {
    const weight = weights[i]!;
    const place = (values[i]! - min) * scale;
    if (!(weight > 0) || Number.isNaN(place)) continue;
    bucketOf[i] = place;
    sums[bucketOf[i]!]! += weight;
  }
  return { bucketOf, weights: sums };
}

// kernel: hot, so positional
function selectAt(values: Float32Array, weights: Float32Array, histogram: Histogram, target: number): number {
  let bucket = 0;
  let below = 0;
  while (bucket < BUCKETS - 1 && below + histogram.weights[bucket]! < target) below += histogram.weights[bucket++]!;
  let low = bucket - 1;
  while (low >= 0 && histogram.weights[low] === 0) low--;
  let high = bucket + 1;
  while (high < BUCKETS && histogram.weights[high] === 0) high++;
  if (low >= 0) below -= histogram.weights[low]!;
  const some = gatherBuckets(values, weights, histogram.bucketOf, { low: Math.max(0, low), high });
  const sorted = sortWeighted(some.values, some.weights);
  return weightedValueAt(sorted, target - below);
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
