import { joinChunks, type ByteSource } from "@/lib/ingest/byte-source";
import { listEntries, type ZipEntry } from "@/lib/ingest/formats/zip/list-entries";
import { stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";

const MOST_ENTRIES = 1000;
/** A table of numbers in fixed columns packs to about a twentieth; zeros to a thousandth. */
const LARGEST_RATIO = 250;
/** Below this an archive is harmless whatever its ratio. */
const HARMLESS_BYTES = 32 * 1024 * 1024;
const LOCAL_HEADER_BYTES = 30;
const LOCAL_SIGNATURE = 0x04034b50;

export interface ZipArchive {
  name: string;
  bytes: Uint8Array;
  entries: ZipEntry[];
}

export function isZip(head: Uint8Array): boolean {
  return head[0] === 0x50 && head[1] === 0x4b && (head[2] === 3 || head[2] === 5) && (head[3] === 4 || head[3] === 6);
}

/** The whole archive in memory and its list of entries, checked before anything is unpacked. */
export async function openZip(source: ByteSource): Promise<ZipArchive> {
  if (source.sizeBytes > READ_LIMITS.archiveBytes) stopTooLarge(source.name);
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of source.stream()) {
    chunks.push(chunk.slice());
    length += chunk.length;
    if (length > READ_LIMITS.archiveBytes) stopTooLarge(source.name);
  }
  const bytes = joinChunks(chunks, length);
  const entries = listEntries(bytes, source.name, MOST_ENTRIES);
  checkEntries(entries, source.name, length);
  return { name: source.name, bytes, entries };
}

function stopTooLarge(name: string): never {
  stopReading(
    "file-too-large",
    `The archive "${name}" is larger than 512 MB. Split the log, or upload it as CSV, which may be larger.`,
  );
}

function checkEntries(entries: readonly ZipEntry[], name: string, packedBytes: number): void {
  if (entries.length === 0) {
    stopReading(
      "archive-damaged",
      `The zip "${name}" holds no files. Zip the .shp, .dbf, .shx and .prj of the log and upload that.`,
    );
  }
  if (entries.length > MOST_ENTRIES) {
    stopReading(
      "archive-bomb",
      `The zip "${name}" holds more than ${MOST_ENTRIES} files; a log has about five. Zip only the log.`,
    );
  }
  const unsafe = entries.find((entry) => isUnsafeName(entry.name));
  if (unsafe) {
    stopReading(
      "archive-unsafe-name",
      `The zip "${name}" holds a file named "${unsafe.name.slice(0, 80)}", which points outside the archive. Such names are refused; zip the log again.`,
    );
  }
  const unpacked = entries.reduce((sum, entry) => sum + entry.unpackedBytes, 0);
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

/**
 * The first `maxBytes` of an entry, unpacked by the platform's own inflate; all of it by default. Never more than the list
 * states, so that an entry that lies about its size cannot grow. Stops with `archive-damaged` when it holds less.
 */
export async function unpackEntry(archive: ZipArchive, entry: ZipEntry, maxBytes = Infinity): Promise<Uint8Array> {
  const packed = packedBytesOf(archive, entry);
  const wanted = Math.min(entry.unpackedBytes, maxBytes);
  if (entry.method === 0 && packed.length >= wanted) return packed.subarray(0, wanted);
  if (entry.method !== 8) stopDamaged(archive, entry);
  const unpacked = new Uint8Array(wanted);
  const length = await inflateInto(unpacked, packed);
  return length === wanted ? unpacked : stopDamaged(archive, entry);
}

function packedBytesOf(archive: ZipArchive, entry: ZipEntry): Uint8Array {
  const { bytes } = archive;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const { headerAt } = entry;
  if (view.getUint32(headerAt, true) !== LOCAL_SIGNATURE) stopDamaged(archive, entry);
  const start =
    headerAt + LOCAL_HEADER_BYTES + view.getUint16(headerAt + 26, true) + view.getUint16(headerAt + 28, true);
  if (start + entry.packedBytes > bytes.length) stopDamaged(archive, entry);
  return bytes.subarray(start, start + entry.packedBytes);
}

/** Fills `target` and gives how much came; anything wrong with the packed bytes ends it early. */
async function inflateInto(target: Uint8Array, packed: Uint8Array): Promise<number> {
  const unpacker = new DecompressionStream("deflate-raw");
  const writer = unpacker.writable.getWriter();
  // Failures show on the reading side; these only keep them from counting as unhandled.
  writer.write(packed as Uint8Array<ArrayBuffer>).catch(() => undefined);
  writer.close().catch(() => undefined);
  const reader = unpacker.readable.getReader();
  let length = 0;
  try {
    while (length < target.length) {
      const { done, value } = await reader.read();
      if (done) break;
      const part = value.subarray(0, target.length - length);
      target.set(part, length);
      length += part.length;
    }
  } catch {
    return -1;
  } finally {
    reader.cancel().catch(() => undefined);
  }
  return length;
}

function stopDamaged(archive: ZipArchive, entry: ZipEntry): never {
  stopReading(
    "archive-damaged",
    `"${entry.name}" in the zip "${archive.name}" is damaged and cannot be unpacked. Upload the archive again from the original.`,
  );
}
