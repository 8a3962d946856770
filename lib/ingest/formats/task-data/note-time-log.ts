import type { TimeLog } from "@/lib/ingest/formats/task-data/open-time-log";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import type { LogNote } from "@/lib/logs/machine-log";

/** What a person should know of a time log before its columns are confirmed. */
export function noteTimeLog(log: TimeLog, notes: NoteBook): LogNote[] {
  if (!log.hasUtc) notes.add("local-clock");
  if (log.hasForce) notes.add("no-margin");
  if (log.order.isByNumber) notes.add("rows-by-number");
  for (const column of log.disagreeing) notes.add("presentation-disagrees", undefined, column);
  const device = sayDevice(log);
  return device ? [...notes.list("record"), device] : notes.list("record");
}

function sayDevice({ device }: TimeLog): LogNote | null {
  if (!device) return null;
  const [left, right] = [device.rowOffsetsM[0] ?? NaN, device.rowOffsetsM.at(-1) ?? NaN];
  const behind =
    device.rowsBehindReferenceM === null ? "" : `, ${device.rowsBehindReferenceM.toFixed(2)} m behind that point`;
  const message = `The file describes the machine "${device.name}": ${device.rows} rows from ${sayOffset(left)} to ${sayOffset(right)} of its reference point${behind}. Compare it with the machine you choose.`;
  return { code: "device-rows", count: device.rows, message };
}

function sayOffset(rightM: number): string {
  return `${Math.abs(rightM).toFixed(2)} m ${rightM < 0 ? "left" : "right"}`;
}
