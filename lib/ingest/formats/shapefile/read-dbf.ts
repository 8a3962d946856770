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
  const decoder = new TextDecoder(encoding);
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

const FALLBACK = "windows-1252";

/** A label that TextDecoder knows; null for any other. */
function knownLabel(label: string): string | null {
  try {
    return new TextDecoder(label).encoding;
  } catch {
    return null;
  }
}

/** Label of a .cpg part (`UTF-8`, `1252`, `ANSI 1250`, `OEM 866`, `ISO 88591`) as TextDecoder knows it; null for a page it does not. */
export function readCodePage(text: string): string | null {
  const label = text.trim().toLowerCase();
  const page = /^(?:ansi|oem|cp|windows|ibm|dos)?[ _-]?(\d{3,5})$/.exec(label)?.[1];
  if (page === "65001") return "utf-8";
  if (page?.startsWith("125")) return knownLabel(`windows-${page}`);
  if (page !== undefined && !page.startsWith("8859")) return knownLabel(`cp${page}`);
  const iso = /^(?:iso[ _-]?)?8859[ _-]?(\d{1,2})$/.exec(label);
  return knownLabel(iso ? `iso-8859-${iso[1] ?? "1"}` : label);
}

/** Language drivers of dBase headers (byte 29) whose code pages TextDecoder knows. From the published list of such drivers. */
const LANGUAGE_DRIVERS: Record<number, string> = {
  0x03: "windows-1252",
  0x57: "windows-1252",
  0x59: "windows-1252",
  0x26: "ibm866",
  0x65: "ibm866",
  0xc8: "windows-1250",
  0xc9: "windows-1251",
  0xca: "windows-1254",
  0xcb: "windows-1253",
  0xcc: "windows-1257",
};
const LANGUAGE_DRIVER_AT = 29;

/**
 * In which encoding a table's texts are: by its .cpg, else by its language driver, else UTF-8 where its field names are
 * that, else Windows-1252, which is what these files mostly are. `isGuessed` where a .cpg names a page not known here.
 */
export function chooseEncoding(dbf: Uint8Array, cpg: string | null): { encoding: string; isGuessed: boolean } {
  if (cpg !== null && cpg.trim() !== "") {
    const named = readCodePage(cpg);
    return { encoding: named ?? FALLBACK, isGuessed: named === null };
  }
  const driver = LANGUAGE_DRIVERS[dbf[LANGUAGE_DRIVER_AT] ?? 0];
  if (driver !== undefined) return { encoding: driver, isGuessed: false };
  return { encoding: isUtf8(dbf) ? "utf-8" : FALLBACK, isGuessed: false };
}

/** Whether the table could be UTF-8, by its field names and its first 64 kB of records. */
function isUtf8(dbf: Uint8Array): boolean {
  const view = new DataView(dbf.buffer, dbf.byteOffset, dbf.byteLength);
  if (dbf.length < DESCRIPTOR_BYTES + 1) return true;
  const firstByte = view.getUint16(8, true);
  const decoder = new TextDecoder("utf-8", { fatal: true });
  try {
    for (let at = DESCRIPTOR_BYTES; at + DESCRIPTOR_BYTES <= Math.min(firstByte, dbf.length); at += DESCRIPTOR_BYTES) {
      if (dbf[at] === END_OF_FIELDS) break;
      decoder.decode(dbf.subarray(at, at + 11));
    }
    decoder.decode(dbf.subarray(firstByte, firstByte + TEXT_BYTES), { stream: true });
    return true;
  } catch {
    return false;
  }
}

const TEXT_BYTES = 65_536;

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
