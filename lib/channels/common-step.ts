/** Steps below this share of the finer one are blur of the readings, not their rounding. */
const BLUR_SHARE = 1 / 64;

/**
 * The step in which sums and differences of two channels fall, from the steps of the two: their greatest common divisor
 * (Euclid), at most the finer of them; where they share none worth the name, a 64th of the finer. Null means a channel
 * that never changes and so adds no steps of its own.
 */
export function commonStep(a: number | null, b: number | null): number | null {
  if (!a || !b) return a || b || null;
  const blur = Math.min(a, b) * BLUR_SHARE;
  let [larger, smaller] = [Math.max(a, b), Math.min(a, b)];
  while (smaller > blur) {
    // The remainder nearest to zero, so that blur on either side of a whole multiple counts as none.
    const rest = Math.abs(larger - smaller * Math.round(larger / smaller));
    [larger, smaller] = [smaller, rest];
  }
  return Math.max(larger, blur);
}
