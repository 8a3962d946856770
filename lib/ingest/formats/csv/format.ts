import { readHead, type ByteSource } from "@/lib/ingest/byte-source";
import { describeFoundColumns } from "@/lib/ingest/columns/describe-found-columns";
import { decodeHead, detectEncoding, type FoundEncoding } from "@/lib/ingest/formats/csv/decode-text";
import { parseCsvText } from "@/lib/ingest/formats/csv/parse-csv-text";
import { readGeneral } from "@/lib/ingest/formats/csv/read-general";
import { readPlain } from "@/lib/ingest/formats/csv/read-plain";
import { sniffDialect, type CsvDialect } from "@/lib/ingest/formats/csv/sniff-dialect";
import { openText } from "@/lib/ingest/open-text";
import { stopReading } from "@/lib/ingest/ingest-error";
import type { InspectOptions, Inspection, LogFormat, ReadLog, ReadOptions } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import { NoteBook } from "@/lib/ingest/records/note-book";
import { buildReadPlan } from "@/lib/ingest/records/read-plan";
import { RecordCollector } from "@/lib/ingest/records/record-collector";

/** Bytes looked at to learn how the file is written and to sample its columns. */
const HEAD_BYTES = 1 << 19;
const WIDE_HEAD_BYTES = 8 << 20;
const SAMPLE_ROWS = 600;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;

/** Delimited text: one line a record (wide, single) or one a row unit (long); may be gzipped. */
export const csvFormat: LogFormat = {
  id: "csv",
  label: "CSV or tab-separated text",
  extensions: [".csv", ".tsv", ".txt", ".csv.gz", ".tsv.gz"],
  looksLike: (head) => detectEncoding(head) !== null,
  inspect: inspectCsv,
  read: readCsv,
};

interface CsvLayout {
  head: Uint8Array;
  text: string;
  isWhole: boolean;
  encoding: FoundEncoding;
  dialect: CsvDialect;
}

async function learnLayout(source: ByteSource): Promise<CsvLayout> {
  let head = await readHead(source, HEAD_BYTES);
  // Twenty thousand columns make a header longer than the usual head.
  if (head.length === HEAD_BYTES && countLineFeeds(head) < 4) head = await readHead(source, WIDE_HEAD_BYTES);
  const encoding = detectEncoding(head);
  if (!encoding) {
    stopReading(
      "unknown-file-kind",
      `"${source.name}" holds bytes that are no text, and no kind of log this program reads. Upload CSV, GeoJSON or a zipped point shapefile.`,
    );
  }
  const text = decodeHead(head, encoding);
  if (text.trim() === "") {
    stopReading("empty-file", `"${source.name}" is empty. Export the log again and upload that file.`);
  }
  const isWhole = head.length < HEAD_BYTES;
  return { head, text, isWhole, encoding, dialect: sniffDialect(text, isWhole, source.name) };
}

async function inspectCsv(source: ByteSource, options: InspectOptions): Promise<Inspection> {
  const { text, isWhole, encoding, dialect } = await learnLayout(openText(source, options));
  const maxRows = dialect.rowsBefore + SAMPLE_ROWS;
  const rows = parseCsvText(text, { ...dialect, isLast: isWhole, maxRows })
    .rows.slice(dialect.rowsBefore)
    .filter((row) => row.length === dialect.names.length);
  const notes = new NoteBook();
  notes.set("lines-before-header", dialect.preamble);
  if (!dialect.hasHeader) notes.add("no-header", 1);
  if (dialect.units) notes.add("units-row", dialect.linesBefore);
  if (dialect.decimalComma) notes.add("decimal-comma");
  if (rows.length === 0 && isWhole) {
    stopReading(
      "no-readings",
      `"${source.name}" has a header but no line of readings with as many fields (${dialect.names.length}) after it. Export the log again.`,
    );
  }
  const found = describeFoundColumns({
    names: dialect.names,
    units: dialect.units,
    cells: (field) => rows.map((row) => row[field] ?? ""),
    decimalComma: dialect.decimalComma,
    near: options.near,
    notes,
  });
  return {
    format: "csv",
    shape: found.shape,
    delimiter: dialect.delimiter,
    decimalComma: dialect.decimalComma,
    encoding: encoding.encoding,
    ...(found.crsCandidates ? { crsCandidates: found.crsCandidates } : {}),
    ...(found.example ? { example: found.example } : {}),
    columns: found.columns,
    recordsSampled: rows.length,
    notes: notes.list("line"),
  };
}

async function readCsv(source: ByteSource, mapping: LogMapping, options: ReadOptions): Promise<ReadLog> {
  const layout = await learnLayout(openText(source, { signal: options.signal }));
  const { dialect, encoding } = layout;
  const plan = buildReadPlan(mapping, dialect.names);
  const opened = openText(source, options);
  const expectedLines = expectLines(layout, opened.sizeBytes);
  const isPlain =
    dialect.newline === "\n" &&
    !dialect.decimalComma &&
    (encoding.encoding === "utf-8" || encoding.encoding === "windows-1252");
  if (isPlain) {
    const collector = new RecordCollector(plan, { expectedLines, place: "line" });
    const scan = {
      collector,
      delimiter: dialect.delimiter.charCodeAt(0),
      decoder: new TextDecoder(encoding.encoding),
      lineNumber: 0,
      raggedFields: 0,
      linesBefore: dialect.linesBefore,
      headLines: cutHeadLines(layout),
    };
    if (await readPlain(opened, scan, encoding.markBytes)) return collector.finish();
  }
  const collector = new RecordCollector(plan, { expectedLines, place: "line" });
  await readGeneral(opened, collector, layout);
  return collector.finish();
}

/** The bytes of the header line and of the line of units, without their ends; none where there is no header. */
function cutHeadLines({ head, dialect, encoding }: CsvLayout): Uint8Array[] {
  if (!dialect.hasHeader) return [];
  const count = dialect.units ? 2 : 1;
  const lines: Uint8Array[] = [];
  let start = encoding.markBytes;
  for (let line = 1; line <= dialect.linesBefore; line++) {
    const end = head.indexOf(LINE_FEED, start);
    if (end < 0) return [];
    if (line > dialect.linesBefore - count) {
      lines.push(head.subarray(start, head[end - 1] === CARRIAGE_RETURN ? end - 1 : end));
    }
    start = end + 1;
  }
  return lines;
}

/** Lines may get shorter behind the head; too little room costs a copy of all readings, too much is cut off without one. */
const MARGIN = 1.06;

/** Lines of the file by the length of the lines in the head, a little over. */
function expectLines(layout: CsvLayout, sizeBytes: number): number {
  const lines = Math.max(1, countLineFeeds(layout.head));
  return Math.ceil((sizeBytes / layout.head.length) * lines * MARGIN) + 16;
}

function countLineFeeds(bytes: Uint8Array): number {
  let count = 0;
  for (let at = bytes.indexOf(10); at >= 0; at = bytes.indexOf(10, at + 1)) count++;
  return count;
}
