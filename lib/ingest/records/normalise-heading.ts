/** A heading in degrees as one from 0 up to 360; NaN stays NaN. */
export function normaliseHeading(headingDeg: number): number {
  return headingDeg >= 0 && headingDeg < 360 ? headingDeg : ((headingDeg % 360) + 360) % 360;
}
