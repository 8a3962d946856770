/** Finite values, ascending, in a new array. */
export function sortFinite(values: ArrayLike<number>): Float64Array {
  return Float64Array.from(values)
    .filter((value) => Number.isFinite(value))
    .sort();
}

function interpolate(sorted: ArrayLike<number>, position: number): number {
  const last = sorted.length - 1;
  const clamped = Math.min(Math.max(position, 0), last);
  const below = Math.floor(clamped);
  const low = sorted[below] ?? NaN;
  const high = sorted[Math.min(below + 1, last)] ?? NaN;
  return low + (clamped - below) * (high - low);
}

/**
 * Quantile of values already sorted, by Hyndman & Fan's type 7 (the default of R): position (n - 1) p.
 * NaN for an empty list.
 */
export function quantileType7(sorted: ArrayLike<number>, p: number): number {
  return sorted.length === 0 ? NaN : interpolate(sorted, (sorted.length - 1) * p);
}

/** The same by type 6: position (n + 1) p - 1. */
export function quantileType6(sorted: ArrayLike<number>, p: number): number {
  return sorted.length === 0 ? NaN : interpolate(sorted, (sorted.length + 1) * p - 1);
}
