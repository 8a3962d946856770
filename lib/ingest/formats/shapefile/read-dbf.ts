import { stopReading } from "@/lib/ingest/ingest-error";

export interface DbfField {
  name: string;
  type: string;
  /** Within the record, after the deletion mark. */
  offset: number;
  length: number;
}

export interface DbfTable {
  fields: DbfField[];
  /** Records stated by the header. */
  stated: number;
  /** Records that are there. */
  records: number;
  recordBytes: number;
  firstByte: number;
  bytes: Uint8Array;
  decoder: TextDecoder;
}

const DESCRIPTOR_BYTES = 32;
const END_OF_FIELDS = 13;

/** Header of a dBase table (layout as in the dBase III/IV file descriptions; numbers are texts of fixed width). */
export function openDbf(bytes: Uint8Array, name: string, encoding: string): DbfTable {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (bytes.length < DESCRIPTOR_BYTES + 1) stopDamaged(name, "it is shorter than its header");
  const stated = view.getUint32(4, true);
  const firstByte = view.getUint16(8, true);
  const recordBytes = view.getUint16(10, true);
  const decoder = createDecoder(encoding);
  const fields: DbfField[] = [];
  let offset = 1;
  for (
    let at = DESCRIPTOR_BYTES;
    at + DESCRIPTOR_BYTES <= bytes.length && bytes[at] !== END_OF_FIELDS;
    at += DESCRIPTOR_BYTES
  ) {
    if (at + DESCRIPTOR_BYTES > firstByte) break;
    const nameBytes = bytes.subarray(at, at + 11);
    const end = nameBytes.indexOf(0);
    const type = String.fromCharCode(bytes[at + 11] ?? 0);
    const length = bytes[at + 16] ?? 0;
    fields.push({ name: decoder.decode(end < 0 ? nameBytes : nameBytes.subarray(0, end)), type, offset, length });
    offset += length;
  }
  if (fields.length === 0 || offset !== recordBytes) stopDamaged(name, "its fields do not add up to its record length");
  const records = Math.max(0, Math.min(stated, Math.floor((bytes.length - firstByte) / recordBytes)));
  return { fields, stated, records, recordBytes, firstByte, bytes, decoder };
}

function stopDamaged(name: string, why: string): never {
  stopReading("shapefile-damaged", `"${name}" is no readable dBase table: ${why}. Export the log again.`);
}

/** Encoding named by the .cpg; Windows-1252 for anything unknown, which is what these files mostly are. */
function createDecoder(encoding: string): TextDecoder {
  try {
    return new TextDecoder(encoding);
  } catch {
    return new TextDecoder("windows-1252");
  }
}

/** Label of a .cpg part (`UTF-8`, `1252`, `ISO 88591`) as TextDecoder knows it. */
export function readCodePage(text: string): string {
  const label = text.trim().toLowerCase();
  if (/^(?:ansi )?125\d$/.test(label)) return `windows-${label.slice(-4)}`;
  const iso = /^iso[ _-]?8859[ _-]?(\d{1,2})$/.exec(label);
  return iso ? `iso-8859-${iso[1] ?? "1"}` : label || "utf-8";
}

export function isDeleted(table: DbfTable, record: number): boolean {
  return table.bytes[table.firstByte + record * table.recordBytes] === 42;
}

/** A cell as text, without the blanks that fill it. Dates come as yyyy-mm-dd. */
export function readCellText(table: DbfTable, record: number, field: DbfField): string {
  const start = table.firstByte + record * table.recordBytes + field.offset;
  const text = table.decoder
    .decode(table.bytes.subarray(start, start + field.length))
    .replace(/\0/g, " ")
    .trim();
  if (/^\*+$/.test(text)) return "";
  if (field.type === "D" && /^\d{8}$/.test(text)) return `${text.slice(0, 4)}-${text.slice(4, 6)}-${text.slice(6)}`;
  return field.type === "L" && text === "?" ? "" : text;
}
