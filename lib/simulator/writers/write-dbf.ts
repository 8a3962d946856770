import type { LogColumn } from "@/lib/simulator/writers/log-columns";

const NUMBER_WIDTH = 14;
const TEXT_WIDTH = 24;
const FIELD_BYTES = 32;

/** A dBASE III table: fixed-width text, blanks where the log holds nothing. Names are 10 ASCII letters at most. */
export function writeDbf(records: number, columns: readonly LogColumn[]): Uint8Array {
  const widths = columns.map((column) => (column.decimals < 0 ? TEXT_WIDTH : NUMBER_WIDTH));
  const headerBytes = 32 + FIELD_BYTES * columns.length + 1;
  const recordBytes = 1 + widths.reduce((sum, width) => sum + width, 0);
  const bytes = new Uint8Array(headerBytes + recordBytes * records + 1).fill(0x20, headerBytes);
  const view = new DataView(bytes.buffer);
  // Version 3, last changed 2026-09-24 (years since 1900).
  bytes.set([3, 126, 9, 24]);
  view.setUint32(4, records, true);
  view.setUint16(8, headerBytes, true);
  view.setUint16(10, recordBytes, true);
  columns.forEach((column, index) => writeField(view, 32 + FIELD_BYTES * index, column, widths[index] ?? 0));
  view.setUint8(headerBytes - 1, 0x0d);
  for (let record = 0; record < records; record += 1) {
    let at = headerBytes + recordBytes * record + 1;
    columns.forEach((column, index) => {
      const width = widths[index] ?? 0;
      writeText(bytes, at, cellText(column, record, width));
      at += width;
    });
  }
  bytes[bytes.length - 1] = 0x1a;
  return bytes;
}

// kernel: one 32-byte field descriptor
function writeField(view: DataView, at: number, column: LogColumn, width: number): void {
  [...column.name].forEach((letter, index) => view.setUint8(at + index, letter.charCodeAt(0)));
  view.setUint8(at + 11, column.decimals < 0 ? "C".charCodeAt(0) : "N".charCodeAt(0));
  view.setUint8(at + 16, width);
  view.setUint8(at + 17, Math.max(0, column.decimals));
}

function cellText(column: LogColumn, record: number, width: number): string {
  const value = column.at(record);
  if (value === null) return "";
  return typeof value === "string" ? value.padEnd(width) : value.toFixed(column.decimals).padStart(width);
}

function writeText(bytes: Uint8Array, at: number, text: string): void {
  for (let index = 0; index < text.length; index += 1) bytes[at + index] = text.charCodeAt(index);
}
