import type { ExportBatch, ExportColumn, ExportTable } from "@/lib/export/export-table";
import { polygonsOf } from "@/lib/export/geometry/wind-rings";
import { multiPolygonWkb, pointWkb } from "@/lib/export/geometry/write-wkb";
import { shortestFloat32 } from "@/lib/export/number-text";
import { attributeColumns } from "@/lib/export/shapefile/attribute-fields";

export type SqlValue = number | string | null | Uint8Array;
export type Bounds = [west: number, south: number, east: number, north: number];

export const NO_BOUNDS: Bounds = [Infinity, Infinity, -Infinity, -Infinity];

/** "GP", version 1, little-endian without an envelope, and the reference system (OGC 12-128r17, 2.1.3). */
const GEOMETRY_HEADER_BYTES = 8;
const SRS_ID = 4326;

function geopackageGeometry(wkb: Uint8Array): Uint8Array {
  const bytes = new Uint8Array(GEOMETRY_HEADER_BYTES + wkb.length);
  bytes.set([0x47, 0x50, 0, 1]);
  new DataView(bytes.buffer).setInt32(4, SRS_ID, true);
  bytes.set(wkb, GEOMETRY_HEADER_BYTES);
  return bytes;
}

/** Values of each row for `insertStatement`. `bounds` grows to hold every place written. */
export function* geopackageRows(table: ExportTable, batch: ExportBatch, bounds: Bounds): Generator<SqlValue[]> {
  const columns = attributeColumns(table);
  const placeAt = placeReader(table, batch, bounds);
  for (let row = 0; row < batch.rows; row++) {
    yield [placeAt(row), ...columns.map(({ column, index }) => sqlValue(column, batch.cells[index]![row] ?? null))];
  }
}

function placeReader(
  { columns }: ExportTable,
  { cells, polygons }: ExportBatch,
  bounds: Bounds,
): (row: number) => Uint8Array | null {
  if (polygons) {
    return (row) => {
      for (const place of polygonsOf(polygons[row]!).flat(2)) widen(bounds, place[0]!, place[1]!);
      return geopackageGeometry(multiPolygonWkb(polygons[row]!));
    };
  }
  const longitudes = cells[columns.findIndex((column) => column.position === "longitude")];
  const latitudes = cells[columns.findIndex((column) => column.position === "latitude")];
  return (row) => {
    const [lon, lat] = [Number(longitudes?.[row] ?? NaN), Number(latitudes?.[row] ?? NaN)];
    if (!Number.isFinite(lon) || !Number.isFinite(lat)) return null;
    widen(bounds, lon, lat);
    return geopackageGeometry(pointWkb(lon, lat));
  };
}

function widen(bounds: Bounds, longitude: number, latitude: number): void {
  bounds[0] = Math.min(bounds[0], longitude);
  bounds[1] = Math.min(bounds[1], latitude);
  bounds[2] = Math.max(bounds[2], longitude);
  bounds[3] = Math.max(bounds[3], latitude);
}

function sqlValue(column: ExportColumn, value: number | string | null): SqlValue {
  if (typeof value !== "number") return value;
  if (!Number.isFinite(value)) return null;
  if (column.kind === "time") return new Date(value).toISOString();
  return column.kind === "float32" ? shortestFloat32(value) : value;
}
