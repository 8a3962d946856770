import { readHead, type ByteSource } from "@/lib/ingest/byte-source";
// The kinds of file a log may come in, in the order they are tried.
import { zipFormat } from "@/lib/ingest/formats/zip/format";
import { geojsonFormat } from "@/lib/ingest/formats/geojson/format";
import { csvFormat } from "@/lib/ingest/formats/csv/format";
import { IngestFailure, ingestError, stopReading, type IngestError } from "@/lib/ingest/ingest-error";
import type { InspectOptions, Inspection, LogFormat, ReadLog, ReadOptions } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { isGzip, openText } from "@/lib/ingest/open-text";
import { turnRows } from "@/lib/ingest/records/turn-rows";
import { fail, succeed, type Result } from "@/lib/result";

export const LOG_FORMATS: readonly LogFormat[] = [zipFormat, geojsonFormat, csvFormat];

/** Bytes of the head that `detectFormat` wants. */
export const DETECT_BYTES = 65_536;

/** The format of a file by its first bytes (unpacked, where gzipped); null when it is none of ours. The name is a hint only. */
export function detectFormat(name: string, head: Uint8Array): LogFormat | null {
  return LOG_FORMATS.find((format) => format.looksLike(head, name)) ?? null;
}

/** What a log file holds and what its columns seem to mean. Never throws for bad input. */
export async function inspectLog(
  source: ByteSource,
  options: InspectOptions = {},
): Promise<Result<Inspection, IngestError>> {
  return guard(source, async () => (await findFormat(source)).inspect(source, options));
}

/** Reads a log by a confirmed mapping. Never throws for bad input; rejected lines and the like come back as notes. */
export async function readLog(
  source: ByteSource,
  mapping: LogMapping,
  options: ReadOptions = {},
): Promise<Result<ReadLog, IngestError>> {
  return guard(source, async () => {
    const read = await (await findFormat(source)).read(source, mapping, options);
    if (mapping.rowsFromRight) turnRows(read.log);
    return read;
  });
}

async function findFormat(source: ByteSource): Promise<LogFormat> {
  const packed = await readHead(source, DETECT_BYTES);
  const head = isGzip(packed) ? await readHead(openText(source, {}), DETECT_BYTES) : packed;
  if (head.length === 0) {
    stopReading("empty-file", `"${source.name}" is empty. Export the log again and upload that file.`);
  }
  const format = detectFormat(source.name, head);
  if (format) return format;
  stopReading(
    "unknown-file-kind",
    `"${source.name}" is no kind of log this program reads. Upload CSV, GeoJSON, a zipped shapefile or zipped ISO 11783-10 task data.`,
  );
}

/** Turns whatever goes wrong into an IngestError: our own stops as they are, anything else as `unreadable`. */
async function guard<T>(source: ByteSource, work: () => Promise<T>): Promise<Result<T, IngestError>> {
  try {
    return succeed(await work());
  } catch (error) {
    if (error instanceof IngestFailure) return fail(error.error);
    const detail = error instanceof Error ? error.message : String(error);
    return fail(
      ingestError(
        "unreadable",
        `"${source.name}" could not be read (${detail}). Export the log again and upload that.`,
      ),
    );
  }
}
