import { axialDifferenceDeg, RADIANS_PER_DEGREE, turnDegrees } from "@/lib/geo/circular-mean";
import type { Stretch } from "@/lib/coverage/pass-stretches";
import type { OverlapCause } from "@/lib/schemas/coverage";

const PARALLEL_DEG = 20;
const SQUARE_DEG = 70;
/** Ground worked twice within this time by a machine that goes on in about the same direction is one working. */
const ONE_WORKING_S = 10;

/**
 * Why two stretches worked the same ground: where a headland pass meets another one squarely or alongside, the headland; where
 * passes meet at an angle, point rows; where two run side by side, less than a width but more than half of one apart, the
 * guess row between them. Anything else (the same line again, a pass that goes on after a stop, a pass that crosses itself) is
 * other. Classes of this program after the causes of common practice.
 */
export function overlapCause(later: Stretch, earlier: Stretch, widthM: number): OverlapCause {
  if (later.pass.pass === earlier.pass.pass || isOneWorking(later, earlier)) return "other";
  const angleDeg = axialDifferenceDeg(later.headingDeg, earlier.headingDeg);
  const isParallel = angleDeg < PARALLEL_DEG;
  if (later.pass.headland && earlier.pass.headland) return "headland";
  if (later.pass.headland || earlier.pass.headland) {
    return isParallel || angleDeg >= SQUARE_DEG ? "headland" : "point-row";
  }
  if (!isParallel) return "point-row";
  return sidewaysM(later, earlier) > widthM / 2 ? "guess-row" : "other";
}

function isOneWorking(later: Stretch, earlier: Stretch): boolean {
  const seconds = (later.startedAtMs - earlier.endedAtMs) / 1000;
  return seconds <= ONE_WORKING_S && Math.abs(turnDegrees(later.headingDeg, earlier.headingDeg)) <= 90;
}

/** Distance of the later stretch's middle from the line of the earlier one. */
function sidewaysM(later: Stretch, earlier: Stretch): number {
  const heading = earlier.headingDeg * RADIANS_PER_DEGREE;
  const [east, north] = [later.eastM - earlier.eastM, later.northM - earlier.northM];
  return Math.abs(east * Math.cos(heading) - north * Math.sin(heading));
}
