import { isRowable, unitsForChannel } from "@/lib/ingest/channel-quantities";
import { stopReading } from "@/lib/ingest/ingest-error";
import type { LogMapping, LogShape, MappedColumn } from "@/lib/ingest/mapping";
import { DEGREES_FORMATS, readDegreesForm, type DegreesForm } from "@/lib/ingest/records/parse-degrees";
import { readBushelWeight } from "@/lib/ingest/records/bushel-weight";
import { createToDegrees, type ToDegrees } from "@/lib/ingest/records/project-position";
import { createTimePlan, type TimePlan } from "@/lib/ingest/records/time-plan";
import type { ChannelId } from "@/lib/logs/channel";
import type { SiUnit } from "@/lib/logs/machine-log";
import { unitFactor } from "@/lib/units/convert-unit";
import { getUnit } from "@/lib/units/unit-table";

/** How a reader treats a cell. Numbers, ISO times (milliseconds) and booleans go into `line`, texts into `texts`. */
export const CELL = { skip: 0, number: 1, isoTime: 2, boolean: 3, text: 4, degrees: 5 } as const;

/** One number column: its place in the line and what one of its units is in SI. */
export interface NumberField {
  field: number;
  factor: number;
}

export interface ChannelPlan {
  id: ChannelId;
  unit: SiUnit;
  perRow: boolean;
  /** Place in the line of each row's value (one entry where not per row); `columnCount` (always NaN) for a missing row. */
  fields: Int32Array;
  factors: Float64Array;
  /** The file gives the share of contact lost: what is kept is the rest of one. */
  isLost: boolean;
}

export interface PositionPlan {
  x: NumberField;
  y: NumberField;
  /** Null when x and y are degrees already. */
  toDegrees: ToDegrees | null;
}

/** A mapping worked out against the columns of one file. */
export interface ReadPlan {
  shape: LogShape;
  columnCount: number;
  names: readonly string[];
  kinds: Uint8Array;
  time: TimePlan | null;
  position: PositionPlan;
  heading: NumberField | null;
  speed: NumberField | null;
  pass: NumberField | null;
  /** Long shape: the row column, and the number of its first row in the file (0 or 1). */
  row: { field: number; firstRow: number } | null;
  working: number[];
  channels: ChannelPlan[];
  /** Rows a record by the mapping; 1 for the long shape, where the file tells. */
  rows: number;
  /** Columns in which some numbers stand for "nothing here". */
  missing: { field: number; values: readonly number[]; channel: ChannelId }[];
  /** How longitude and latitude are written where they are no plain degrees; by field. */
  degrees: Map<number, DegreesForm>;
  /** Mapped columns holding a pressure where a force was expected, for a note. */
  pressures: string[];
}

interface PlacedColumn extends MappedColumn {
  field: number;
}

/** Checks a mapping against the file's columns. Stops with `mapping-mismatch`, `unit-does-not-fit`, `missing-position` and the like. */
export function buildReadPlan(mapping: LogMapping, names: readonly string[]): ReadPlan {
  const columns = placeColumns(mapping, names);
  const of = (channel: ChannelId) => columns.filter((column) => column.channel === channel);
  const measured = columns.filter((column) => isMeasured(column.channel));
  const rowColumn = mapping.shape === "long" ? of("row")[0] : undefined;
  if (mapping.shape === "long" && !rowColumn) {
    stopReading(
      "missing-row",
      "The mapping says one line a row, but no column is mapped to the row number. Map it, or choose another shape.",
    );
  }
  const rows = mapping.shape === "wide" ? Math.max(1, ...measured.map((column) => column.row ?? 1)) : 1;
  const plan: ReadPlan = {
    shape: mapping.shape,
    columnCount: names.length,
    names,
    kinds: new Uint8Array(names.length),
    time: createTimePlan(of("time"), mapping.timeZone),
    position: planPosition(columns, mapping.crs),
    heading: toNumberField(of("heading")[0]),
    speed: toNumberField(of("speed")[0]),
    pass: toNumberField(of("pass")[0]),
    row: rowColumn ? { field: rowColumn.field, firstRow: /^from 0$/i.test(rowColumn.format ?? "") ? 0 : 1 } : null,
    working: of("working").map((column) => column.field),
    channels: planChannels(measured, mapping.shape, { rows, missingField: names.length }),
    rows,
    missing: columns.flatMap(({ field, missing, channel }) =>
      missing?.length ? [{ field, values: missing, channel }] : [],
    ),
    degrees: planDegrees(columns),
    pressures: measured.filter(isPressureForForce).map((column) => column.name),
  };
  for (const column of columns) plan.kinds[column.field] = cellKind(column);
  return plan;
}

function isPressureForForce(column: MappedColumn): boolean {
  return (
    (column.channel === "downforce" || column.channel === "margin") && getUnit(column.unit).quantity === "pressure"
  );
}

const PLACING: ReadonlySet<ChannelId> = new Set<ChannelId>([
  "time",
  "longitude",
  "latitude",
  "easting",
  "northing",
  "heading",
  "speed",
  "working",
  "pass",
  "row",
]);

function isMeasured(channel: ChannelId): boolean {
  return !PLACING.has(channel);
}

function isAngleOfPosition({ channel }: MappedColumn): boolean {
  return channel === "longitude" || channel === "latitude";
}

function planDegrees(columns: readonly PlacedColumn[]): Map<number, DegreesForm> {
  const forms = new Map<number, DegreesForm>();
  for (const column of columns) {
    if (!isAngleOfPosition(column) || column.format === undefined) continue;
    const form = readDegreesForm(column.format);
    if (!form) {
      stopReading(
        "mapping-invalid",
        `Column '${column.name}' has the format "${column.format}", which is no way of writing degrees. Use one of: ${DEGREES_FORMATS.join(", ")}.`,
        { column: column.name },
      );
    }
    forms.set(column.field, form);
  }
  return forms;
}

function cellKind(column: PlacedColumn): number {
  if (isAngleOfPosition(column) && column.format !== undefined) return CELL.degrees;
  if (column.unit === "iso8601") return CELL.isoTime;
  if (column.unit === "local") return CELL.text;
  return column.unit === "boolean" ? CELL.boolean : CELL.number;
}

function toNumberField(column: PlacedColumn | undefined): NumberField | null {
  return column ? { field: column.field, factor: columnFactor(column) } : null;
}

function columnFactor(column: MappedColumn): number {
  if (column.unit !== "bu/ac") return unitFactor(column.unit);
  const poundsPerBushel = readBushelWeight(column.format);
  if (poundsPerBushel === null) {
    stopReading(
      "bushel-weight-missing",
      `Column '${column.name}' is in bushels per acre, which is a mass only with the weight of a bushel. Add it to the column as its format, such as "56 lb".`,
      { column: column.name },
    );
  }
  return unitFactor("bu/ac", { poundsPerBushel });
}

function placeColumns(mapping: LogMapping, names: readonly string[]): PlacedColumn[] {
  const fieldOf = new Map(names.map((name, field) => [name, field]));
  const seen = new Set<string>();
  const used = new Set<string>();
  return mapping.columns.map((column) => {
    const field = fieldOf.get(column.name);
    const place = { column: column.name };
    if (field === undefined) {
      const found = names.slice(0, 8).join(", ");
      const message = `The mapping names a column '${column.name}' that this file does not have (it has ${found}${names.length > 8 ? ", …" : ""}). Choose the mapping made for this kind of file.`;
      stopReading("mapping-mismatch", message, place);
    }
    if (used.has(column.name)) {
      stopReading("mapping-mismatch", `The mapping uses column '${column.name}' twice. Keep one.`, place);
    }
    used.add(column.name);
    const key = `${column.channel} ${column.row ?? ""}`;
    if (seen.has(key) && column.channel !== "time") {
      const what = column.row === undefined ? column.channel : `${column.channel} of row ${column.row}`;
      stopReading(
        "mapping-mismatch",
        `Two columns are mapped to ${what}; the second is '${column.name}'. Keep one.`,
        place,
      );
    }
    seen.add(key);
    checkUnit(column);
    if (column.row !== undefined && !isRowable(column.channel)) {
      const message = `Column '${column.name}' is given a row, but ${column.channel} belongs to the whole machine. Leave the row out.`;
      stopReading("mapping-mismatch", message, place);
    }
    return { ...column, field };
  });
}

function checkUnit(column: MappedColumn): void {
  const allowed = unitsForChannel(column.channel);
  if (allowed.includes(column.unit)) return;
  stopReading(
    "unit-does-not-fit",
    `Column '${column.name}' is mapped to ${column.channel} in ${column.unit}, which does not measure that. Use one of: ${allowed.join(", ")}.`,
    { column: column.name },
  );
}

function planPosition(columns: readonly PlacedColumn[], crs: string | undefined): PositionPlan {
  const find = (channel: ChannelId) => toNumberField(columns.find((column) => column.channel === channel));
  const longitude = find("longitude");
  const latitude = find("latitude");
  if (longitude && latitude) return { x: longitude, y: latitude, toDegrees: null };
  const easting = find("easting");
  const northing = find("northing");
  if (!easting || !northing) {
    stopReading(
      "missing-position",
      "No columns are mapped to longitude and latitude, or to easting and northing, so nothing can be placed on the ground. Map a pair of them.",
    );
  }
  const toDegrees = crs === undefined ? null : createToDegrees(crs);
  if (!toDegrees) {
    const said = crs === undefined ? "none is given" : `"${crs}" is not one this program knows`;
    stopReading(
      "unknown-projection",
      `Easting and northing need a coordinate system, and ${said}. Give the mapping a crs: an EPSG code such as EPSG:32614 (UTM), or a proj4 text.`,
    );
  }
  return { x: easting, y: northing, toDegrees };
}

/** Channels in the mapping's order; each channel's columns must all have a row, or be one column without. */
function planChannels(
  measured: readonly PlacedColumn[],
  shape: LogShape,
  { rows, missingField }: { rows: number; missingField: number },
): ChannelPlan[] {
  const groups = new Map<ChannelId, PlacedColumn[]>();
  for (const column of measured) groups.set(column.channel, [...(groups.get(column.channel) ?? []), column]);
  return [...groups].map(([id, columns]) => {
    const perRow =
      shape === "long" ? isRowable(id) : shape === "wide" && columns.some((column) => column.row !== undefined);
    checkRows(columns, shape, perRow);
    const unit = checkOneUnit(id, columns);
    const slots = perRow && shape === "wide" ? rows : 1;
    const fields = new Int32Array(slots).fill(missingField);
    const factors = new Float64Array(slots).fill(1);
    for (const column of columns) {
      const slot = slots === 1 ? 0 : (column.row ?? 1) - 1;
      fields[slot] = column.field;
      factors[slot] = columnFactor(column);
    }
    return { id, unit, perRow, fields, factors, isLost: countsLost(id, columns) };
  });
}

/** Whether contact is given as the share lost; all of its columns must say the same. */
function countsLost(id: ChannelId, columns: readonly PlacedColumn[]): boolean {
  if (id !== "contact") return false;
  const isLost = columns.map(({ format }) => /^lost$/i.test(format ?? ""));
  const odd = columns.find(
    ({ format }, index) => (format !== undefined && !isLost[index]) || isLost[index] !== isLost[0],
  );
  if (odd) {
    stopReading(
      "mapping-invalid",
      `Column '${odd.name}' is ground contact with the format "${odd.format ?? ""}". Write "lost" on all columns of it where they count lost contact, or nothing on any.`,
      { column: odd.name },
    );
  }
  return isLost[0] ?? false;
}

function checkRows(columns: readonly PlacedColumn[], shape: LogShape, perRow: boolean): void {
  if (shape === "wide") {
    const bare = perRow ? columns.find((column) => column.row === undefined) : undefined;
    if (!bare) return;
    stopReading(
      "mapping-mismatch",
      `Column '${bare.name}' is mapped to ${bare.channel} without a row, while other columns of ${bare.channel} have one. Give it a row or another channel.`,
      { column: bare.name },
    );
  }
  const rowed = columns.find((column) => column.row !== undefined);
  if (!rowed) return;
  stopReading(
    "mapping-mismatch",
    `Column '${rowed.name}' is given row ${rowed.row}, but the shape is ${shape}, where columns have no rows. Choose the wide shape or leave the row out.`,
    { column: rowed.name },
  );
}

function checkOneUnit(id: ChannelId, columns: readonly PlacedColumn[]): SiUnit {
  const unit = getUnit(columns[0]?.unit ?? "1").si;
  const other = columns.find((column) => getUnit(column.unit).si !== unit);
  if (!other) return unit;
  stopReading(
    "unit-does-not-fit",
    `Column '${other.name}' is ${id} in ${other.unit}, while other columns of ${id} are kept in ${unit}. All rows of one channel must measure the same thing.`,
    { column: other.name },
  );
}
