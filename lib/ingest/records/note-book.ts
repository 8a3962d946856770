import type { LogNote } from "@/lib/logs/machine-log";

/** Gathers notes while a file is read: one entry a code (and column), with a count and the first place. */
export class NoteBook {
  private readonly entries = new Map<string, { code: string; count: number; firstLine?: number; column?: string }>();

  add(code: string, line?: number, column?: string): void {
    const key = column === undefined ? code : `${code} ${column}`;
    const entry = this.entries.get(key);
    if (entry) entry.count++;
    else this.entries.set(key, { code, count: 1, firstLine: line, column });
  }

  /** Sets a note whose count was kept elsewhere; nothing is noted for a count of 0. */
  set(code: string, count: number, firstLine?: number): void {
    if (count > 0) this.entries.set(code, { code, count, firstLine });
  }

  /** Takes back notes that no longer hold. */
  drop(code: string): void {
    this.entries.delete(code);
  }

  countOf(code: string): number {
    return this.entries.get(code)?.count ?? 0;
  }

  firstLineOf(code: string): number | undefined {
    return this.entries.get(code)?.firstLine;
  }

  /** The notes, each said by `sayNote`. */
  list(place: string): LogNote[] {
    return [...this.entries.values()].map(({ code, count, firstLine, column }) => ({
      code,
      count,
      ...(firstLine === undefined ? {} : { firstLine }),
      message: sayNote(code, count, { place, firstLine, column }),
    }));
  }
}

interface NotePlace {
  /** What the file counts in: "line", "feature" or "record". */
  place: string;
  firstLine?: number;
  column?: string;
}

/** One sentence for each note code. */
function sayNote(code: string, count: number, { place, firstLine, column }: NotePlace): string {
  const n = (one: string, many: string) => `${count.toLocaleString("en-US")} ${count === 1 ? one : many}`;
  const first = firstLine === undefined ? "" : ` The first is ${place} ${firstLine}.`;
  const records = n("record", "records");
  const sentences: Record<string, string> = {
    "ragged-rows": `${n("line", "lines")} did not have as many fields as the header and ${count === 1 ? "was" : "were"} left out.${first}`,
    "unreadable-value": `${n("cell", "cells")} of column '${column ?? ""}' could not be read as its unit says and ${count === 1 ? "counts" : "count"} as missing.${first}`,
    "zero-position": `${records} stood at longitude 0, latitude 0, which a receiver writes when it has no fix; ${count === 1 ? "its position counts" : "their positions count"} as missing.${first}`,
    "repeated-header": `${n("line", "lines")} within the file repeated the header and ${count === 1 ? "was" : "were"} left out: it was put together from parts.${first}`,
    regrouped: `The lines of one record did not stand together; ${records} were put together by time, place and pass, and ordered by time.`,
    "no-position": `${records} had no position and cannot be placed on the map.${first}`,
    "duplicate-times": `${records} carried the same time as the record before.${first}`,
    "out-of-order": `${records} went back in time; the order of the file was kept.${first}`,
    "bad-row-number": `${n("line", "lines")} had no usable row number and ${count === 1 ? "was" : "were"} left out; rows are numbered from 1 at the left.${first}`,
    "time-without-zone": `${n("time", "times")} named no offset from UTC and ${count === 1 ? "was" : "were"} read as UTC; give the mapping a time zone if they are local.${first}`,
    "row-averaged": `Every row has the same ${column ?? ""} in every record: the file holds one value for the whole machine, and rows cannot be compared.`,
    "working-by-row": "The working state is logged row by row; a record counts as working when any of its rows works.",
    "pressure-not-force": `Column '${column ?? ""}' is a pressure. It is kept in pascals and never shown as a force, because that needs the cylinder area and the linkage.`,
    "deleted-records": `${n("record was", "records were")} marked as deleted in the .dbf and left out.${first}`,
    "null-geometry": `${n("feature", "features")} had no geometry and cannot be placed on the map.${first}`,
    "part-count-mismatch": `The .shp and .dbf parts disagree by ${records}; only the records found in both were read.`,
    "cut-short": "The .shp ends before the length it states: it was cut short on the way.",
    "shapes-without-table": `${n(".shp file has", ".shp files have")} no .dbf beside ${count === 1 ? "it" : "them"} and ${count === 1 ? "was" : "were"} left out.`,
    "area-centres":
      "Each reading belongs to an area; it was placed at the centre of that area, which is where the rows were, not the antenna.",
    "line-midpoints": "Each reading belongs to a line; it was placed halfway along it.",
    "several-points": "Each reading belongs to several points; it was placed at their mean.",
    "no-projection": "The archive has no .prj part; the coordinates look like WGS 84 degrees and were read so.",
    "sentinel-values": `${n("value", "values")} of ${column ?? ""} stood for "nothing here", as the mapping says, and ${count === 1 ? "counts" : "count"} as missing.${first}`,
    "sentinels-proposed": `${column ?? ""}: the value comes again and again far beyond the others, as loggers write for "nothing here". It is proposed as missing; confirm or empty that list.`,
    "never-changes": `The ${column ?? ""} has the same value throughout: a sensor may be stuck or not connected.`,
    "pressure-proposed": `The ${column ?? ""} is a pressure. It is kept as one and never shown as a force, because that needs the cylinder area and the linkage.`,
    "contact-definition":
      "Ground contact is the share of time a gauge wheel carried load in some logs, and a yes or no at the moment of the record in others. The file does not say which: ask whoever set up the machine, and compare logs only of one kind.",
    "newtons-like-kilograms":
      "The downforce is said to be in newtons, but its values would be little for newtons and are usual for kilograms-force. Check the unit: one kilogram-force is 9.8 N.",
    "gps-week-short":
      'The GPS weeks are below 1024. Some receivers begin again at 0 each 1024 weeks: if the dates come out decades too early, give that column the format "from 1024" or "from 2048".',
    "degrees-minutes":
      "Positions are written in degrees and minutes, not in plain degrees; check the format of both columns.",
    "signs-left-out":
      "Positions are written without the sign of west or south; they lie in the field only with it. Check the format of both columns.",
    "systems-offered":
      "The file does not say in which coordinate system its easting and northing are. Systems that put the log near the field are offered; choose one.",
    "system-unknown":
      "The file does not say in which coordinate system its easting and northing are; give it, such as EPSG:32614.",
    "absent-time-logs": `${n("time log is", "time logs are")} named by a task, but ${count === 1 ? "its files are" : "their files are"} not in the archive.`,
    "local-clock":
      "Times in task data are those of the machine's own clock, without a time zone; choose the zone it showed.",
    "no-margin":
      "Task data has no identifier for the load left on the gauge wheel (margin). The downforce in it is what was applied and is never taken for margin.",
    "rows-by-number":
      "The machine's description does not say where each row stands, so rows are numbered as it numbers them; check that row 1 is the leftmost.",
    "presentation-disagrees": `The machine shows '${column ?? ""}' by a scale that does not fit the ISO 11783-11 dictionary; the dictionary was followed. Check a value you know.`,
    "cut-record": "The last record is cut off and was left out; the records before it are whole.",
    "unknown-values": `${n("value belongs", "values belong")} to no entry of the time log's header and ${count === 1 ? "was" : "were"} left out.${first}`,
    "no-fix": `${records} ${count === 1 ? "was" : "were"} marked by the receiver as without a fix; ${count === 1 ? "its position counts" : "their positions count"} as missing.${first}`,
    "decimal-comma": "Numbers in this file are written with a decimal comma.",
    "no-header":
      "The first line holds numbers, so the columns have no names; they are called column 1, column 2 and so on.",
    "units-row": "The line under the header names units and was read so.",
    "lines-before-header": `${n("line", "lines")} before the header ${count === 1 ? "was" : "were"} passed over.`,
    "missing-position":
      "No column was recognised as longitude and latitude, or easting and northing; choose them before the log can be read.",
    "unknown-unit": `${n("column names", "columns name")} no unit this program knows; choose ${count === 1 ? "it" : "one for each"} before the log is read.`,
    "swapped-positions": "Longitude and latitude look swapped; check which is which.",
    "far-from-field":
      "The positions lie far from the field; check which column is longitude, which latitude, and the projection.",
  };
  return sentences[code] ?? `${code}: ${count}.${first}`;
}
