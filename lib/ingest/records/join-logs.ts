import { ingestError, type IngestError } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";
import { readingRoom } from "@/lib/ingest/records/growing-columns";
import type { FilePart } from "@/lib/logs/file-parts";
import type { LogChannel, LogNote, MachineLog } from "@/lib/logs/machine-log";
import { fail, succeed, type Result } from "@/lib/result";

export interface JoinedLogs {
  log: MachineLog;
  notes: LogNote[];
  /** The stretches of the whole in order: `file` is a log's place among those given. */
  parts: FilePart[];
}

/**
 * Several logs read by one mapping as one: in the order of their first time where all have one, else as given. A channel that
 * a part lacks is missing there; a part with fewer rows lacks the rows to the right. Relative times of later parts follow on.
 */
export function joinLogs(logs: readonly MachineLog[]): Result<JoinedLogs, IngestError> {
  const records = logs.reduce((sum, log) => sum + log.records, 0);
  const rows = Math.max(...logs.map((log) => log.rows));
  const channelIds = [...new Set(logs.flatMap((log) => log.channels.map((channel) => channel.id)))];
  if (records > READ_LIMITS.records || records * rows * channelIds.length > READ_LIMITS.readings * 1.5) {
    return fail(
      ingestError(
        records > READ_LIMITS.records ? "too-many-records" : "too-many-readings",
        `Together the files hold ${records.toLocaleString("en-US")} records of ${rows} rows, more than one log may have. Upload fewer of them as one log.`,
      ),
    );
  }
  const ordered = orderByTime(logs);
  const first = ordered[0] as MachineLog;
  const notes = noteOverlap(ordered);
  const log: MachineLog = {
    kind: first.kind,
    records,
    rows,
    timeMs: joinArrays(Float64Array, ordered, (part) => part.timeMs, NaN),
    timeIsRelative: first.timeIsRelative,
    longitude: joinArrays(Float64Array, ordered, (part) => part.longitude, NaN),
    latitude: joinArrays(Float64Array, ordered, (part) => part.latitude, NaN),
    headingDeg: first.headingDeg && joinArrays(Float32Array, ordered, (part) => part.headingDeg, NaN),
    speedMps: first.speedMps && joinArrays(Float32Array, ordered, (part) => part.speedMps, NaN),
    working: first.working && joinArrays(Uint8Array, ordered, (part) => part.working, 0),
    loggedPass: first.loggedPass && joinArrays(Int32Array, ordered, (part) => part.loggedPass, 0),
    sourceLine: joinSourceLines(ordered, records),
    channels: channelIds.flatMap((id) => joinChannel(ordered, id, rows)),
  };
  return succeed({ log, notes, parts: partsOf(logs, ordered) });
}

function firstTimeMs({ timeMs }: MachineLog): number {
  return timeMs.find((ms) => !Number.isNaN(ms)) ?? NaN;
}

/** Parts that count their time from their own start cannot be put in order by it. */
function orderByTime(logs: readonly MachineLog[]): MachineLog[] {
  const canOrder = logs.every((log) => !log.timeIsRelative && !Number.isNaN(firstTimeMs(log)));
  return canOrder ? [...logs].sort((a, b) => firstTimeMs(a) - firstTimeMs(b)) : [...logs];
}

/** Says when parts run into each other: the same work may be in two of them. */
function noteOverlap(ordered: readonly MachineLog[]): LogNote[] {
  if (ordered.some((log) => log.timeIsRelative)) {
    if (ordered.length < 2) return [];
    const message =
      "The files count their time each from its own start, so they were put together in the order they were given.";
    return [{ code: "parts-as-given", count: ordered.length, message }];
  }
  let [latest, overlaps] = [-Infinity, 0];
  for (const log of ordered) {
    if (firstTimeMs(log) < latest) overlaps++;
    for (const ms of log.timeMs) if (ms > latest) latest = ms;
  }
  if (overlaps === 0) return [];
  const message = `${overlaps === 1 ? "One file begins" : `${overlaps} files begin`} before the one before it ends: the same work may be in both. Check the map for passes driven twice.`;
  return [{ code: "parts-overlap", count: overlaps, message }];
}

type NumberArray = Float64Array | Float32Array | Int32Array | Uint8Array;

// kernel: the kind of array, the parts, what to take of each, and what stands where a part has none
function joinArrays<T extends NumberArray>(
  kind: new (length: number) => T,
  logs: readonly MachineLog[],
  take: (log: MachineLog) => T | null,
  absent: number,
): T {
  const joined = new kind(logs.reduce((sum, log) => sum + log.records, 0));
  let at = 0;
  for (const log of logs) {
    const part = take(log);
    if (part) joined.set(part, at);
    else joined.fill(absent, at, at + log.records);
    at += log.records;
  }
  return joined;
}

/** Lines count on from part to part, so that no two records of the whole name the same. */
function joinSourceLines(logs: readonly MachineLog[], records: number): Uint32Array {
  const joined = new Uint32Array(records);
  let at = 0;
  let before = 0;
  for (const { sourceLine, records: count } of logs) {
    for (let i = 0; i < count; i++) joined[at + i] = before + (sourceLine[i] ?? 0);
    before = joined[at + count - 1] ?? before;
    at += count;
  }
  return joined;
}

/** Where the records of each log came to lie, and how far its lines were moved by `joinSourceLines`. */
function partsOf(given: readonly MachineLog[], ordered: readonly MachineLog[]): FilePart[] {
  let before = 0;
  return ordered.map((log) => {
    const part = { file: given.indexOf(log), records: log.records, linesBefore: before };
    before += log.sourceLine[log.records - 1] ?? 0;
    return part;
  });
}

function joinChannel(logs: readonly MachineLog[], id: LogChannel["id"], rows: number): LogChannel[] {
  const parts = logs.map((log) => log.channels.find((channel) => channel.id === id));
  const model = parts.find((part) => part !== undefined);
  if (!model) return [];
  const width = model.perRow ? rows : 1;
  const values = readingRoom(logs.reduce((sum, log) => sum + log.records, 0) * width);
  let at = 0;
  logs.forEach((log, index) => {
    const part = parts[index];
    for (let record = 0; part && record < log.records; record++) {
      values.set(part.values.subarray(record * part.rows, (record + 1) * part.rows), (at + record) * width);
    }
    at += log.records;
  });
  const steps = parts.flatMap((part) => part?.resolution ?? []);
  return [{ ...model, rows: width, values, resolution: steps.length === 0 ? null : Math.min(...steps) }];
}
