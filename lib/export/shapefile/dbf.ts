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
  const encoder = new TextEncoder();
  for (let row = 0; row < rows; row++) {
    let at = recordBytes * row + 1;
    fields.forEach((field, index) => {
      const value = valueAt(index, row);
      const text = value === null ? "" : typeof value === "string" ? value : dbfNumber(value, field);
      encoder.encodeInto(text, bytes.subarray(at, at + field.width));
      at += field.width;
    });
  }
  return bytes;
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
