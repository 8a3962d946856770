import { FLAGS, type FlagCode } from "@/lib/cleaning/flags";
import type { LogNote, MachineLog } from "@/lib/logs/machine-log";

/** True where a record has a place on earth; 0, 0 is what receivers write without one. */
export function hasPosition(longitude: number, latitude: number): boolean {
  const inRange = Math.abs(longitude) <= 180 && Math.abs(latitude) <= 90;
  return inRange && !(Math.abs(longitude) < 1e-9 && Math.abs(latitude) < 1e-9);
}

/** Flags that need nothing but the log: no-position, duplicate-time, time-backwards, not-working, standing-still. */
export function flagRecords(log: MachineLog, speedMps: Float32Array, works: Uint8Array): Uint32Array {
  const flags = new Uint32Array(log.records);
  for (let i = 0; i < log.records; i++) {
    let bits = 0;
    if (!hasPosition(log.longitude[i]!, log.latitude[i]!)) bits |= FLAGS["no-position"];
    if (i > 0) bits |= timeFlag(log.timeMs[i - 1]!, log.timeMs[i]!);
    if (works[i] !== 1) bits |= FLAGS["not-working"];
    if (speedMps[i]! < STANDING_STILL_MPS) bits |= FLAGS["standing-still"];
    flags[i] = bits;
  }
  return flags;
}

/** Slower than this the machine stands; the smallest speed at which a course can still be read from positions. */
export const STANDING_STILL_MPS = 0.3;

function timeFlag(before: number, now: number): number {
  if (now === before) return FLAGS["duplicate-time"];
  return now < before ? FLAGS["time-backwards"] : 0;
}

/**
 * Which records work, whatever their position: the log's own column, or, where it has none, every record with a reading
 * (in a per-row channel, if the log has any).
 */
export function workingRecords(log: MachineLog): Uint8Array {
  if (log.working) return log.working;
  const works = new Uint8Array(log.records);
  const measuring = log.channels.some((channel) => channel.perRow)
    ? log.channels.filter((channel) => channel.perRow)
    : log.channels;
  if (measuring.length === 0) return works.fill(1);
  for (let i = 0; i < log.records; i++) {
    works[i] = measuring.some(({ values, rows }) => hasReading(values, i * rows, rows)) ? 1 : 0;
  }
  return works;
}

function hasReading(values: Float32Array, base: number, rows: number): boolean {
  for (let k = base; k < base + rows; k++) if (!Number.isNaN(values[k]!)) return true;
  return false;
}

const FLAG_SENTENCES: Record<FlagCode, string> = {
  "no-position": "have no usable position (missing, out of range, or 0, 0) and stand on no map",
  "duplicate-time": "carry the same time as the record before",
  "impossible-step": "jump further than the machine could have driven (over 1.5 times speed times time, and 1 m)",
  "not-working": "were logged with the machine not working",
  "short-pass": "belong to passes under 10 m or 10 records; they still count",
  turning: "were logged in turns of more than 45 degrees within 15 m",
  "standing-still": "were logged under 0.3 m/s",
  "hitch-unsettled":
    "come before the trailed machine had run three drawbar lengths straight on: row places are less sure",
  "time-backwards": "have a time before that of the record before",
  "jack-knife": "have the drawbar more than 70 degrees off the course: row places are not to be trusted",
  reversing: "were logged while the machine ran backwards; a trailed machine's row places are a guess there",
};

/** One note for each reason code that occurs, with its count and the first line of the file. */
export function flagNotes(log: MachineLog, flags: Uint32Array): LogNote[] {
  return (Object.keys(FLAGS) as FlagCode[]).flatMap((code) => {
    const bit = FLAGS[code];
    const first = flags.findIndex((bits) => (bits & bit) !== 0);
    if (first < 0) return [];
    const count = flags.reduce((sum, bits) => sum + ((bits & bit) !== 0 ? 1 : 0), 0);
    const message = `${count} of ${log.records} records ${FLAG_SENTENCES[code]}.`;
    return [{ code, message, count, firstLine: log.sourceLine[first] }];
  });
}
