import {
  POSITION_PARTS,
  type PositionPart,
  type TimeLogHeader,
} from "@/lib/ingest/formats/task-data/read-time-log-header";

/** One record while it is shown; the object is used again for the next. NaN where the file holds nothing. */
export interface TimeRecord {
  /** From 1. */
  number: number;
  /** Milliseconds since 1970 by the machine's own clock, as if it were UTC. */
  clockMs: number;
  /** By the receiver, UTC. */
  utcMs: number;
  latitude: number;
  longitude: number;
  upM: number;
  status: number;
  pdop: number;
  hdop: number;
  satellites: number;
  /** Raw values in the order of the header. One that is not repeated keeps its last. */
  raw: Float64Array;
}

export interface ScanOutcome {
  records: number;
  /** The file ends inside a record. */
  isCut: boolean;
  /** Values whose place is not in the header. */
  strangers: number;
  firstStranger: number;
}

/** 1980-01-01. */
const EPOCH_MS = 315_532_800_000;
const DAY_MS = 86_400_000;
/** The lowest whole number of 32 bits, which controllers send for "no value" (from memory). */
const NO_VALUE = -2_147_483_648;
const TIME_BYTES = 6;
const VALUE_BYTES = 5;

/**
 * kernel: shows the records of the binary half of a time log one after another; `take` may return false to stop.
 * Layout (ISO 11783-10 annex D, little-endian): uint32 milliseconds since midnight, uint16 days since 1980-01-01, the parts of
 * the position that the header leaves empty, uint8 count of values, and for each uint8 place in the header and int32 value.
 */
export function scanTimeLog(
  bytes: Uint8Array,
  header: TimeLogHeader,
  take: (record: TimeRecord) => boolean | void,
): ScanOutcome {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const positionBytes = header.parts.reduce((sum, part) => sum + POSITION_PARTS[part].bytes, 0);
  const record: TimeRecord = { ...NOTHING, raw: Float64Array.from(header.values, (value) => value.startValue) };
  const outcome: ScanOutcome = { records: 0, isCut: false, strangers: 0, firstStranger: 0 };
  let at = 0;
  while (at < bytes.length) {
    const countAt = at + TIME_BYTES + positionBytes;
    const end = countAt + 1 + VALUE_BYTES * (countAt < bytes.length ? bytes[countAt]! : 0);
    if (countAt >= bytes.length || end > bytes.length) {
      outcome.isCut = true;
      break;
    }
    outcome.records++;
    record.number = outcome.records;
    record.clockMs = toMs(view.getUint16(at + 4, true), view.getUint32(at, true));
    readPosition(view, at + TIME_BYTES, { parts: header.parts, record });
    for (let valueAt = countAt + 1; valueAt < end; valueAt += VALUE_BYTES) {
      const place = bytes[valueAt]!;
      if (place < record.raw.length) {
        const value = view.getInt32(valueAt + 1, true);
        record.raw[place] = value === NO_VALUE ? NaN : value;
      } else if (++outcome.strangers === 1) outcome.firstStranger = record.number;
    }
    at = end;
    if (take(record) === false) break;
  }
  return outcome;
}

/** Whole records of a time log: only their lengths are looked at. */
export function countRecords(bytes: Uint8Array, header: TimeLogHeader): number {
  const headBytes = TIME_BYTES + header.parts.reduce((sum, part) => sum + POSITION_PARTS[part].bytes, 0) + 1;
  let records = 0;
  for (let at = 0; at + headBytes <= bytes.length; records++) {
    at += headBytes + VALUE_BYTES * bytes[at + headBytes - 1]!;
    if (at > bytes.length) break;
  }
  return records;
}

const NOTHING = {
  number: 0,
  clockMs: NaN,
  utcMs: NaN,
  latitude: NaN,
  longitude: NaN,
  upM: NaN,
  status: NaN,
  pdop: NaN,
  hdop: NaN,
  satellites: NaN,
};

function toMs(days: number, ms: number): number {
  return EPOCH_MS + days * DAY_MS + ms;
}

function readPosition(
  view: DataView,
  start: number,
  { parts, record }: { parts: readonly PositionPart[]; record: TimeRecord },
): void {
  let at = start;
  let utcTimeMs = NaN;
  for (const part of parts) {
    if (part === "A") record.latitude = view.getInt32(at, true) / 1e7;
    else if (part === "B") record.longitude = view.getInt32(at, true) / 1e7;
    else if (part === "C") record.upM = view.getInt32(at, true) / 1000;
    else if (part === "D") record.status = view.getUint8(at);
    else if (part === "E") record.pdop = view.getUint16(at, true) / 10;
    else if (part === "F") record.hdop = view.getUint16(at, true) / 10;
    else if (part === "G") record.satellites = view.getUint8(at);
    else if (part === "H") utcTimeMs = view.getUint32(at, true);
    else record.utcMs = toMs(view.getUint16(at, true), utcTimeMs);
    at += POSITION_PARTS[part].bytes;
  }
}
