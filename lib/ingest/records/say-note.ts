/** What the sentence of a note may speak of. */
interface Say {
  count: number;
  /** "1 record" or "3 records". */
  n(one: string, many: string): string;
  records: string;
  column: string | undefined;
  place: string;
  firstLine: number | undefined;
  /** " The first is line 12.", or nothing. */
  first: string;
}

export interface NotePlace {
  /** What the file counts in: "line", "feature" or "record". */
  place: string;
  firstLine?: number;
  column?: string;
}

/** One sentence for each note code. */
const SENTENCES: Record<string, (say: Say) => string> = {
  "ragged-rows": (say) =>
    `${say.n("line", "lines")} did not have as many fields as the header and ${say.count === 1 ? "was" : "were"} left out.${say.first}`,
  "unreadable-value": (say) =>
    `${say.n("cell", "cells")} of column '${say.column ?? ""}' could not be read as its unit says and ${say.count === 1 ? "counts" : "count"} as missing.${say.first}`,
  "zero-position": (say) =>
    `${say.records} stood at longitude 0, latitude 0, which a receiver writes when it has no fix; ${say.count === 1 ? "its position counts" : "their positions count"} as missing.${say.first}`,
  "repeated-header": (say) =>
    `${say.n("line", "lines")} within the file repeated the header and ${say.count === 1 ? "was" : "were"} left out: it was put together from parts.${say.first}`,
  regrouped: (say) =>
    `The lines of one record did not stand together; ${say.records} were put together by time, place and pass, and ordered by time.`,
  "no-position": (say) => `${say.records} had no position and cannot be placed on the map.${say.first}`,
  "duplicate-times": (say) => `${say.records} carried the same time as the record before.${say.first}`,
  "out-of-order": (say) => `${say.records} went back in time; the order of the file was kept.${say.first}`,
  "bad-row-number": (say) =>
    `${say.n("line", "lines")} had no usable row number and ${say.count === 1 ? "was" : "were"} left out; rows are numbered from 1 at the left.${say.first}`,
  "time-without-zone": (say) =>
    `${say.n("time", "times")} named no offset from UTC and ${say.count === 1 ? "was" : "were"} read as UTC; give the mapping a time zone if they are local.${say.first}`,
  "row-averaged": (say) =>
    `Every row has the same ${say.column ?? ""} in every record: the file holds one value for the whole machine, and rows cannot be compared.`,
  "working-by-row": () =>
    "The working state is logged row by row; a record counts as working when any of its rows works.",
  "pressure-not-force": (say) =>
    `Column '${say.column ?? ""}' is a pressure. It is kept in pascals and never shown as a force, because that needs the cylinder area and the linkage.`,
  "deleted-records": (say) =>
    `${say.n("record was", "records were")} marked as deleted in the .dbf and left out.${say.first}`,
  "null-geometry": (say) =>
    `${say.n("feature", "features")} had no geometry and cannot be placed on the map.${say.first}`,
  "part-count-mismatch": (say) =>
    `The .shp and .dbf parts disagree by ${say.records}; only the records found in both were read.`,
  "unknown-code-page": () =>
    "The .cpg names a code page that is not known here; names and texts were read as Windows-1252. Where letters look wrong, export the log with UTF-8.",
  "cut-short": (say) =>
    say.place === "line"
      ? `The file ends in the middle of line ${say.firstLine ?? 0}: it may be cut off; the last whole record is line ${say.column ?? ""}.`
      : "The .shp ends before the length it states: it was cut short on the way.",
  "shapes-without-table": (say) =>
    `${say.n(".shp file has", ".shp files have")} no .dbf beside ${say.count === 1 ? "it" : "them"} and ${say.count === 1 ? "was" : "were"} left out.`,
  "old-datum": () =>
    "The coordinate system in the .prj stands on an old datum whose shift to WGS 84 is not known here: positions may be some hundred metres off. Compare the map with the field, or export the log in WGS 84.",
  "area-centres": () =>
    "Each reading belongs to an area; it was placed at the centre of that area, which is where the rows were, not the antenna.",
  "line-midpoints": () => "Each reading belongs to a line; it was placed halfway along it.",
  "several-points": () => "Each reading belongs to several points; it was placed at their mean.",
  "no-projection": () => "The archive has no .prj part; the coordinates look like WGS 84 degrees and were read so.",
  "sentinel-values": (say) =>
    `${say.n("value", "values")} of ${say.column ?? ""} stood for "nothing here", as the mapping says, and ${say.count === 1 ? "counts" : "count"} as missing.${say.first}`,
  "sentinels-proposed": (say) =>
    `${say.column ?? ""}: the value comes again and again far beyond the others, as loggers write for "nothing here". It is proposed as missing; confirm or empty that list.`,
  "never-changes": (say) =>
    `The ${say.column ?? ""} has the same value throughout: a sensor may be stuck or not connected.`,
  "pressure-proposed": (say) =>
    `The ${say.column ?? ""} is a pressure. It is kept as one and never shown as a force, because that needs the cylinder area and the linkage.`,
  "contact-definition": () =>
    "Ground contact is the share of time a gauge wheel carried load in some logs, and a yes or no at the moment of the record in others. The file does not say which: ask whoever set up the machine, and compare logs only of one kind.",
  "newtons-like-kilograms": (say) =>
    `The ${say.column ?? ""} is said to be in newtons, but its values would be little for newtons and are usual for kilograms-force or pounds-force. Check the unit and change it if need be: one kilogram-force is 9.8 N, one pound-force 4.4 N.`,
  "steady-in-sample": (say) =>
    `The ${say.column ?? ""} has the same value in all the records looked at: a sensor may be stuck, not connected or switched on later. Leave the column out if it measures nothing.`,
  "row-steady": (say) =>
    `The ${say.column ?? ""} never changes in the records looked at while other rows do: its sensor may be stuck. Leave that column out if so.`,
  "margin-above-force": () =>
    "The margin lies above the downforce by more than a row unit weighs, which cannot be: the two may be swapped, or one is in another unit. Change what the columns are, or their unit.",
  "contact-reversed": () =>
    "Ground contact is 0 where the gauge wheel carried load and full where it did not: the column seems to count lost contact, and is proposed so. Change it under “Counts” if that is wrong.",
  "contact-contradicts": () =>
    "Ground contact and the load left on the gauge wheel contradict each other in many records: contact is lost while load is left, or the other way round. Check what both columns are, and how contact is defined.",
  "speed-disagrees": (say) =>
    `The ground speed does not agree with the distance between positions. ${say.column ?? ""} Check its unit.`.replace(
      "  ",
      " ",
    ),
  "time-names-no-zone": () =>
    "Times name no offset from UTC. Say in which time zone the clock ran; without one they are read as UTC.",
  "gps-week-short": () =>
    'The GPS weeks are below 1024. Some receivers begin again at 0 each 1024 weeks: if the dates come out decades too early, give that column the format "from 1024" or "from 2048".',
  "degrees-minutes": () =>
    "Positions are written in degrees and minutes, not in plain degrees; check the format of both columns.",
  "signs-left-out": () =>
    "Positions are written without the sign of west or south; they lie in the field only with it. Check the format of both columns.",
  "systems-offered": () =>
    "The file does not say in which coordinate system its easting and northing are. Systems that put the log near the field are offered; choose one.",
  "system-unknown": () =>
    "The file does not say in which coordinate system its easting and northing are; give it, such as EPSG:32614.",
  "absent-time-logs": (say) =>
    `${say.n("time log is", "time logs are")} named by a task, but ${say.count === 1 ? "its files are" : "their files are"} not in the archive.`,
  "local-clock": () =>
    "Times in task data are those of the machine's own clock, without a time zone; choose the zone it showed.",
  "no-margin": () =>
    "Task data has no identifier for the load left on the gauge wheel (margin). The downforce in it is what was applied and is never taken for margin.",
  "rows-by-number": () =>
    "The machine's description does not say where each row stands, so rows are numbered as it numbers them; check that row 1 is the leftmost.",
  "presentation-disagrees": (say) =>
    `The machine shows '${say.column ?? ""}' by a scale that does not fit the ISO 11783-11 dictionary; the dictionary was followed. Check a value you know.`,
  "cut-record": () => "The last record is cut off and was left out; the records before it are whole.",
  "unknown-values": (say) =>
    `${say.n("value belongs", "values belong")} to no entry of the time log's header and ${say.count === 1 ? "was" : "were"} left out.${say.first}`,
  "no-fix": (say) =>
    `${say.records} ${say.count === 1 ? "was" : "were"} marked by the receiver as without a fix; ${say.count === 1 ? "its position counts" : "their positions count"} as missing.${say.first}`,
  "decimal-comma": () => "Numbers in this file are written with a decimal comma.",
  "no-header": () =>
    "The first line holds numbers, so the columns have no names; they are called column 1, column 2 and so on.",
  "units-row": () => "The line under the header names units and was read so.",
  "lines-before-header": (say) =>
    `${say.n("line", "lines")} before the header ${say.count === 1 ? "was" : "were"} passed over.`,
  "missing-position": () =>
    "No column was recognised as longitude and latitude, or easting and northing; choose them before the log can be read.",
  "unknown-unit": (say) =>
    `${say.n("column names", "columns name")} no unit this program knows; choose ${say.count === 1 ? "it" : "one for each"} before the log is read.`,
  "swapped-positions": () => "Longitude and latitude look swapped; check which is which.",
  "far-from-field": () =>
    "The positions lie far from the field; check which column is longitude, which latitude, and the projection.",
};

export const NOTE_CODES = Object.keys(SENTENCES);

/** A note in one or two plain sentences. */
export function sayNote(code: string, count: number, { place, firstLine, column }: NotePlace): string {
  const n = (one: string, many: string) => `${count.toLocaleString("en-US")} ${count === 1 ? one : many}`;
  const first = firstLine === undefined ? "" : ` The first is ${place} ${firstLine}.`;
  const say: Say = { count, n, records: n("record", "records"), column, place, firstLine, first };
  return SENTENCES[code]?.(say) ?? `${code}: ${count}.${first}`;
}
