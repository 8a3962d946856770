import type { MultiPolygon, Polygon } from "geojson";
import type { ExportBatch, ExportColumn, ExportTable } from "@/lib/export/export-table";
import { polygonsOf, windRightHanded } from "@/lib/export/geometry/wind-rings";
import { roundTo, shortestFloat32 } from "@/lib/export/number-text";

/** RFC 7946 11.2: more say nothing. Seven are about a centimetre. */
const COORDINATE_DECIMALS = 7;

/** Opens a collection. What is known about the data is its foreign member `about` (RFC 7946 6.1), before the features. */
export function geojsonHead(about: object): string {
  return `{"type":"FeatureCollection","about":${JSON.stringify(about)},"features":[\n`;
}

export const GEOJSON_END = "\n]}\n";

/** The features of a batch, one a line; `isFirst` for the first batch of the collection. A row without a place has geometry null. */
export function geojsonFeatures(table: ExportTable, batch: ExportBatch, isFirst: boolean): string {
  const names = table.columns.map((column) => `${JSON.stringify(column.name)}:`);
  const geometryAt = geometryTexts(table, batch);
  const written = table.columns.map((column, index) => ({ column, index })).filter(({ column }) => !column.position);
  let text = "";
  for (let row = 0; row < batch.rows; row++) {
    const properties = written.map(
      ({ column, index }) => names[index] + cellJson(column, batch.cells[index]![row] ?? null),
    );
    const separator = isFirst && row === 0 ? "" : ",\n";
    text += `${separator}{"type":"Feature","geometry":${geometryAt(row)},"properties":{${properties.join(",")}}}`;
  }
  return text;
}

function cellJson(column: ExportColumn, value: number | string | null): string {
  if (value === null) return "null";
  if (typeof value === "string") return JSON.stringify(value);
  if (!Number.isFinite(value)) return "null";
  if (column.kind === "time") return `"${new Date(value).toISOString()}"`;
  return String(column.kind === "float32" ? shortestFloat32(value) : roundTo(value, column.decimals));
}

function geometryTexts({ columns }: ExportTable, { cells, polygons }: ExportBatch): (row: number) => string {
  if (polygons) return (row) => JSON.stringify(roundPolygon(windRightHanded(polygons[row]!)));
  const longitudes = cells[columns.findIndex((column) => column.position === "longitude")];
  const latitudes = cells[columns.findIndex((column) => column.position === "latitude")];
  return (row) => {
    const [lon, lat] = [Number(longitudes?.[row] ?? NaN), Number(latitudes?.[row] ?? NaN)];
    if (!Number.isFinite(lon) || !Number.isFinite(lat)) return "null";
    return `{"type":"Point","coordinates":[${roundTo(lon, COORDINATE_DECIMALS)},${roundTo(lat, COORDINATE_DECIMALS)}]}`;
  };
}

function roundPolygon(shape: Polygon | MultiPolygon): Polygon | MultiPolygon {
  const polygons = polygonsOf(shape).map((rings) =>
    rings.map((ring) => ring.map((place) => place.map((degrees) => roundTo(degrees, COORDINATE_DECIMALS)))),
  );
  return shape.type === "Polygon"
    ? { type: "Polygon", coordinates: polygons[0] ?? [] }
    : { type: "MultiPolygon", coordinates: polygons };
}
