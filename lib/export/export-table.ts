import type { MultiPolygon, Polygon } from "geojson";
import type { PlacedLog } from "@/lib/logs/placed-log";

export const EXPORT_FORMATS = ["csv", "geojson", "shapefile", "geopackage", "arrow"] as const;
export type ExportFormat = (typeof EXPORT_FORMATS)[number];
export const EXPORT_LEVELS = ["readings", "zones", "swaths"] as const;
export type ExportLevel = (typeof EXPORT_LEVELS)[number];
export const EXPORT_SHAPES = ["long", "wide"] as const;
export type ExportShape = (typeof EXPORT_SHAPES)[number];

/**
 * What a cell holds. `float32`: a reading as it is stored, written with the fewest digits that give it back; `time`:
 * milliseconds since 1970-01-01 UTC.
 */
export type ColumnKind = "integer" | "number" | "float32" | "text" | "time";

export interface ExportColumn {
  /** Letters, digits and underscores; ends in the unit. */
  name: string;
  /** At most ten capitals, digits and underscores, for tables that take no more. Unique within its table. */
  shortName: string;
  kind: ColumnKind;
  /** Unit in words of the SI; empty for counts, numbers without a unit and texts. */
  unit: string;
  meaning: string;
  /** Digits after the point for `number`; all there are without. */
  decimals?: number;
  /** Longest text in characters, for tables of fixed width. */
  width?: number;
  /** Longitude or latitude of the point that a spatial format draws instead of writing the column. */
  position?: "longitude" | "latitude";
}

export interface ExportTable {
  level: ExportLevel;
  /** `none`: rows without a place of their own on a map. */
  geometry: "point" | "polygon" | "none";
  columns: readonly ExportColumn[];
}

/** One column of a batch: NaN or null is missing. */
export type CellArray = Float64Array | Float32Array | (string | null)[];

/** Some rows of a table, one array a column, in the table's order. */
export interface ExportBatch {
  rows: number;
  cells: CellArray[];
  /** One a row in a table of polygons, degrees; else null. */
  polygons: (Polygon | MultiPolygon)[] | null;
}

/** A stretch of consecutive records of a log with all readings asked for: a pass, or records between passes. */
export interface LogPart {
  /** Number of the stretch's first record in the log. */
  firstRecord: number;
  /** The stretch as a log of its own: its records count from 0, its only pass (if any) starts at 0. */
  placed: PlacedLog;
  /** First known time of the whole log; NaN where it has none. */
  logStartMs: number;
}

/** Rows handed on at once: enough to be quick, few enough to keep memory and waiting short. */
export const BATCH_ROWS = 4096;

/** An empty array for a column. */
export function newCells(kind: ColumnKind, rows: number): CellArray {
  if (kind === "text") return new Array<string | null>(rows).fill(null);
  return kind === "float32" ? new Float32Array(rows) : new Float64Array(rows);
}
