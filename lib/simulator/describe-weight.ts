import type { Frame } from "@/lib/machines/machine";
import { wheelLoadN } from "@/lib/simulator/frame-capacity";
import type { WeightTruth } from "@/lib/simulator/simulation-truth";

interface Inputs {
  frame: Frame;
  /** One entry a record: true sum of row forces, and the distance its rows travelled together (0 while lifted). */
  sumOfForcesN: Float64Array;
  distanceM: Float64Array;
  /** Ground that a metre of one row answers for. */
  rowWidthM: number;
}

/** How much wheel load above its minimum the frame had, by distance. The sums are those that reached the rows. */
export function describeWeight({ frame, sumOfForcesN, distanceM, rowWidthM }: Inputs): WeightTruth {
  const worked = [...distanceM.keys()].filter((record) => (distanceM[record] ?? 0) > 0);
  const points = worked
    .map((record) => ({
      headroomN: wheelLoadN(frame, sumOfForcesN[record] ?? 0) - frame.minWheelLoadN,
      weightM: distanceM[record] ?? 0,
    }))
    .sort((a, b) => a.headroomN - b.headroomN);
  const totalM = points.reduce((sum, point) => sum + point.weightM, 0);
  const belowM = points.reduce((sum, point) => (point.headroomN < 0 ? sum + point.weightM : sum), 0);
  return {
    headroomP05N: headroomAt(points, 0.05 * totalM),
    headroomP50N: headroomAt(points, 0.5 * totalM),
    shareBelowMinimum: belowM / totalM,
    belowMinimumM2: belowM * rowWidthM,
  };
}

/** The least headroom that at least `reachM` of the sorted distance stays at or under. */
function headroomAt(points: readonly { headroomN: number; weightM: number }[], reachM: number): number {
  let sumM = 0;
  for (const point of points) {
    sumM += point.weightM;
    if (sumM >= reachM) return point.headroomN;
  }
  return points.at(-1)?.headroomN ?? NaN;
}
