import type { LeftOut } from "@/lib/cleaning/left-out";
import type { LocalPlane } from "@/lib/geo/local-plane";
import type { LogFileParts } from "@/lib/logs/file-parts";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { Seeder } from "@/lib/machines/machine";

/** Where each row sits on the toolbar. Arrays have one entry a row; row 1 first. */
export interface RowGeometry {
  rows: number;
  /** Right of the implement's centre line, metres. */
  offsetM: Float64Array;
  /** Ahead of the line of rows, metres. */
  forwardM: Float64Array;
  /** Width of ground each row answers for, metres. */
  widthM: Float64Array;
}

/** A run of records worked without a break, numbered from 1 in time order; records `first .. first + records - 1` of the log. */
export interface Pass {
  pass: number;
  first: number;
  records: number;
  startedAtMs: number;
  endedAtMs: number;
  /** Circular mean of the machine's heading, clockwise from north. */
  headingDeg: number;
  lengthM: number;
  headland: boolean;
}

/**
 * A log on the ground. All arrays have one entry a record.
 * Row r of record i stands at
 *   east  = originEastM[i]  + forwardM[r] * sin(h) + offsetM[r] * cos(h)
 *   north = originNorthM[i] + forwardM[r] * cos(h) - offsetM[r] * sin(h),  h = headingDeg[i] as radians.
 */
export interface PlacedLog {
  log: MachineLog;
  /** The machine that made it; null when nobody said (rows are then spread evenly by a stated guess). */
  machine: Seeder | null;
  geometry: RowGeometry;
  plane: LocalPlane;
  /** Where the implement's centre line meets the line of rows, in the plane; NaN without a position. */
  originEastM: Float64Array;
  originNorthM: Float64Array;
  /** Heading of the implement, clockwise from north. */
  headingDeg: Float32Array;
  /** Speed of the implement along the ground. */
  speedMps: Float32Array;
  /** Bits of `FLAGS` (lib/cleaning/flags.ts). */
  flags: Uint32Array;
  /** Pass number, or 0 for a record in no pass (not working, or without a position). */
  passOf: Int32Array;
  passes: Pass[];
  /** What cleaning rules took out of the channels; absent for a log as it was read. */
  leftOut?: LeftOut;
  /** Of a log in several files, where it is asked from which of them records came. */
  fileParts?: LogFileParts;
}
