import { stopReading } from "@/lib/ingest/ingest-error";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";

/** A long file has so many lines a record and row: with more room than that, rows of one record stand apart. */
const MOST_ROOM = 1.5;

/** Records of a long file whose lines do not stand together are put together, with a note. Stops with `records-not-together`. */
export function regroupScattered(log: MachineLog, linesTaken: number, notes: NoteBook): MachineLog {
  if (log.rows < 2 || log.records < 2) return log;
  const isScattered = log.records === linesTaken;
  if (!isScattered && log.records * log.rows < linesTaken * MOST_ROOM) return log;
  const regrouped = regroupRecords(log);
  if (regrouped) {
    notes.set("regrouped", regrouped.records);
    // They were true of the lines, and are not of the records.
    notes.drop("out-of-order");
    notes.drop("duplicate-times");
    return regrouped;
  }
  if (!isScattered) return log;
  stopReading(
    "records-not-together",
    "In this long file no two lines belong to the same record: no two share their time, position and pass. Check which columns those are.",
  );
}

/**
 * Puts the records of a long file together that belong to one: same time, position and pass, each with rows the others do not
 * have, as when a file is sorted by row. Records then stand in order of time (the order of the file where there is none).
 * Null where nothing is to be put together. Records without a time and a position are left as they are. Cost: one map of keys.
 */
export function regroupRecords(log: MachineLog): MachineLog | null {
  const groups = groupRecords(log);
  if (groups.length === log.records) return null;
  const { timeMs } = log;
  const first = (group: readonly number[]) => group[0] ?? 0;
  const hasTimes = !timeMs.subarray(0, log.records).some(Number.isNaN);
  if (hasTimes) groups.sort((a, b) => (timeMs[first(a)] ?? 0) - (timeMs[first(b)] ?? 0) || first(a) - first(b));
  const heads = Uint32Array.from(groups, first);
  return {
    ...log,
    records: groups.length,
    timeMs: pick(log.timeMs, heads),
    longitude: pick(log.longitude, heads),
    latitude: pick(log.latitude, heads),
    headingDeg: log.headingDeg && pick(log.headingDeg, heads),
    speedMps: log.speedMps && pick(log.speedMps, heads),
    working: log.working && mergeWorking(log.working, groups),
    loggedPass: log.loggedPass && pick(log.loggedPass, heads),
    sourceLine: pick(log.sourceLine, heads),
    channels: log.channels.map((channel) => mergeChannel(channel, groups)),
  };
}

/** Records of one key that share no row, in order of first appearance. */
function groupRecords(log: MachineLog): number[][] {
  const groups: number[][] = [];
  /** The groups of a key: a machine that stands still logs the same place again. */
  const ofKey = new Map<string, { group: number[]; rows: Set<number> }[]>();
  for (let record = 0; record < log.records; record++) {
    const key = keyOf(log, record);
    const rows = filledRows(log, record);
    const known = key === null ? [] : (ofKey.get(key) ?? []);
    const free = known.find((candidate) => rows.every((row) => !candidate.rows.has(row)));
    if (free) {
      free.group.push(record);
      for (const row of rows) free.rows.add(row);
      continue;
    }
    const group = [record];
    groups.push(group);
    if (key !== null) ofKey.set(key, [...known, { group, rows: new Set(rows) }]);
  }
  return groups;
}

function keyOf({ timeMs, longitude, latitude, loggedPass }: MachineLog, record: number): string | null {
  const [time, x, y] = [timeMs[record] ?? NaN, longitude[record] ?? NaN, latitude[record] ?? NaN];
  if (Number.isNaN(time) && Number.isNaN(x)) return null;
  return `${time} ${x} ${y} ${loggedPass?.[record] ?? ""}`;
}

function filledRows({ channels, rows }: MachineLog, record: number): number[] {
  const filled: number[] = [];
  for (let row = 0; row < rows; row++) {
    const has = channels.some(({ perRow, values }) => perRow && !Number.isNaN(values[record * rows + row] ?? NaN));
    if (has) filled.push(row);
  }
  return filled;
}

type Column = Float64Array | Float32Array | Uint32Array | Int32Array;

function pick<T extends Column>(values: T, records: Uint32Array): T {
  const picked = new (values.constructor as new (length: number) => T)(records.length);
  records.forEach((record, i) => (picked[i] = values[record] ?? NaN));
  return picked;
}

function mergeWorking(working: Uint8Array, groups: readonly (readonly number[])[]): Uint8Array {
  return Uint8Array.from(groups, (group) => Math.max(...group.map((record) => working[record] ?? 0)));
}

function mergeChannel(channel: LogChannel, groups: readonly (readonly number[])[]): LogChannel {
  const { rows, values } = channel;
  const merged = new Float32Array(groups.length * rows).fill(NaN);
  groups.forEach((group, at) => {
    for (const record of group) {
      for (let row = 0; row < rows; row++) {
        const value = values[record * rows + row] ?? NaN;
        if (!Number.isNaN(value)) merged[at * rows + row] = value;
      }
    }
  });
  return { ...channel, values: merged };
}
