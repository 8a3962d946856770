import { channelWords } from "@/lib/ingest/channel-quantities";
import type { MappedColumn } from "@/lib/ingest/mapping";
import type { RecipeVersion } from "@/lib/schemas/recipes";
import { getUnit } from "@/lib/units/unit-table";

/** Columns that mean the same, row by row. */
export interface SaidColumns {
  /** "DF_01_lbf … DF_24_lbf". */
  names: string;
  /** "downforce of rows 1 to 24, in pounds-force". */
  meaning: string;
}

/** What a recipe takes the columns of a file for, those of the same meaning together, in the order of the file. */
export function sayRecipeColumns({ mapping }: Pick<RecipeVersion, "mapping">): SaidColumns[] {
  const groups = new Map<string, MappedColumn[]>();
  for (const column of mapping.columns) {
    const { channel, unit, format = "", missing = [] } = column;
    const key = column.row === undefined ? column.name : `${channel} ${unit} ${format} ${missing.join(",")}`;
    groups.set(key, [...(groups.get(key) ?? []), column]);
  }
  return [...groups.values()].map((columns) => ({ names: nameColumns(columns), meaning: sayMeaning(columns) }));
}

function nameColumns(columns: readonly MappedColumn[]): string {
  const [first, last] = [columns[0], columns.at(-1)];
  if (columns.length < 2) return first?.name ?? "";
  return `${first?.name} ${columns.length === 2 ? "and" : "…"} ${last?.name}`;
}

function sayMeaning(columns: readonly MappedColumn[]): string {
  const [first] = columns;
  if (!first) return "";
  const rows = columns.flatMap(({ row }) => (row === undefined ? [] : [row]));
  const { quantity, words } = getUnit(first.unit);
  const inUnit = quantity === "switch" || quantity === "number" ? "" : `, in ${words}`;
  const pattern = first.format === undefined ? "" : ` (${first.format})`;
  const missing = first.missing?.length ? `; ${first.missing.join(" and ")} for missing` : "";
  return `${channelWords(first.channel)}${sayRows(rows)}${inUnit}${pattern}${missing}`;
}

function sayRows(rows: readonly number[]): string {
  if (rows.length === 0) return "";
  if (rows.length === 1) return ` of row ${rows[0]}`;
  const isRun = rows.every((row, index) => index === 0 || row === (rows[index - 1] ?? NaN) + 1);
  return isRun ? ` of rows ${rows[0]} to ${rows.at(-1)}` : ` of rows ${rows.join(", ")}`;
}

const SHAPE_WORDS: Record<RecipeVersion["shape"], string> = {
  wide: "one line a moment, a column a row",
  long: "one line a row and moment",
  single: "one value a moment",
};

const FORMAT_WORDS: Record<string, string | undefined> = {
  csv: "CSV or TSV",
  geojson: "GeoJSON",
  shapefile: "shapefile",
  iso11783: "ISO 11783-10 task data",
  "task-data": "ISO 11783-10 task data",
};

/** "CSV or TSV, one line a moment, a column a row". */
export function sayRecipeFile({ format, shape }: Pick<RecipeVersion, "format" | "shape">): string {
  return `${FORMAT_WORDS[format] ?? format}, ${SHAPE_WORDS[shape]}`;
}

/** What it measures, in a few words: "downforce, margin and seeding depth; 24 rows". */
export function sumUpRecipe({ mapping }: Pick<RecipeVersion, "mapping">): string {
  const placing = [
    "time",
    "longitude",
    "latitude",
    "easting",
    "northing",
    "heading",
    "working",
    "pass",
    "row",
    "interval",
  ];
  const measured = mapping.columns.filter(({ channel }) => !placing.includes(channel));
  const names = [...new Set(measured.map(({ channel }) => channelWords(channel).replace(/ \(.*\)$/, "")))];
  const rows = Math.max(0, ...mapping.columns.map(({ row }) => row ?? 0));
  const list =
    names.length > 1 ? `${names.slice(0, -1).join(", ")} and ${names.at(-1)}` : (names[0] ?? "position only");
  return rows > 0 ? `${list}; ${rows} rows` : list;
}

/** What else a recipe says, besides columns. */
export function sayRecipeExtras({ mapping, machine }: Pick<RecipeVersion, "mapping" | "machine">): string[] {
  const { crs, timeZone, contact } = mapping;
  return [
    ...(machine ? [`Machine: ${machine.name}`] : []),
    ...(timeZone === undefined ? [] : [`Local times of ${timeZone}`]),
    ...(crs === undefined ? [] : [`Coordinates in ${crs}`]),
    ...(contact === undefined ? [] : [`Contact: ${contact.words ?? CONTACT_WORDS[contact.kind]}`]),
  ];
}

const CONTACT_WORDS = {
  "share-of-time": "share of a time that the gauge wheel carried load",
  "at-the-moment": "whether the gauge wheel carried load at that moment",
  other: "defined otherwise",
} as const;
