import { MAD_TO_SD, medianAbsoluteDeviation } from "@/lib/statistics/median-absolute-deviation";
import { median } from "@/lib/statistics/median";
import { sortFinite } from "@/lib/statistics/quantile";

/** The rule of R's MASS::huber, which returns the last centre before a step smaller than this many scales. */
const STOP_BELOW_SCALES = 1e-6;

/**
 * Huber's M-estimate of location with the scale fixed at 1.4826 MAD: values further than `k` scales out are pulled in and
 * the mean taken again until it stands still (Huber 1981, Robust Statistics). The median where the MAD is 0.
 */
export function huberLocation(values: ArrayLike<number>, k = 1.5): number {
  const finite = sortFinite(values);
  const limit = k * MAD_TO_SD * medianAbsoluteDeviation(finite);
  let centre = median(finite);
  if (!(limit > 0)) return centre;
  for (let round = 0; round < 500; round++) {
    let sum = 0;
    for (const value of finite) sum += Math.min(Math.max(value, centre - limit), centre + limit);
    const next = sum / finite.length;
    if (Math.abs(next - centre) < STOP_BELOW_SCALES * (limit / k)) break;
    centre = next;
  }
  return centre;
}
