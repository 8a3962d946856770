import { resolveChannel } from "@/lib/channels/resolve-channel";
import { FLAGS, flagCodes } from "@/lib/cleaning/flags";
import { channelColumn } from "@/lib/export/columns/name-channel-column";
import { leftOutColumn } from "@/lib/export/columns/left-out-column";
import { sourceColumns } from "@/lib/export/columns/source-columns";
import { makeNamesUnique } from "@/lib/export/columns/make-names-unique";
import {
  BATCH_ROWS,
  newCells,
  type ExportBatch,
  type ExportColumn,
  type ExportTable,
  type LogPart,
} from "@/lib/export/export-table";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowPosition } from "@/lib/rows/row-position";

type Cell = number | string | null;

/** A column and how its cells are found: once a part, then by record of the part and row (from 1). */
export interface ReadingColumn extends ExportColumn {
  /** The channel it holds, and of which row where rows stand side by side. */
  channel?: { id: string; row?: number };
  prepare: (part: LogPart) => (record: number, row: number) => Cell;
}

export interface ReadingsTable extends ExportTable {
  columns: readonly ReadingColumn[];
  /** Rows of the table for each record of the log. */
  rowsARecord: number;
}

/** Degrees to eight decimals, about a millimetre. */
const DEGREE_DECIMALS = 8;

/** What one letter after the other can say at most, for tables of fixed width. */
const LONGEST_FLAGS = Object.keys(FLAGS).join(";").length;

/**
 * One row a record and row of the machine: where that row stood, and every channel there; a channel logged once for the
 * whole machine is repeated. A log without rows has one row a record. `timeS` instead of `time` where the log's clock
 * starts at 0.
 */
export function readingsTable(outline: PlacedLog): ReadingsTable {
  const rowsARecord = machineRows(outline);
  const columns = [
    ...recordColumns(outline),
    rowNumberColumn(),
    timeColumn(outline.log.timeIsRelative),
    ...rowPlaceColumns(),
    ...motionColumns(),
    workingColumn(),
    flagsColumn(),
    ...(outline.leftOut ? [leftOutColumn()] : []),
    ...antennaColumns(),
    ...channelIds(outline).map((id) => readingColumn(id, outline)),
  ];
  return { level: "readings", geometry: "point", columns: makeNamesUnique(columns), rowsARecord };
}

/** Rows that a record is written as: those of the machine where a channel has rows, else one. */
export function machineRows({ log, geometry }: Pick<PlacedLog, "log" | "geometry">): number {
  return log.channels.some((channel) => channel.perRow) ? geometry.rows : 1;
}

/** Logged channels in the file's order, then opener resistance where the log and its machine give it. */
export function channelIds(outline: PlacedLog): string[] {
  const logged = outline.log.channels.map((channel) => channel.id as string);
  return resolveChannel(outline, "resistance") ? [...logged, "resistance"] : logged;
}

/** The table's rows for a part of the log, a batch at a time. */
export function* readingsBatches(table: ReadingsTable, part: LogPart): Generator<ExportBatch> {
  const { records } = part.placed.log;
  const readers = table.columns.map((column) => column.prepare(part));
  const recordsABatch = Math.max(1, Math.floor(BATCH_ROWS / table.rowsARecord));
  for (let from = 0; from < records; from += recordsABatch) {
    const to = Math.min(records, from + recordsABatch);
    const rows = (to - from) * table.rowsARecord;
    const cells = table.columns.map((column, index) => {
      const into = newCells(column.kind, rows);
      const read = readers[index]!;
      let at = 0;
      for (let record = from; record < to; record++) {
        for (let row = 1; row <= table.rowsARecord; row++) into[at++] = read(record, row) as never;
      }
      return into;
    });
    yield { rows, cells, polygons: null };
  }
}

export function recordColumns({ fileParts }: Pick<PlacedLog, "fileParts">): ReadingColumn[] {
  return [
    {
      name: "record",
      shortName: "RECORD",
      kind: "integer",
      unit: "",
      meaning: "Number of the record in the log, from 0.",
      prepare: (part) => (record) => part.firstRecord + record,
    },
    ...sourceColumns(fileParts),
    {
      name: "pass",
      shortName: "PASS",
      kind: "integer",
      unit: "",
      meaning: "Number of the pass, from 1 in time order; 0 for a record in no pass.",
      prepare:
        ({ placed }) =>
        (record) =>
          placed.passOf[record]!,
    },
  ];
}

function rowNumberColumn(): ReadingColumn {
  return {
    name: "row",
    shortName: "ROW",
    kind: "integer",
    unit: "",
    meaning: "Number of the row, 1 leftmost looking forward.",
    prepare: () => (_record, row) => row,
  };
}

export function timeColumn(isRelative: boolean): ReadingColumn {
  if (isRelative) {
    return {
      name: "timeS",
      shortName: "TIME_S",
      kind: "number",
      unit: "s",
      decimals: 3,
      meaning: "Seconds on the log's own clock, which starts at 0.",
      prepare:
        ({ placed }) =>
        (record) =>
          placed.log.timeMs[record]! / 1000,
    };
  }
  return {
    name: "time",
    shortName: "TIME_UTC",
    kind: "time",
    unit: "UTC",
    width: 24,
    meaning: "Time of the record, UTC.",
    prepare:
      ({ placed }) =>
      (record) =>
        placed.log.timeMs[record]!,
  };
}

/** Longitude and latitude are asked for one after the other: the last place is kept. */
function rowPlaceColumns(): ReadingColumn[] {
  const place = (axis: 0 | 1) => (part: LogPart) => {
    const { plane } = part.placed;
    return (record: number, row: number): number => {
      const [eastM, northM] = rowPosition(part.placed, record, row);
      return Number.isFinite(eastM) && Number.isFinite(northM) ? plane.toDegrees(eastM, northM)[axis] : NaN;
    };
  };
  const shared = { kind: "number", unit: "degrees", decimals: DEGREE_DECIMALS } as const;
  return [
    {
      ...shared,
      name: "lonDeg",
      shortName: "LON_DEG",
      position: "longitude",
      meaning: "Longitude of the row on the ground, WGS 84.",
      prepare: place(0),
    },
    {
      ...shared,
      name: "latDeg",
      shortName: "LAT_DEG",
      position: "latitude",
      meaning: "Latitude of the row on the ground, WGS 84.",
      prepare: place(1),
    },
  ];
}

export function motionColumns(): ReadingColumn[] {
  return [
    {
      name: "headingDeg",
      shortName: "HDG_DEG",
      kind: "float32",
      unit: "degrees",
      meaning: "Heading of the implement, clockwise from north.",
      prepare:
        ({ placed }) =>
        (record) =>
          placed.headingDeg[record]!,
    },
    {
      name: "speedMps",
      shortName: "SPEED_MPS",
      kind: "float32",
      unit: "m/s",
      meaning: "Speed of the implement along the ground.",
      prepare:
        ({ placed }) =>
        (record) =>
          placed.speedMps[record]!,
    },
  ];
}

/** The place as the file tells it: with it, and the same machine, the table can be read in again. */
export function antennaColumns(): ReadingColumn[] {
  const shared = { kind: "number", unit: "degrees", decimals: DEGREE_DECIMALS } as const;
  return [
    {
      ...shared,
      name: "antennaLonDeg",
      shortName: "ANT_LON",
      meaning: "Longitude of the antenna as logged, WGS 84.",
      prepare:
        ({ placed }) =>
        (record) =>
          placed.log.longitude[record]!,
    },
    {
      ...shared,
      name: "antennaLatDeg",
      shortName: "ANT_LAT",
      meaning: "Latitude of the antenna as logged, WGS 84.",
      prepare:
        ({ placed }) =>
        (record) =>
          placed.log.latitude[record]!,
    },
  ];
}

export function workingColumn(): ReadingColumn {
  return {
    name: "working",
    shortName: "WORKING",
    kind: "integer",
    unit: "0 or 1",
    meaning: "1 where the log says the machine worked, or says nothing.",
    prepare:
      ({ placed }) =>
      (record) =>
        placed.log.working?.[record] ?? 1,
  };
}

export function flagsColumn(): ReadingColumn {
  return {
    name: "flags",
    shortName: "FLAGS",
    kind: "text",
    unit: "",
    width: LONGEST_FLAGS,
    meaning: `Doubts about the record, joined by semicolons: ${Object.keys(FLAGS).join(", ")}. Empty: none. Nothing is deleted.`,
    prepare: ({ placed }) => {
      const words = new Map<number, string | null>([[0, null]]);
      return (record) => {
        const bits = placed.flags[record]!;
        if (!words.has(bits)) words.set(bits, flagCodes(bits).join(";"));
        return words.get(bits)!;
      };
    },
  };
}

function readingColumn(id: string, outline: PlacedLog): ReadingColumn {
  const unit = resolveChannel(outline, id)?.unit ?? "1";
  return {
    ...channelColumn(id, unit),
    channel: { id },
    prepare: ({ placed }) => {
      const channel = resolveChannel(placed, id);
      if (!channel) return () => NaN;
      const { values, rows, perRow } = channel;
      return perRow
        ? (record, row) => values[record * rows + row - 1] ?? NaN
        : (record) => values[record * rows] ?? NaN;
    },
  };
}
