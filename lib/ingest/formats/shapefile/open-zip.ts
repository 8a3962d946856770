import { unzipSync, type UnzipFileInfo } from "fflate";
import { joinChunks, type ByteSource } from "@/lib/ingest/byte-source";
import { IngestFailure, stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";

const LARGEST_ENTRIES = 1000;
/** A table of numbers in fixed columns packs to about a twentieth; zeros to a thousandth. */
const LARGEST_RATIO = 250;
/** Below this an archive is harmless whatever its ratio. */
const HARMLESS_BYTES = 32 * 1024 * 1024;

export interface ZipArchive {
  name: string;
  bytes: Uint8Array;
  entries: UnzipFileInfo[];
}

export function isZip(head: Uint8Array): boolean {
  return head[0] === 0x50 && head[1] === 0x4b && (head[2] === 3 || head[2] === 5) && (head[3] === 4 || head[3] === 6);
}

/** The whole archive in memory and its list of entries, checked before anything is unpacked. */
export async function openZip(source: ByteSource, onBytes?: (taken: number) => void): Promise<ZipArchive> {
  if (source.sizeBytes > READ_LIMITS.archiveBytes) stopTooLarge(source.name);
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of source.stream()) {
    chunks.push(chunk.slice());
    length += chunk.length;
    if (length > READ_LIMITS.archiveBytes) stopTooLarge(source.name);
    onBytes?.(length);
  }
  const bytes = joinChunks(chunks, length);
  const entries = listEntries(bytes, source.name);
  checkEntries(entries, source.name, length);
  return { name: source.name, bytes, entries };
}

function stopTooLarge(name: string): never {
  stopReading(
    "file-too-large",
    `The archive "${name}" is larger than 512 MB. Split the log, or upload it as CSV, which may be larger.`,
  );
}

function listEntries(bytes: Uint8Array, name: string): UnzipFileInfo[] {
  const entries: UnzipFileInfo[] = [];
  try {
    unzipSync(bytes, {
      filter: (entry) => {
        // More than enough to know that the archive is refused; the list itself must not grow without end.
        if (entries.length <= LARGEST_ENTRIES) entries.push(entry);
        return false;
      },
    });
  } catch {
    stopReading(
      "archive-truncated",
      `The zip "${name}" has no readable list of its files at the end: it was cut short on the way. Upload it again from the original.`,
    );
  }
  if (entries.length > 0) return entries;
  return stopReading(
    "archive-damaged",
    `The zip "${name}" holds no files. Zip the .shp, .dbf, .shx and .prj of the log and upload that.`,
  );
}

function checkEntries(entries: readonly UnzipFileInfo[], name: string, packedBytes: number): void {
  if (entries.length > LARGEST_ENTRIES) {
    stopReading(
      "archive-bomb",
      `The zip "${name}" holds more than ${LARGEST_ENTRIES} files; a log has about five. Zip only the log.`,
    );
  }
  const unsafe = entries.find((entry) => isUnsafeName(entry.name));
  if (unsafe) {
    stopReading(
      "archive-unsafe-name",
      `The zip "${name}" holds a file named "${unsafe.name.slice(0, 80)}", which points outside the archive. Such names are refused; zip the log again.`,
    );
  }
  const unpacked = entries.reduce((sum, entry) => sum + entry.originalSize, 0);
  const isTooDense = unpacked > HARMLESS_BYTES && unpacked > packedBytes * LARGEST_RATIO;
  if (isTooDense || unpacked > READ_LIMITS.unpackedBytes) {
    const limit = isTooDense ? `${LARGEST_RATIO} times its own size` : "2 GB";
    stopReading(
      "archive-bomb",
      `The zip "${name}" would unpack to more than ${limit}, which no log does. It was not opened; split the log or upload it as CSV.`,
    );
  }
}

/** Absolute paths, drive letters, backslashes, `..` steps and control characters. */
export function isUnsafeName(name: string): boolean {
  const hasControl = [...name].some((letter) => letter.charCodeAt(0) < 32);
  return hasControl || /^\/|^[A-Za-z]:|\\/.test(name) || name.split("/").includes("..");
}

/** The bytes of one entry. Stops with `archive-damaged` when it does not unpack to the size its list entry says. */
export function unpackEntry(archive: ZipArchive, entry: UnzipFileInfo): Uint8Array {
  try {
    const bytes = unzipSync(archive.bytes, { filter: (candidate) => candidate.name === entry.name })[entry.name];
    if (bytes?.length === entry.originalSize) return bytes;
  } catch (error) {
    if (error instanceof IngestFailure) throw error;
  }
  return stopReading(
    "archive-damaged",
    `"${entry.name}" in the zip "${archive.name}" is damaged and cannot be unpacked. Upload the archive again from the original.`,
  );
}
