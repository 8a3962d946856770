import Papa from "papaparse";
import type { CellArray, ExportBatch, ExportColumn, ExportTable } from "@/lib/export/export-table";
import { polygonWkt } from "@/lib/export/geometry/write-wkt";
import { roundTo, shortestFloat32 } from "@/lib/export/number-text";

const NEWLINE = "\r\n";
/** Beginnings that a spreadsheet would run as a formula. */
const FORMULA = /^[=+\-@\t\r]/;

/** Header line (RFC 4180). Polygons have their well-known text in a last column. */
export function csvHead(table: ExportTable): string {
  const names = table.columns.map((column) => column.name);
  if (table.geometry === "polygon") names.push("wkt");
  return names.map(textCell).join(",") + NEWLINE;
}

/** The lines of a batch. Missing is an empty cell; a text that begins like a formula gets an apostrophe before it. */
export function csvLines(table: ExportTable, { rows, cells, polygons }: ExportBatch): string {
  const texts = table.columns.map((column, index) => cellTexts(column, cells[index]!));
  if (polygons) texts.push((row) => textCell(polygonWkt(polygons[row]!)));
  let lines = "";
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < texts.length; column++) {
      if (column > 0) lines += ",";
      lines += texts[column]!(row);
    }
    lines += NEWLINE;
  }
  return lines;
}

/** A text as one cell. */
export function textCell(text: string): string {
  return Papa.unparse([[FORMULA.test(text) ? `'${text}` : text]]);
}

function cellTexts(column: ExportColumn, cells: CellArray): (row: number) => string {
  if (cells instanceof Array) return rememberTexts(cells);
  const ofNumber = numberText(column);
  return (row) => {
    const value = cells[row]!;
    return Number.isFinite(value) ? ofNumber(value) : "";
  };
}

function numberText(column: ExportColumn): (value: number) => string {
  if (column.kind === "time") return (value) => new Date(value).toISOString();
  if (column.kind === "float32") return (value) => String(shortestFloat32(value));
  return (value) => String(roundTo(value, column.decimals));
}

/** Flags repeat: the same text is quoted once. */
function rememberTexts(cells: (string | null)[]): (row: number) => string {
  const known = new Map<string, string>();
  return (row) => {
    const text = cells[row];
    if (text === null || text === undefined || text === "") return "";
    let quoted = known.get(text);
    if (quoted === undefined) known.set(text, (quoted = textCell(text)));
    return quoted;
  };
}
