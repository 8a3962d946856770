import { sortFinite } from "@/lib/statistics/quantile";

export interface NaturalBreaks {
  /** Values in each class, ascending. */
  sizes: number[];
  /** Largest value of each class. */
  upper: number[];
  /** Sum over classes of squared distances from the class mean. */
  withinSumOfSquares: number;
}

/**
 * Fisher's exact grouping of one-dimensional values into `classes` classes with the least sum of squares within (Fisher
 * 1958, JASA 53:789-798), by dynamic programming over the sorted values: O(classes n^2), so give it a sample of at most a
 * few thousand. Fewer classes where there are fewer values; null without any. With `weights`, one a value, above 0, `values` must be
 * finite and rising, and every square counts by its weight.
 */
export function naturalBreaks(
  values: ArrayLike<number>,
  classes: number,
  weights?: ArrayLike<number>,
): NaturalBreaks | null {
  const sorted = weights ? Float64Array.from(values) : sortFinite(values);
  const n = sorted.length;
  const k = Math.min(classes, n);
  if (n === 0 || k < 1) return null;
  const cost = spanCost(sorted, weights);
  let best = Float64Array.from({ length: n }, (_, end) => cost(0, end));
  const starts: Int32Array[] = [new Int32Array(n)];
  for (let c = 1; c < k; c++) {
    const next = new Float64Array(n).fill(Infinity);
    const start = new Int32Array(n);
    for (let end = c; end < n; end++) {
      for (let first = c; first <= end; first++) {
        const total = best[first - 1]! + cost(first, end);
        if (total < next[end]!) [next[end], start[end]] = [total, first];
      }
    }
    best = next;
    starts.push(start);
  }
  return { ...classesFrom(sorted, starts), withinSumOfSquares: best[n - 1]! };
}

/** Sum of squares of sorted values `first .. end` about their mean, in constant time; centred first so that offsets cost no digits. */
function spanCost(sorted: Float64Array, weights?: ArrayLike<number>): (first: number, end: number) => number {
  const middle = sorted[sorted.length >> 1]!;
  const sums = new Float64Array(sorted.length + 1);
  const squares = new Float64Array(sorted.length + 1);
  const totals = new Float64Array(sorted.length + 1);
  sorted.forEach((value, i) => {
    const weight = weights ? weights[i]! : 1;
    totals[i + 1] = totals[i]! + weight;
    sums[i + 1] = sums[i]! + weight * (value - middle);
    squares[i + 1] = squares[i]! + weight * (value - middle) ** 2;
  });
  return (first, end) => {
    const sum = sums[end + 1]! - sums[first]!;
    return Math.max(0, squares[end + 1]! - squares[first]! - (sum * sum) / (totals[end + 1]! - totals[first]!));
  };
}

function classesFrom(sorted: Float64Array, starts: Int32Array[]): Pick<NaturalBreaks, "sizes" | "upper"> {
  const sizes: number[] = [];
  const upper: number[] = [];
  let end = sorted.length - 1;
  for (let c = starts.length - 1; c >= 0; c--) {
    const first = starts[c]![end]!;
    sizes.unshift(end - first + 1);
    upper.unshift(sorted[end]!);
    end = first - 1;
  }
  return { sizes, upper };
}
