import type { LogChannel } from "@/lib/logs/machine-log";
import type { Pass } from "@/lib/logs/placed-log";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";

export type Element = "f4" | "f8" | "u4";
export type PackedArray = Float32Array | Float64Array | Uint32Array | Int32Array | Uint8Array;

/** One array that is stored: a channel, or (under `record:`) something about every record. */
export interface PackedColumn {
  channel: string;
  unit: string;
  element: Element;
  rows: number;
  values: PackedArray;
}

/** A run of records stored together: a pass, or (pass 0) records between passes. */
export interface RecordRun {
  pass: number;
  first: number;
  records: number;
}

/** Cuts all records into runs, in the file's order. */
export function recordRuns(passes: readonly Pass[], records: number): RecordRun[] {
  const runs: RecordRun[] = [];
  let at = 0;
  for (const pass of [...passes].sort((a, b) => a.first - b.first)) {
    if (pass.first > at) runs.push({ pass: 0, first: at, records: pass.first - at });
    const end = pass.first + pass.records;
    const first = Math.max(at, pass.first);
    if (end > first) runs.push({ pass: pass.pass, first, records: end - first });
    at = Math.max(at, end);
  }
  if (at < records) runs.push({ pass: 0, first: at, records: records - at });
  return runs;
}

/** What is kept about every record besides its readings, so that a log is rebuilt exactly as it was placed. */
export const RECORD_COLUMNS = {
  "record:time": { unit: "ms", element: "f8" },
  "record:longitude": { unit: "deg", element: "f8" },
  "record:latitude": { unit: "deg", element: "f8" },
  "record:loggedHeading": { unit: "deg", element: "f4" },
  "record:loggedSpeed": { unit: "m/s", element: "f4" },
  "record:working": { unit: "boolean", element: "u4" },
  "record:loggedPass": { unit: "1", element: "f8" },
  "record:sourceLine": { unit: "1", element: "u4" },
  "record:originEast": { unit: "m", element: "f8" },
  "record:originNorth": { unit: "m", element: "f8" },
  "record:heading": { unit: "deg", element: "f4" },
  "record:speed": { unit: "m/s", element: "f4" },
  "record:flags": { unit: "1", element: "u4" },
  "record:passOf": { unit: "1", element: "u4" },
} as const satisfies Record<string, { unit: string; element: Element }>;
export type RecordColumnName = keyof typeof RECORD_COLUMNS;

/** Every array of a placed log that is stored. Logged ones the file did not have are left out. */
export function packedColumns(placed: PackedPlacedLog): PackedColumn[] {
  const { log } = placed;
  const values: Record<RecordColumnName, PackedArray | null> = {
    "record:time": log.timeMs,
    "record:longitude": log.longitude,
    "record:latitude": log.latitude,
    "record:loggedHeading": log.headingDeg,
    "record:loggedSpeed": log.speedMps,
    "record:working": log.working,
    "record:loggedPass": log.loggedPass,
    "record:sourceLine": log.sourceLine,
    "record:originEast": placed.originEastM,
    "record:originNorth": placed.originNorthM,
    "record:heading": placed.headingDeg,
    "record:speed": placed.speedMps,
    "record:flags": placed.flags,
    "record:passOf": placed.passOf,
  };
  const names = Object.keys(RECORD_COLUMNS) as RecordColumnName[];
  const records = names.flatMap((name) => {
    const array = values[name];
    return array ? [{ channel: name, rows: 1, values: array, ...RECORD_COLUMNS[name] }] : [];
  });
  return [...records, ...log.channels.map(channelColumn)];
}

function channelColumn(channel: LogChannel): PackedColumn {
  return { channel: channel.id, unit: channel.unit, element: "f4", rows: channel.rows, values: channel.values };
}

/** Little-endian bytes of a run of a column: a view where the array is stored as it is, else a converted copy. */
export function packRun(column: PackedColumn, run: RecordRun): Uint8Array {
  const part = column.values.subarray(run.first * column.rows, (run.first + run.records) * column.rows);
  const stored = toElement(part, column.element);
  return new Uint8Array(stored.buffer, stored.byteOffset, stored.byteLength);
}

function toElement(part: PackedArray, element: Element): Float32Array | Float64Array | Uint32Array {
  if (element === "f4") return part instanceof Float32Array ? part : Float32Array.from(part);
  if (element === "f8") return part instanceof Float64Array ? part : Float64Array.from(part);
  return part instanceof Uint32Array ? part : Uint32Array.from(part);
}
