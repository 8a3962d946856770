/** Mean direction of weighted angles. `resultant` is the mean vector's length, 0..1; `sdDeg` is sqrt(-2 ln R). */
export interface CircularMean {
  meanDeg: number;
  resultant: number;
  sdDeg: number;
}

export const RADIANS_PER_DEGREE = Math.PI / 180;

/** An angle brought into 0 to below 360. */
export function wrapDegrees(angleDeg: number): number {
  const wrapped = angleDeg % 360;
  return wrapped < 0 ? wrapped + 360 : wrapped === 0 ? 0 : wrapped;
}

/** Signed turn from `fromDeg` to `toDeg`, clockwise positive, -180 to below 180. */
export function turnDegrees(fromDeg: number, toDeg: number): number {
  return wrapDegrees(toDeg - fromDeg + 180) - 180;
}

/** Angle between two undirected lines, 0 to 90. */
export function axialDifferenceDeg(firstDeg: number, secondDeg: number): number {
  const folded = wrapDegrees(firstDeg - secondDeg) % 180;
  return Math.min(folded, 180 - folded);
}

/**
 * Weighted circular mean: atan2(sum w sin, sum w cos), in 0 to below 360. Angles that are NaN are left out.
 * Null where nothing is left or where the directions cancel, since no mean direction exists then.
 * @example circularMean([359, 1])?.meanDeg // 0
 */
export function circularMean(anglesDeg: ArrayLike<number>, weights?: ArrayLike<number>): CircularMean | null {
  let east = 0;
  let north = 0;
  let total = 0;
  for (let i = 0; i < anglesDeg.length; i++) {
    const angle = (anglesDeg[i] ?? NaN) * RADIANS_PER_DEGREE;
    const weight = weights ? (weights[i] ?? 0) : 1;
    if (Number.isNaN(angle) || !(weight > 0)) continue;
    east += weight * Math.sin(angle);
    north += weight * Math.cos(angle);
    total += weight;
  }
  const length = Math.hypot(east, north);
  if (total === 0 || length < 1e-12 * total) return null;
  const resultant = Math.min(1, length / total);
  const meanDeg = wrapDegrees(Math.atan2(east, north) / RADIANS_PER_DEGREE);
  return { meanDeg, resultant, sdDeg: Math.sqrt(-2 * Math.log(resultant)) / RADIANS_PER_DEGREE };
}

/**
 * The same for undirected lines (a pass driven either way): angles are doubled, averaged and halved; mean in 0 to below 180.
 * `resultant` and `sdDeg` belong to the doubled angles.
 */
export function axialMean(anglesDeg: ArrayLike<number>, weights?: ArrayLike<number>): CircularMean | null {
  const doubled = circularMean(
    Float64Array.from({ length: anglesDeg.length }, (_, i) => 2 * (anglesDeg[i] ?? NaN)),
    weights,
  );
  return doubled && { ...doubled, meanDeg: doubled.meanDeg / 2 };
}
