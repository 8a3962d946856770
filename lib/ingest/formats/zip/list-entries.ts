import { stopReading } from "@/lib/ingest/ingest-error";

/** A file in an archive, as the list at the archive's end states it. */
export interface ZipEntry {
  name: string;
  packedBytes: number;
  unpackedBytes: number;
  /** 0 stored, 8 deflated. */
  method: number;
  /** Where its local header begins. */
  headerAt: number;
}

const END_SIGNATURE = 0x06054b50;
const ENTRY_SIGNATURE = 0x02014b50;
const END_BYTES = 22;
const LONGEST_COMMENT = 65_535;
const ENCRYPTED = 1;
const UTF8_NAMES = 0x800;
const ZIP64 = 0xffffffff;

/**
 * The list of files at the end of a zip (layout: .ZIP File Format Specification 6.3, sections 4.3.12 and 4.3.16), read without
 * unpacking anything. Stops with `archive-truncated`, `archive-encrypted`, or `file-too-large` for the 64-bit form.
 */
export function listEntries(bytes: Uint8Array, archive: string, mostEntries: number): ZipEntry[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const endAt = findEnd(view);
  if (endAt < 0) stopTruncated(archive);
  const count = Math.min(view.getUint16(endAt + 10, true), mostEntries + 1);
  const entries: ZipEntry[] = [];
  let at = view.getUint32(endAt + 16, true);
  for (let i = 0; i < count; i++) {
    if (at + 46 > endAt || view.getUint32(at, true) !== ENTRY_SIGNATURE) stopTruncated(archive);
    const { entry, next } = readEntry(view, at, archive);
    if (next > endAt || entry.headerAt + 30 > endAt) stopTruncated(archive);
    entries.push(entry);
    at = next;
  }
  return entries;
}

function findEnd(view: DataView): number {
  const last = view.byteLength - END_BYTES;
  for (let at = last; at >= 0 && at >= last - LONGEST_COMMENT; at--) {
    if (view.getUint32(at, true) === END_SIGNATURE) return at;
  }
  return -1;
}

function readEntry(view: DataView, at: number, archive: string): { entry: ZipEntry; next: number } {
  const flags = view.getUint16(at + 8, true);
  const nameBytes = view.getUint16(at + 28, true);
  const next = at + 46 + nameBytes + view.getUint16(at + 30, true) + view.getUint16(at + 32, true);
  const nameEnd = Math.min(at + 46 + nameBytes, view.byteLength);
  const decoder = new TextDecoder((flags & UTF8_NAMES) !== 0 ? "utf-8" : "windows-1252");
  const entry: ZipEntry = {
    name: decoder.decode(new Uint8Array(view.buffer, view.byteOffset + at + 46, nameEnd - at - 46)),
    method: view.getUint16(at + 10, true),
    packedBytes: view.getUint32(at + 20, true),
    unpackedBytes: view.getUint32(at + 24, true),
    headerAt: view.getUint32(at + 42, true),
  };
  if ((flags & ENCRYPTED) !== 0) {
    stopReading(
      "archive-encrypted",
      `"${entry.name}" in the zip "${archive}" is protected by a password. Zip the log again without one.`,
    );
  }
  if (entry.packedBytes === ZIP64 || entry.unpackedBytes === ZIP64 || entry.headerAt === ZIP64) {
    stopReading(
      "file-too-large",
      `The zip "${archive}" is in the 64-bit form for files over 4 GB. Split the log, or upload it as CSV.`,
    );
  }
  return { entry, next };
}

function stopTruncated(archive: string): never {
  stopReading(
    "archive-truncated",
    `The zip "${archive}" has no readable list of its files at the end: it was cut short on the way. Upload it again from the original.`,
  );
}
