import { bytesSource, readHead, type ByteSource } from "@/lib/ingest/byte-source";
import { csvFormat } from "@/lib/ingest/formats/csv/format";
import { geojsonFormat } from "@/lib/ingest/formats/geojson/format";
import type { ZipEntry } from "@/lib/ingest/formats/zip/list-entries";
import { unpackEntry, type ZipArchive } from "@/lib/ingest/formats/zip/open-zip";
import { IngestFailure, stopReading, type IngestError } from "@/lib/ingest/ingest-error";
import { inspectPartsBy, readPartsBy, type PartReader } from "@/lib/ingest/join-parts";
import type { ArchivedFormat, LogFormat } from "@/lib/ingest/log-format";
import { isGzip, openText } from "@/lib/ingest/open-text";
import { fail, succeed, type Result } from "@/lib/result";

const TEXT_LOG = /\.(?:csv|tsv|txt|geojson|geojsons|json)(?:\.gz)?$/i;
const HIDDEN = /(?:^|\/)(?:__MACOSX(?:\/|$)|\.)/;
/** Texts that lie beside data in most archives. */
const ABOUT = /(?:^|\/)(?:read[ _-]?me|licen[cs]e|copying|about)[^/]*\.txt$/i;
const HEAD_BYTES = 65_536;
const TEXT_FORMATS: readonly LogFormat[] = [geojsonFormat, csvFormat];

/** A zip of CSV or GeoJSON files: a card full of parts, read as one log. */
export const cardFormat: ArchivedFormat = {
  id: "csv",
  label: "Zip of CSV or GeoJSON files",
  holds: ({ entries }) => entries.some(isLog),
  inspect: async (archive, options) => orStop(await inspectPartsBy(TEXT_PARTS, await openParts(archive), options)),
  async read(archive, mapping, options) {
    const outcome = await readPartsBy(TEXT_PARTS, await openParts(archive), mapping, options);
    // The parts are inside: whoever reads the zip gave one file.
    const { log, notes } = orStop(outcome);
    return { log, notes };
  },
};

const TEXT_PARTS: PartReader = {
  inspect: (source, options) => guard(async () => (await findTextFormat(source)).inspect(source, options)),
  read: (source, mapping, options) => guard(async () => (await findTextFormat(source)).read(source, mapping, options)),
};

function isLog({ name, unpackedBytes }: ZipEntry): boolean {
  return unpackedBytes > 0 && TEXT_LOG.test(name) && !HIDDEN.test(name) && !ABOUT.test(name);
}

/** The parts in the order of their names. A .txt beside other logs is a description, not a part. */
async function openParts(archive: ZipArchive): Promise<ByteSource[]> {
  const logs = archive.entries.filter(isLog).sort((a, b) => (a.name < b.name ? -1 : 1));
  const plain = logs.filter(({ name }) => !/\.txt$/i.test(name));
  return (plain.length > 0 ? plain : logs).map((entry) => entrySource(archive, entry));
}

/** Unpacked anew each time it is read, so that only one part at a time is in memory. */
function entrySource(archive: ZipArchive, entry: ZipEntry): ByteSource {
  const { name, unpackedBytes } = entry;
  async function* stream(): AsyncIterable<Uint8Array> {
    yield* bytesSource(name, await unpackEntry(archive, entry)).stream();
  }
  return { name, sizeBytes: unpackedBytes, stream };
}

async function findTextFormat(source: ByteSource): Promise<LogFormat> {
  const packed = await readHead(source, HEAD_BYTES);
  const head = isGzip(packed) ? await readHead(openText(source, {}), HEAD_BYTES) : packed;
  const format = TEXT_FORMATS.find((candidate) => candidate.looksLike(head, source.name));
  if (format) return format;
  stopReading("unknown-file-kind", `"${source.name}" in the zip is no CSV or GeoJSON. Zip only the files of the log.`);
}

async function guard<T>(work: () => Promise<T>): Promise<Result<T, IngestError>> {
  try {
    return succeed(await work());
  } catch (error) {
    if (error instanceof IngestFailure) return fail(error.error);
    throw error;
  }
}

function orStop<T>(outcome: Result<T, IngestError>): T {
  if (outcome.ok) return outcome.value;
  throw new IngestFailure(outcome.error);
}
