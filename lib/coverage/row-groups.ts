import type { RowGeometry } from "@/lib/logs/placed-log";

/** Neighbouring rows whose ground joins without a gap: one strip. Right of the centre line and ahead positive. */
export interface RowGroup {
  leftM: number;
  rightM: number;
  forwardM: number;
}

/** Edges closer than this join: a millimetre is below what any row spacing is given to. */
const JOIN_M = 0.001;

/** The strips of a machine: one where all rows stand in line, one a row where ranks alternate; without the rows that are off. */
export function groupRows(geometry: RowGeometry, isOff?: (row: number) => boolean): RowGroup[] {
  const order = Array.from({ length: geometry.rows }, (_, row) => row).sort(
    (a, b) => geometry.offsetM[a]! - geometry.offsetM[b]!,
  );
  const groups: RowGroup[] = [];
  for (const row of order) {
    if (isOff?.(row)) continue;
    const leftM = geometry.offsetM[row]! - geometry.widthM[row]! / 2;
    const rightM = leftM + geometry.widthM[row]!;
    const forwardM = geometry.forwardM[row]!;
    const last = groups[groups.length - 1];
    if (last && last.forwardM === forwardM && Math.abs(last.rightM - leftM) < JOIN_M) last.rightM = rightM;
    else groups.push({ leftM, rightM, forwardM });
  }
  return groups;
}
