/** A field of a dBASE III table. */
export interface DbfField {
  /** Ten ASCII characters at most. */
  name: string;
  type: "N" | "C";
  width: number;
  decimals: number;
}

export interface Day {
  year: number;
  /** From 1. */
  month: number;
  day: number;
}

const FIELD_BYTES = 32;
const BLANK = 0x20;

export const DBF_END = Uint8Array.of(0x1a);

export function dbfRecordBytes(fields: readonly DbfField[]): number {
  return 1 + fields.reduce((sum, field) => sum + field.width, 0);
}

/** Everything before the rows; its length does not depend on their number. */
export function dbfHeader(fields: readonly DbfField[], records: number, changedOn: Day): Uint8Array {
  const bytes = new Uint8Array(32 + FIELD_BYTES * fields.length + 1);
  const view = new DataView(bytes.buffer);
  // Version 3, then the day it was last changed, in years since 1900.
  bytes.set([3, changedOn.year - 1900, changedOn.month, changedOn.day]);
  view.setUint32(4, records, true);
  view.setUint16(8, bytes.length, true);
  view.setUint16(10, dbfRecordBytes(fields), true);
  fields.forEach((field, index) => {
    const at = 32 + FIELD_BYTES * index;
    [...field.name].forEach((letter, place) => view.setUint8(at + place, letter.charCodeAt(0)));
    view.setUint8(at + 11, field.type.charCodeAt(0));
    view.setUint8(at + 16, field.width);
    view.setUint8(at + 17, field.decimals);
  });
  view.setUint8(bytes.length - 1, 0x0d);
  return bytes;
}

/** Rows as fixed-width text; null leaves blanks, a text that is too long is cut at a whole character. */
export function dbfRows(
  fields: readonly DbfField[],
  rows: number,
  valueAt: (field: number, row: number) => number | string | null,
): Uint8Array {
  const recordBytes = dbfRecordBytes(fields);
  const bytes = new Uint8Array(recordBytes * rows).fill(BLANK);
  for (let row = 0; row < rows; row++) {
    let at = recordBytes * row + 1;
    fields.forEach((field, index) => {
      const value = valueAt(index, row);
      const text = value === null ? "" : typeof value === "string" ? value : dbfNumber(value, field);
      writeText(bytes, text, { from: at, width: field.width });
      at += field.width;
    });
  }
  return bytes;
}

const encoder = new TextEncoder();

/** UTF-8, no further than the field; the plain letters of nearly every cell without an encoder. */
function writeText(bytes: Uint8Array, text: string, { from, width }: { from: number; width: number }): void {
  for (let at = 0; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (at >= width || code > 127) {
      if (code > 127) encoder.encodeInto(text.slice(at), bytes.subarray(from + at, from + width));
      return;
    }
    bytes[from + at] = code;
  }
}

/** A number at the right of its field: with fewer decimals, then as a power of ten, where it is too long; blank at last. */
export function dbfNumber(value: number, { width, decimals }: Pick<DbfField, "width" | "decimals">): string {
  if (!Number.isFinite(value)) return "";
  for (let digits = decimals; digits >= 0; digits--) {
    const text = value.toFixed(digits);
    if (text.length <= width) return text.padStart(width);
  }
  const power = value.toExponential(Math.max(0, width - 8));
  return power.length <= width ? power.padStart(width) : "";
}
