import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { longestStepS } from "@/lib/passes/drivable-distance";
import { passSteps } from "@/lib/rows/pass-members";

/**
 * Distance each row travelled since the record before in the same pass, metres, row-major by record; the first record of a
 * pass takes the distance to the next; the only record of a pass takes what the machine drove in the step beside it. 0 for
 * records in no pass. The weight of every statistic.
 */
export function rowDistances(placed: PlacedLog): Float32Array {
  const { rows } = placed.geometry;
  const distances = new Float32Array(placed.log.records * rows);
  const maxS = longestStepS(placed.log.timeMs);
  for (const pass of placed.passes) {
    for (const step of passSteps(placed, pass)) {
      const into = distances.subarray(step.record * rows, (step.record + 1) * rows);
      if (step.before >= 0) fillStep(placed, { from: step.before, to: step.record, into });
      else if (step.after >= 0) fillStep(placed, { from: step.record, to: step.after, into });
      else into.fill(loneStepM(placed, step.record, maxS));
    }
  }
  return distances;
}

/**
 * What the machine drove in the step that leads to a lone record, or else away from it: speed times time, since the
 * positions may be a jump apart. 0 where no step within `maxS` seconds or no speed tells.
 */
function loneStepM(placed: PlacedLog, record: number, maxS: number): number {
  const { timeMs } = placed.log;
  const seconds = [timeMs[record]! - timeMs[record - 1]!, timeMs[record + 1]! - timeMs[record]!]
    .map((milliseconds) => milliseconds / 1000)
    .find((step) => step > 0 && step <= maxS);
  const speedMps = placed.speedMps[record]!;
  return seconds !== undefined && speedMps > 0 ? speedMps * seconds : 0;
}

function fillStep(placed: PlacedLog, step: { from: number; to: number; into: Float32Array }): void {
  const { offsetM, forwardM } = placed.geometry;
  const a = placed.headingDeg[step.from]! * RADIANS_PER_DEGREE;
  const b = placed.headingDeg[step.to]! * RADIANS_PER_DEGREE;
  const dSin = Math.sin(b) - Math.sin(a);
  const dCos = Math.cos(b) - Math.cos(a);
  const dEast = placed.originEastM[step.to]! - placed.originEastM[step.from]!;
  const dNorth = placed.originNorthM[step.to]! - placed.originNorthM[step.from]!;
  for (let row = 0; row < step.into.length; row++) {
    const east = dEast + forwardM[row]! * dSin + offsetM[row]! * dCos;
    const north = dNorth + forwardM[row]! * dCos - offsetM[row]! * dSin;
    step.into[row] = Math.sqrt(east * east + north * north);
  }
}
