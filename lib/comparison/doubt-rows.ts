import { axialDifferenceDeg, turnDegrees } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { mainAxisDeg } from "@/lib/passes/main-axis";

/** Closer to the lines of the harvest than this, a band of residue stays on the same rows for hundreds of metres. */
const PARALLEL_DEG = 10;
/** Passes further off the main direction belong to neither way along it. */
const OFF_AXIS_DEG = 20;
/** Fewer passes than this in one of the two ways say nothing about it. */
const LEAST_EACH_WAY = 3;

/** Why a log cannot tell its rows from the ground under them, in plain words; null where it can. `harvestAxesDeg` of harvest logs of the same field. */
export function doubtRows(placed: PlacedLog, name: string, harvestAxesDeg: readonly number[]): string | null {
  const axis = mainAxisDeg(placed.passes);
  if (axis === null) return `The passes of ${name} have no direction: rows cannot be told from the ground.`;
  const beside = harvestAxesDeg.find((harvest) => axialDifferenceDeg(axis, harvest) < PARALLEL_DEG);
  if (beside !== undefined) {
    const apart = Math.round(axialDifferenceDeg(axis, beside));
    return `${name} was driven along the harvest passes (${apart}° apart): a band of residue stays on the same rows, so no row can be told from the ground. A pass at 10 to 30° across them would tell.`;
  }
  const along = placed.passes.filter((pass) => axialDifferenceDeg(pass.headingDeg, axis) <= OFF_AXIS_DEG);
  const out = along.filter((pass) => Math.abs(turnDegrees(axis, pass.headingDeg)) < 90).length;
  if (Math.min(out, along.length - out) >= LEAST_EACH_WAY) return null;
  return `${name} was driven one way only: what lies on the left of the field always falls on the same rows, so no row can be told from the ground. Passes there and back would tell.`;
}
