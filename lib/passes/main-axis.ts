import { axialDifferenceDeg, axialMean } from "@/lib/geo/circular-mean";

/**
 * The direction (0 to below 180) along which most distance is worked: the fullest 10-degree window of passes weighted by
 * length, then the axial mean of the passes within 20 degrees of it. Null without passes.
 */
export function mainAxisDeg(passes: { headingDeg: number; lengthM: number }[]): number | null {
  const usable = passes.filter((pass) => Number.isFinite(pass.headingDeg) && pass.lengthM > 0);
  let best = 0;
  let bestLength = -1;
  for (const candidate of usable) {
    const lengthM = usable
      .filter((pass) => axialDifferenceDeg(pass.headingDeg, candidate.headingDeg) <= 5)
      .reduce((sum, pass) => sum + pass.lengthM, 0);
    if (lengthM > bestLength) [best, bestLength] = [candidate.headingDeg, lengthM];
  }
  const near = usable.filter((pass) => axialDifferenceDeg(pass.headingDeg, best) <= 20);
  const mean = axialMean(
    near.map((pass) => pass.headingDeg),
    near.map((pass) => pass.lengthM),
  );
  return mean?.meanDeg ?? null;
}
