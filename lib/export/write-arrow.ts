import {
  Binary,
  Field,
  Float32,
  Float64,
  Int32,
  makeData,
  RecordBatch,
  Schema,
  Struct,
  TimestampMillisecond,
  Utf8,
  vectorFromArray,
  type Data,
  type DataType,
} from "apache-arrow";
import type { CellArray, ExportBatch, ExportColumn, ExportTable } from "@/lib/export/export-table";
import { multiPolygonWkb } from "@/lib/export/geometry/write-wkb";

const GEOMETRY = "geometry";

/** Schema of a table: units and meanings beside each field, what is known about the data beside the whole, as JSON. */
export function arrowSchema(table: ExportTable, about: object): Schema {
  const fields = table.columns.map(
    (column) => new Field(column.name, typeOf(column), true, fieldNotes(column.unit, column.meaning)),
  );
  if (table.geometry === "polygon") {
    // The open way of marking well-known binary in Arrow, so that map programs draw it.
    const notes = new Map([
      ["ARROW:extension:name", "geoarrow.wkb"],
      ["ARROW:extension:metadata", '{"crs":"OGC:CRS84"}'],
    ]);
    fields.push(new Field(GEOMETRY, new Binary(), true, notes));
  }
  return new Schema(fields, new Map([["about", JSON.stringify(about)]]));
}

function fieldNotes(unit: string, meaning: string): Map<string, string> {
  return new Map([
    ["unit", unit],
    ["meaning", meaning],
  ]);
}

function typeOf(column: ExportColumn): DataType {
  if (column.kind === "text") return new Utf8();
  if (column.kind === "time") return new TimestampMillisecond("UTC");
  if (column.kind === "integer") return new Int32();
  return column.kind === "float32" ? new Float32() : new Float64();
}

/** A batch of a table; missing is null. */
export function arrowBatch(schema: Schema, table: ExportTable, batch: ExportBatch): RecordBatch {
  const children = table.columns.map((column, index) => columnData(column, batch.cells[index]!));
  if (batch.polygons) children.push(vectorFromArray(batch.polygons.map(multiPolygonWkb), new Binary()).data[0]!);
  const data = makeData({ type: new Struct(schema.fields), length: batch.rows, nullCount: 0, children });
  return new RecordBatch(schema, data);
}

function columnData(column: ExportColumn, cells: CellArray): Data {
  if (cells instanceof Array) return vectorFromArray(cells, new Utf8()).data[0]!;
  const { nullBitmap, nullCount } = markMissing(cells);
  const shared = { length: cells.length, nullBitmap, nullCount };
  if (column.kind === "time") {
    const data = BigInt64Array.from(cells as Float64Array, (value) =>
      BigInt(Number.isFinite(value) ? Math.round(value) : 0),
    );
    return makeData({ ...shared, type: new TimestampMillisecond("UTC"), data });
  }
  if (column.kind === "integer") return makeData({ ...shared, type: new Int32(), data: Int32Array.from(cells) });
  if (cells instanceof Float32Array) return makeData({ ...shared, type: new Float32(), data: cells });
  return makeData({ ...shared, type: new Float64(), data: cells });
}

/** Validity bits, the first row in the lowest bit: 0 where a number is missing. */
function markMissing(cells: Float32Array | Float64Array): { nullBitmap: Uint8Array; nullCount: number } {
  const nullBitmap = new Uint8Array(Math.ceil(cells.length / 8));
  let nullCount = 0;
  for (let row = 0; row < cells.length; row++) {
    if (Number.isNaN(cells[row]!)) nullCount++;
    else nullBitmap[row >> 3]! |= 1 << (row & 7);
  }
  return { nullBitmap, nullCount };
}
