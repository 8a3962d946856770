import { MAD_TO_SD } from "@/lib/statistics/median-absolute-deviation";
import { median } from "@/lib/statistics/median";

/**
 * A lane's values ready to be compared: readings that stand far from the rest of the pass left out, then smoothed by
 * `smoothings` rounds of 1-2-1 (which shift nothing), so that putting it on a grid adds no ripple of its own. No trend is
 * taken away: the two passes of a pair begin and end elsewhere, their trends differ, and the delay came out short by it.
 */
export function cleanLane(
  values: Float64Array,
  isKept: Uint8Array,
  { outlierSds, smoothings }: { outlierSds: number; smoothings: number },
): Float64Array {
  const kept = values.map((value, at) => (isKept[at] === 1 ? value : NaN));
  const centre = median(kept);
  const reach = outlierSds * MAD_TO_SD * median(kept.map((value) => Math.abs(value - centre)));
  let clean: Float64Array = kept.map((value) => (Math.abs(value - centre) <= reach ? value : NaN));
  for (let round = 0; round < smoothings; round++) clean = smoothOnce(clean);
  return clean;
}

/** 1-2-1 weights; beside a gap the weights of what is there. */
function smoothOnce(values: Float64Array): Float64Array {
  return values.map((value, at) => {
    if (Number.isNaN(value)) return NaN;
    let [sum, weight] = [2 * value, 2];
    for (const near of [values[at - 1], values[at + 1]]) {
      if (near === undefined || Number.isNaN(near)) continue;
      sum += near;
      weight++;
    }
    return sum / weight;
  });
}
