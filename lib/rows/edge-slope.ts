import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";

/** A frame whose `along` points with a heading and whose `across` points to its right, about a place in the plane. */
export interface TravelFrame {
  eastM: number;
  northM: number;
  headingDeg: number;
}

export function intoFrame(frame: TravelFrame, eastM: number, northM: number): { alongM: number; acrossM: number } {
  const sin = Math.sin(frame.headingDeg * RADIANS_PER_DEGREE);
  const cos = Math.cos(frame.headingDeg * RADIANS_PER_DEGREE);
  const [east, north] = [eastM - frame.eastM, northM - frame.northM];
  return { alongM: east * sin + north * cos, acrossM: east * cos - north * sin };
}

/** Straight line through points: metres along for each metre to the right. */
export interface EdgeSlope {
  slope: number;
  /** Share of the spread that the line explains, 0..1; NaN where there is no spread. */
  explained: number;
}

/** Least squares of along on across; null with fewer than `least` points or all of them in one line of travel. */
export function fitSlope(points: { alongM: number; acrossM: number }[], least = 4): EdgeSlope | null {
  if (points.length < least) return null;
  const meanAlong = points.reduce((sum, point) => sum + point.alongM, 0) / points.length;
  const meanAcross = points.reduce((sum, point) => sum + point.acrossM, 0) / points.length;
  let [both, across, along] = [0, 0, 0];
  for (const { alongM, acrossM } of points) {
    both += (alongM - meanAlong) * (acrossM - meanAcross);
    across += (acrossM - meanAcross) ** 2;
    along += (alongM - meanAlong) ** 2;
  }
  if (!(across > 1e-9)) return null;
  return { slope: both / across, explained: along > 0 ? (both * both) / (across * along) : NaN };
}
