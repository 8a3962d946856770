import type { ExportBatch, ExportColumn, ExportTable } from "@/lib/export/export-table";
import { dbfRows, type DbfField } from "@/lib/export/shapefile/dbf";

/** The most fields that a dBASE table may have by common practice. */
export const DBF_MAX_FIELDS = 255;

/** Digits after the point that keep more than any monitor logs. */
const READING_DECIMALS: Record<string, number | undefined> = {
  N: 2,
  m: 5,
  "m/s": 3,
  degrees: 2,
  s: 3,
  "1/m2": 4,
  "kg/s": 5,
  kg: 3,
  Pa: 1,
};
const OTHER_DECIMALS = 6;
const NUMBER_WIDTH = 14;
const INTEGER_WIDTH = 11;

/** Columns of a table that a shapefile writes as attributes: all but the place. */
export function attributeColumns(table: ExportTable): { column: ExportColumn; index: number }[] {
  return table.columns.map((column, index) => ({ column, index })).filter(({ column }) => !column.position);
}

export function dbfFields(table: ExportTable): DbfField[] {
  return attributeColumns(table).map(({ column }) => {
    const name = column.shortName;
    if (column.kind === "text" || column.kind === "time")
      return { name, type: "C", width: column.width ?? 80, decimals: 0 };
    if (column.kind === "integer") return { name, type: "N", width: INTEGER_WIDTH, decimals: 0 };
    const decimals = column.decimals ?? READING_DECIMALS[column.unit] ?? OTHER_DECIMALS;
    return { name, type: "N", width: NUMBER_WIDTH, decimals };
  });
}

/** The attribute rows of a batch. */
export function dbfBatch(table: ExportTable, fields: readonly DbfField[], batch: ExportBatch): Uint8Array {
  const columns = attributeColumns(table);
  return dbfRows(fields, batch.rows, (field, row) => {
    const { column, index } = columns[field]!;
    const value = batch.cells[index]![row] ?? null;
    if (column.kind !== "time" || typeof value !== "number") return value;
    return Number.isFinite(value) ? new Date(value).toISOString() : null;
  });
}
