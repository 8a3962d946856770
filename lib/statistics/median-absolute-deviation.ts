import { median } from "@/lib/statistics/median";
import { sortFinite } from "@/lib/statistics/quantile";

/** Makes the median absolute deviation estimate the sd of normal data (1 / 0.6745; R uses the same four digits). */
export const MAD_TO_SD = 1.4826;
/** Makes the mean absolute deviation from the centre do the same: sqrt(pi / 2). */
export const MEAN_DEVIATION_TO_SD = 1.2533;

/** Median absolute deviation from the median, not scaled; NaN where nothing is finite. */
export function medianAbsoluteDeviation(values: ArrayLike<number>): number {
  const finite = sortFinite(values);
  const centre = median(finite);
  return median(finite.map((value) => Math.abs(value - centre)));
}

/**
 * Robust spread on the scale of a standard deviation: 1.4826 MAD; where that is 0 (more than half the values equal),
 * 1.2533 times the mean absolute deviation from the median; null where that is 0 too ("no spread").
 */
export function robustSpread(values: ArrayLike<number>): number | null {
  const mad = medianAbsoluteDeviation(values);
  if (mad > 0) return MAD_TO_SD * mad;
  const finite = sortFinite(values);
  const centre = median(finite);
  const mean = finite.reduce((sum, value) => sum + Math.abs(value - centre), 0) / finite.length;
  return mean > 0 ? MEAN_DEVIATION_TO_SD * mean : null;
}
