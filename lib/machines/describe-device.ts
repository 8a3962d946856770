import type { LoggedDevice } from "@/lib/ingest/log-format";
import type { Seeder } from "@/lib/machines/machine";

/** Machines are built and described to the centimetre; less than this is rounding. */
const EVEN_WITHIN_M = 0.005;
const LEVEL_WITHIN_M = 0.02;

/** What a file's description of its machine comes to. Metres. */
export interface DeviceMeasures {
  rowCount: number;
  /** Middle distance between neighbouring rows. */
  rowSpacingM: number;
  /** Over the outer edges of the outermost rows. */
  widthM: number;
  /** Rows stand evenly about the centre line. */
  isEven: boolean;
  /** Rows stand in one line across. */
  isLevel: boolean;
}

function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? NaN;
  return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? NaN) + upper) / 2;
}

/** Where rows stand that are spread evenly about the centre line; right of it positive. */
export function evenOffsetsM(rowCount: number, rowSpacingM: number): number[] {
  return Array.from({ length: rowCount }, (_, index) => (index - (rowCount - 1) / 2) * rowSpacingM);
}

/** @param device with at least two rows, ordered from left to right */
export function measureDevice({ rows, rowOffsetsM, rowForwardM, rowWidthsM }: LoggedDevice): DeviceMeasures {
  const steps = rowOffsetsM.slice(1).map((offset, index) => offset - (rowOffsetsM[index] ?? NaN));
  const rowSpacingM = Math.round(medianOf(steps) * 1e4) / 1e4;
  const [first = NaN, last = NaN] = [rowOffsetsM[0], rowOffsetsM.at(-1)];
  const half = (width: number | null | undefined) => (width ?? rowSpacingM) / 2;
  const even = evenOffsetsM(rows, rowSpacingM);
  return {
    rowCount: rows,
    rowSpacingM,
    widthM: last - first + half(rowWidthsM[0]) + half(rowWidthsM.at(-1)),
    isEven: rowOffsetsM.every((offset, index) => Math.abs(offset - (even[index] ?? NaN)) <= EVEN_WITHIN_M),
    isLevel: rowForwardM.every((forward) => Math.abs(forward) <= LEVEL_WITHIN_M),
  };
}

/**
 * What a machine form can begin with. Where the antenna sits is not in the description: its reference point is the
 * machine's own, so that is left for a person to measure.
 */
export function draftSeeder(device: LoggedDevice): Partial<Seeder> & Pick<Seeder, "kind"> {
  const { rowCount, rowSpacingM, isEven, isLevel } = measureDevice(device);
  return {
    kind: "seeder",
    name: device.name.trim().slice(0, 120),
    rowCount,
    rowSpacingM,
    hitch: "rigid",
    antennaRightM: 0,
    ...(isEven ? {} : { rowOffsetsM: device.rowOffsetsM }),
    ...(isLevel ? {} : { rowForwardM: device.rowForwardM }),
  };
}
