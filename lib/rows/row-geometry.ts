import type { RowGeometry } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";

/** Rows of a machine evenly spaced about its centre line, in one line. */
export function evenRowGeometry(rows: number, spacingM: number): RowGeometry {
  return {
    rows,
    offsetM: Float64Array.from({ length: rows }, (_, i) => (i - (rows - 1) / 2) * spacingM),
    forwardM: new Float64Array(rows),
    widthM: new Float64Array(rows).fill(spacingM),
  };
}

/** Rows of a described machine; its own lists of offsets override even spacing. Each row answers for one row spacing. */
export function machineRowGeometry(machine: Seeder): RowGeometry {
  const even = evenRowGeometry(machine.rowCount, machine.rowSpacingM);
  return {
    ...even,
    offsetM: machine.rowOffsetsM ? Float64Array.from(machine.rowOffsetsM) : even.offsetM,
    forwardM: machine.rowForwardM ? Float64Array.from(machine.rowForwardM) : even.forwardM,
  };
}

/** Width from the outer edge of the leftmost row's ground to that of the rightmost. */
export function implementWidthM(geometry: RowGeometry): number {
  let left = Infinity;
  let right = -Infinity;
  for (let row = 0; row < geometry.rows; row++) {
    left = Math.min(left, geometry.offsetM[row]! - geometry.widthM[row]! / 2);
    right = Math.max(right, geometry.offsetM[row]! + geometry.widthM[row]! / 2);
  }
  return right - left;
}
