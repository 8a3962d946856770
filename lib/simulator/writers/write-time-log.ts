import type { MachineLog } from "@/lib/logs/machine-log";

/** A value of a time log: its identifier, its device element, and its raw number at a record (NaN where the log has none). */
export interface WrittenValue {
  ddi: number;
  element: string;
  at(record: number): number;
}

/** 1980-01-01, where the days of a time log begin. */
const EPOCH_MS = Date.UTC(1980, 0, 1);
const DAY_MS = 86_400_000;
const HEAD_BYTES = 16;
const VALUE_BYTES = 5;
const GNSS_FIX = 4;
/** "No value", as controllers send it (from memory). */
const NO_VALUE = -2_147_483_648;

/** The binary half of a time log with north, east and status in each record; a value is written when it changes (ISO 11783-10 annex D). */
export function writeTimeLogBinary(
  log: MachineLog,
  values: readonly WrittenValue[],
  clockAheadMin: number,
): Uint8Array {
  if (values.length > 255) throw new Error(`a time log has at most 255 values a record, got ${values.length}`);
  const bytes = new Uint8Array(log.records * (HEAD_BYTES + VALUE_BYTES * values.length));
  const view = new DataView(bytes.buffer);
  const last = values.map(() => NaN);
  let at = 0;
  for (let record = 0; record < log.records; record += 1) {
    const clockMs = Math.round((log.timeMs[record] ?? 0) + clockAheadMin * 60_000) - EPOCH_MS;
    view.setUint32(at, clockMs % DAY_MS, true);
    view.setUint16(at + 4, Math.floor(clockMs / DAY_MS), true);
    view.setInt32(at + 6, degrees(log.latitude[record]), true);
    view.setInt32(at + 10, degrees(log.longitude[record]), true);
    view.setUint8(at + 14, Number.isNaN(log.latitude[record] ?? NaN) ? 0 : GNSS_FIX);
    const countAt = at + HEAD_BYTES - 1;
    at += HEAD_BYTES;
    values.forEach((value, place) => {
      const exact = value.at(record);
      const raw = Number.isNaN(exact) ? NO_VALUE : Math.round(exact);
      if (raw === last[place]) return;
      last[place] = raw;
      view.setUint8(at, place);
      view.setInt32(at + 1, raw, true);
      at += VALUE_BYTES;
      view.setUint8(countAt, view.getUint8(countAt) + 1);
    });
  }
  return bytes.slice(0, at);
}

/** Ten-millionths of a degree; 0 where the receiver has no fix. */
function degrees(value: number | undefined): number {
  return value === undefined || Number.isNaN(value) ? 0 : Math.round(value * 1e7);
}
