import type { ByteSource } from "@/lib/ingest/byte-source";
import { scanPlainLines, type PlainScan } from "@/lib/ingest/formats/csv/scan-plain-lines";
import { stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";

const LINE_FEED = 10;

/**
 * Reads a plain text of numbers chunk by chunk: a decimal point, quotes only around whole cells of one line.
 * Returns false when there is more to the quotes: the general reader must start over.
 */
export async function readPlain(source: ByteSource, scan: PlainScan, markBytes: number): Promise<boolean> {
  let buffer = new Uint8Array(1 << 19);
  let length = 0;
  let skip = markBytes;
  for await (const chunk of source.stream({ lends: true })) {
    const bytes = skip > 0 ? chunk.subarray(skip) : chunk;
    skip -= chunk.length - bytes.length;
    buffer = withRoomFor(buffer, length, bytes.length + 1);
    buffer.set(bytes, length);
    const lastEnd = bytes.lastIndexOf(LINE_FEED);
    length += bytes.length;
    if (lastEnd < 0) {
      checkLine(length, scan);
      continue;
    }
    const end = length - bytes.length + lastEnd + 1;
    if (!scanPlainLines(scan, buffer, end)) return false;
    buffer.copyWithin(0, end, length);
    length -= end;
  }
  if (length === 0) return true;
  // What is left has no line end of its own: where it lacks fields too, the file was cut in it.
  buffer[length] = LINE_FEED;
  scan.raggedFields = 0;
  if (!scanPlainLines(scan, buffer, length + 1)) return false;
  const { collector, raggedFields, lineNumber } = scan;
  if (raggedFields > 0 && raggedFields < collector.plan.columnCount) collector.noteCutLine(lineNumber);
  return true;
}

function withRoomFor(buffer: Uint8Array<ArrayBuffer>, length: number, more: number): Uint8Array<ArrayBuffer> {
  if (length + more <= buffer.length) return buffer;
  const larger = new Uint8Array(Math.max(buffer.length * 2, length + more));
  larger.set(buffer.subarray(0, length));
  return larger;
}

function checkLine(length: number, scan: PlainScan): void {
  if (length <= READ_LIMITS.lineBytes) return;
  stopReading(
    "line-too-long",
    `Line ${scan.lineNumber + 1} is longer than 16 MB. A log has one record a line: check that the file is a log.`,
    { line: scan.lineNumber + 1 },
  );
}
