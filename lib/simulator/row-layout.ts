import type { Seeder } from "@/lib/machines/machine";

/** Right-positive place of each row from the centre line, and forward-positive place from the line of rows. */
export interface RowLayout {
  rows: number;
  offsetM: Float64Array;
  forwardM: Float64Array;
  spacingM: number;
}

export function layOutRows(machine: Seeder): RowLayout {
  const rows = machine.rowCount;
  const even = (index: number): number => (index - (rows - 1) / 2) * machine.rowSpacingM;
  return {
    rows,
    offsetM: Float64Array.from({ length: rows }, (_, index) => machine.rowOffsetsM?.[index] ?? even(index)),
    forwardM: Float64Array.from({ length: rows }, (_, index) => machine.rowForwardM?.[index] ?? 0),
    spacingM: machine.rowSpacingM,
  };
}
