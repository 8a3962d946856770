import type { ChannelId } from "@/lib/logs/channel";

/** SI units that a channel is kept in. `fraction` is 0..1; `1` is a bare number whose unit nobody stated. */
export type SiUnit =
  "N" | "m" | "m2" | "m/s" | "s" | "deg" | "fraction" | "boolean" | "1" | "1/m2" | "kg/m2" | "kg/s" | "kg" | "Pa";

/** One measured channel. `values` is row-major by record: `values[record * rows + (row - 1)]`; NaN where nothing was logged. */
export interface LogChannel {
  id: ChannelId;
  unit: SiUnit;
  /** Values a record: the log's row count for a per-row channel, else 1. */
  rows: number;
  perRow: boolean;
  values: Float32Array;
  /** Smallest step between two distinct values seen (the log's own rounding), in `unit`; null when it never changes. */
  resolution: number | null;
}

/**
 * A machine log after reading: one entry a record, in the file's order, SI units, WGS 84 degrees.
 * NaN (or null for a whole column) where the file said nothing. Records without a usable position are kept, with NaN.
 */
export interface MachineLog {
  kind: "seeding" | "harvest" | "other";
  records: number;
  /** Rows of the per-row channels; 1 where the log has none. */
  rows: number;
  /** Milliseconds since 1970-01-01 UTC; NaN where unknown. Relative times start at 0 with `timeIsRelative`. */
  timeMs: Float64Array;
  timeIsRelative: boolean;
  longitude: Float64Array;
  latitude: Float64Array;
  /** As logged, clockwise from north. */
  headingDeg: Float32Array | null;
  /** As logged, along the ground. */
  speedMps: Float32Array | null;
  /** 1 working, 0 not. Null: the file has no such column, every record with a reading works. */
  working: Uint8Array | null;
  /** Pass numbers as logged. */
  loggedPass: Int32Array | null;
  /** 1-based line (text files) or feature number (others) each record came from, for messages. */
  sourceLine: Uint32Array;
  channels: LogChannel[];
}

/** Something worth telling about a file that was read anyway. */
export interface LogNote {
  code: string;
  message: string;
  count: number;
  firstLine?: number;
  /** Of a log that came in several files: the one it speaks of. */
  file?: string;
}
