import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import { RADIANS_PER_DEGREE, turnDegrees } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** Turning slower than this counts as straight: heading noise would make more of it than the turn. */
const STRAIGHT_BELOW_RAD_PER_S = 0.5 * RADIANS_PER_DEGREE;

/** Speed of a row `offsetM` right of the centre line while the implement turns clockwise at `turnRateRadPerS`. */
export function rowSpeedMps(speedMps: number, turnRateRadPerS: number, offsetM: number): number {
  return speedMps - turnRateRadPerS * offsetM;
}

/** Turn rate at a record from the headings of its neighbours, clockwise positive; 0 under 0.5 degrees a second or without times. */
function turnRateRadPerS(placed: PlacedLog, record: number): number {
  const pass = placed.passOf[record];
  const from = record > 0 && placed.passOf[record - 1] === pass ? record - 1 : record;
  const to = record + 1 < placed.log.records && placed.passOf[record + 1] === pass ? record + 1 : record;
  const seconds = (placed.log.timeMs[to]! - placed.log.timeMs[from]!) / 1000;
  const turn = turnDegrees(placed.headingDeg[from]!, placed.headingDeg[to]!) * RADIANS_PER_DEGREE;
  const rate = seconds > 0 ? turn / seconds : 0;
  return Math.abs(rate) < STRAIGHT_BELOW_RAD_PER_S || Number.isNaN(rate) ? 0 : rate;
}

/** Ground speed of every row, m/s: v - omega y. Below 0 where a row runs backwards in a tight turn. NaN outside passes. */
export function rowSpeed(placed: PlacedLog): ResolvedChannel {
  const { rows, offsetM } = placed.geometry;
  const values = new Float32Array(placed.log.records * rows).fill(NaN);
  for (let record = 0; record < placed.log.records; record++) {
    if (placed.passOf[record] === 0) continue;
    const rate = turnRateRadPerS(placed, record);
    for (let row = 0; row < rows; row++) {
      values[record * rows + row] = rowSpeedMps(placed.speedMps[record]!, rate, offsetM[row]!);
    }
  }
  return { id: "rowSpeed", unit: "m/s", rows, perRow: true, values, resolution: null, censoredShare: null };
}
