import { open, type FileHandle } from "node:fs/promises";
import path from "node:path";
import { setImmediate } from "node:timers/promises";
import { AppError } from "@/lib/errors";
import type { ExportBatch, ExportTable } from "@/lib/export/export-table";
import { DBF_MAX_FIELDS, dbfBatch, dbfFields } from "@/lib/export/shapefile/attribute-fields";
import { DBF_END, dbfHeader, dbfRecordBytes, type Day, type DbfField } from "@/lib/export/shapefile/dbf";
import { ShapeEncoder, SHP_HEADER_BYTES, type ShapeBytes } from "@/lib/export/shapefile/shape-encoder";

/** Offsets in both files are signed 32-bit numbers to most readers. */
export const SHAPEFILE_MAX_BYTES = 2 ** 31 - 1;

interface ShapefileInput {
  folder: string;
  table: ExportTable;
  batches: AsyncIterable<ExportBatch>;
  madeOn: Date;
  maxBytes?: number;
}

/** Writes `.shp`, `.shx` and `.dbf`; gives their paths. @throws AppError `unprocessable` past two gigabytes or 255 columns */
export async function writeShapefile(input: ShapefileInput): Promise<{ shp: string; shx: string; dbf: string }> {
  const { folder, table, madeOn } = input;
  const fields = dbfFields(table);
  refuseWide(fields);
  const paths = {
    shp: path.join(folder, "export.shp"),
    shx: path.join(folder, "export.shx"),
    dbf: path.join(folder, "export.dbf"),
  };
  const files = {
    shp: await createFile(paths.shp),
    shx: await createFile(paths.shx),
    dbf: await createFile(paths.dbf),
  };
  try {
    const shapes = new ShapeEncoder(table.geometry === "polygon" ? "polygon" : "point");
    const dbfStart = dbfHeader(fields, 0, toDay(madeOn));
    await appendAll(files, { shp: new Uint8Array(SHP_HEADER_BYTES), shx: new Uint8Array(SHP_HEADER_BYTES) }, dbfStart);
    for await (const batch of input.batches) {
      const bytes = addShapes(shapes, table, batch);
      refuseLarge(shapes.length, dbfStart.length + shapes.length.records * dbfRecordBytes(fields), input.maxBytes);
      await appendAll(files, bytes, dbfBatch(table, fields, batch));
      await setImmediate();
    }
    await files.dbf.write(DBF_END);
    const { shp, shx } = shapes.headers();
    await files.shp.write(shp, 0, shp.length, 0);
    await files.shx.write(shx, 0, shx.length, 0);
    const dbf = dbfHeader(fields, shapes.length.records, toDay(madeOn));
    await files.dbf.write(dbf, 0, dbf.length, 0);
  } finally {
    await Promise.all(Object.values(files).map((file) => file.close()));
  }
  return paths;
}

/** The comment keeps the bundler from packing the whole project for a path it cannot know. */
function createFile(file: string): Promise<FileHandle> {
  return open(/*turbopackIgnore: true*/ file, "w");
}

function addShapes(shapes: ShapeEncoder, { columns }: ExportTable, { rows, cells, polygons }: ExportBatch): ShapeBytes {
  if (polygons) return shapes.addPolygons(polygons);
  const axis = (name: "longitude" | "latitude") =>
    cells[columns.findIndex((column) => column.position === name)] as Float64Array;
  return shapes.addPoints(rows, axis("longitude"), axis("latitude"));
}

async function appendAll(
  files: { shp: FileHandle; shx: FileHandle; dbf: FileHandle },
  { shp, shx }: ShapeBytes,
  dbf: Uint8Array,
): Promise<void> {
  await files.shp.write(shp);
  await files.shx.write(shx);
  await files.dbf.write(dbf);
}

function refuseWide(fields: readonly DbfField[]): void {
  if (fields.length <= DBF_MAX_FIELDS) return;
  const message = `A shapefile holds ${DBF_MAX_FIELDS} columns and this log needs ${fields.length}. Export a GeoPackage instead.`;
  throw new AppError("unprocessable", message, { detailCode: "export_too_wide" });
}

/** @throws AppError `unprocessable` naming what to do instead */
export function refuseLarge(
  { shp, records }: { shp: number; records: number },
  dbfBytes: number,
  maxBytes = SHAPEFILE_MAX_BYTES,
): void {
  if (Math.max(shp, dbfBytes) <= maxBytes) return;
  const message =
    `A shapefile's parts end at ${maxBytes} bytes, which this log passes at row ${records}. ` +
    "Export a GeoPackage, CSV or Arrow file instead.";
  throw new AppError("unprocessable", message, { detailCode: "export_too_large", extra: { maxBytes } });
}

function toDay(date: Date): Day {
  return { year: date.getUTCFullYear(), month: date.getUTCMonth() + 1, day: date.getUTCDate() };
}
