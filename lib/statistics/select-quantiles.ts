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

/** Steps from least to most. */
export const BUCKETS = 4096;
/** Bucket of a reading that counts for nothing. */
export const NOWHERE = BUCKETS;

/**
 * Weighted quantiles by the midpoint definition without sorting everything: readings are counted into 4096 even steps from
 * least to most. A log's readings are multiples of its own rounding, so mostly each step holds one value and the quantile
 * follows from the weights alone; only where a step at the quantile holds several values are they picked out and sorted.
 */
export function selectQuantiles(values: Float32Array, weights: Float32Array, ps: readonly number[]): WeightedSummary {
  const { min, max } = rangeOf(values);
  const counted = countBuckets(values, weights, min, max);
  return { min, max, ...selectAmong(values, weights, counted, ps) };
}

/** Weighted quantiles of readings that are counted into steps already. */
// kernel: a thin front of the hot loops below
export function selectAmong(
  values: Float32Array,
  weights: Float32Array,
  counted: Counted,
  ps: readonly number[],
): Pick<WeightedSummary, "weight" | "quantiles"> {
  const { bucketOf, sums } = counted;
  let weight = 0;
  for (const sum of sums) weight += sum;
  if (!(weight > 0)) return { weight, quantiles: ps.map(() => NaN) };
  const places = ps.map((p) => findPlace(sums, p * weight));
  const steps = describeSteps(values, weights, bucketOf, places);
  const isPlain = ({ low, bucket, high }: Place) => ![low, bucket, high].some((step) => steps.mixed[step] === 1);
  const quantiles = places.map((place) =>
    isPlain(place) ? valueBetween(steps, sums, place) : valueAmong(values, weights, counted, place),
  );
  return { weight, quantiles };
}

/** The value where the running weight reaches `target`, of steps that hold one value each. */
export function valueAt(steps: Steps, sums: Float64Array, target: number): number {
  return valueBetween(steps, sums, findPlace(sums, target));
}

/** Where a quantile lies: its step, the nearest steps below and above that hold anything, its weight and that below the step. */
export interface Place {
  low: number;
  bucket: number;
  high: number;
  target: number;
  below: number;
}

/** What tells whether a step holds one value; known of the steps about the quantiles. */
export interface Steps {
  /** 1 where the step holds several values. */
  mixed: Uint8Array;
  /** The step's first value, and the weights of its first and last reading. */
  values: Float32Array;
  firsts: Float32Array;
  lasts: Float32Array;
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

/** Readings counted into steps. */
export interface Counted {
  /** Step of every reading. */
  bucketOf: Uint16Array;
  /** Weight in every step. */
  sums: Float64Array;
}

// kernel: hot, so positional
function countBuckets(values: Float32Array, weights: Float32Array, min: number, max: number): Counted {
  const bucketOf = new Uint16Array(values.length);
  const sums = new Float64Array(BUCKETS);
  const scale = max > min ? (BUCKETS - 1) / (max - min) : 0;
  for (let i = 0; i < values.length; i++) {
    const weight = weights[i]!;
    const value = values[i]!;
    if (!(weight > 0) || value !== value) {
      bucketOf[i] = NOWHERE;
      continue;
    }
    const bucket = ((value - min) * scale) | 0;
    bucketOf[i] = bucket;
    sums[bucket]! += weight;
  }
  return { bucketOf, sums };
}

/** Where the running weight reaches `target`. */
export function findPlace(sums: Float64Array, target: number): Place {
  let bucket = 0;
  let below = 0;
  while (bucket < BUCKETS - 1 && below + sums[bucket]! < target) below += sums[bucket++]!;
  // Rounding may leave the last step with weight short of the whole: it holds the quantile then.
  while (bucket > 0 && sums[bucket] === 0) below -= sums[--bucket]!;
  let low = bucket - 1;
  while (low >= 0 && sums[low] === 0) low--;
  let high = bucket + 1;
  while (high < BUCKETS && sums[high] === 0) high++;
  return { low, bucket, high, target, below };
}

// kernel: hot, so positional
function describeSteps(
  values: Float32Array,
  weights: Float32Array,
  bucketOf: Uint16Array,
  places: readonly Place[],
): Steps {
  const wanted = new Uint8Array(BUCKETS + 1);
  for (const { low, bucket, high } of places) for (const step of [low, bucket, high]) if (step >= 0) wanted[step] = 1;
  wanted[NOWHERE] = 0;
  const steps = {
    mixed: new Uint8Array(BUCKETS),
    values: new Float32Array(BUCKETS),
    firsts: new Float32Array(BUCKETS),
    lasts: new Float32Array(BUCKETS),
  };
  for (let i = 0; i < bucketOf.length; i++) {
    const bucket = bucketOf[i]!;
    if (wanted[bucket] === 0) continue;
    const weight = weights[i]!;
    const value = values[i]!;
    if (steps.firsts[bucket] === 0) {
      steps.firsts[bucket] = weight;
      steps.values[bucket] = value;
    } else if (steps.values[bucket] !== value) steps.mixed[bucket] = 1;
    steps.lasts[bucket] = weight;
  }
  return steps;
}

/**
 * The value at the target weight where its step and the two beside it hold one value each: that value from the middle of its
 * first reading to the middle of its last, a straight line to the neighbour's beyond.
 */
export function valueBetween({ values, firsts, lasts }: Steps, sums: Float64Array, place: Place): number {
  const { low, bucket, high } = place;
  const within = place.target - place.below;
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
function valueAmong(values: Float32Array, weights: Float32Array, { bucketOf, sums }: Counted, place: Place): number {
  const { high, target, below } = place;
  const low = Math.max(0, place.low);
  let n = 0;
  for (let i = 0; i < bucketOf.length; i++)
    n += +(bucketOf[i]! >= low) & +(bucketOf[i]! <= high) & +(bucketOf[i] !== NOWHERE);
  const some = { values: new Float32Array(n), weights: new Float32Array(n) };
  for (let i = 0, k = 0; k < n; i++) {
    if (bucketOf[i]! < low || bucketOf[i]! > high || bucketOf[i] === NOWHERE) continue;
    some.values[k] = values[i]!;
    some.weights[k++] = weights[i]!;
  }
  return weightedValueAt(
    sortWeighted(some.values, some.weights),
    target - (place.low >= 0 ? below - sums[low]! : below),
  );
}
