import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** Plane position of a row (from 1) at a record (from 0), metres east and north; NaN where the record has no position. */
export function rowPosition(placed: PlacedLog, record: number, row: number): [eastM: number, northM: number] {
  const heading = (placed.headingDeg[record] ?? NaN) * RADIANS_PER_DEGREE;
  const sin = Math.sin(heading);
  const cos = Math.cos(heading);
  const forward = placed.geometry.forwardM[row - 1] ?? NaN;
  const offset = placed.geometry.offsetM[row - 1] ?? NaN;
  return [
    (placed.originEastM[record] ?? NaN) + forward * sin + offset * cos,
    (placed.originNorthM[record] ?? NaN) + forward * cos - offset * sin,
  ];
}

/** The same in degrees. */
export function rowLonLat(placed: PlacedLog, record: number, row: number): [longitude: number, latitude: number] {
  const [eastM, northM] = rowPosition(placed, record, row);
  return placed.plane.toDegrees(eastM, northM);
}
