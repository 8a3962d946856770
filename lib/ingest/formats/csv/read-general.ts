import type { ByteSource } from "@/lib/ingest/byte-source";
import { countLines, parseCsvText, stopUnclosedQuote } from "@/lib/ingest/formats/csv/parse-csv-text";
import { nameColumns } from "@/lib/ingest/columns/name-columns";
import type { FoundEncoding } from "@/lib/ingest/formats/csv/decode-text";
import type { CsvDialect } from "@/lib/ingest/formats/csv/sniff-dialect";
import type { RecordCollector } from "@/lib/ingest/records/record-collector";

/** A row not finished after so many characters has a quote that is never closed. */
const LONGEST_ROW = 4 * 1024 * 1024;

interface GeneralState {
  rowsBefore: number;
  lineNumber: number;
}

/** Reads any delimited text through papaparse: quotes, decimal comma, UTF-16, Windows-1252. */
export async function readGeneral(
  source: ByteSource,
  collector: RecordCollector,
  layout: { dialect: CsvDialect; encoding: FoundEncoding },
): Promise<void> {
  const { dialect, encoding } = layout;
  const decoder = new TextDecoder(encoding.encoding);
  const state: GeneralState = { rowsBefore: dialect.rowsBefore, lineNumber: 0 };
  let rest = "";
  let tried = 0;
  let skip = encoding.markBytes;
  for await (const chunk of source.stream()) {
    const bytes = skip > 0 ? chunk.subarray(skip) : chunk;
    skip -= chunk.length - bytes.length;
    rest += decoder.decode(bytes, { stream: true });
    // Parsing again from the same start at every small chunk would cost the square of the row's length.
    if (rest.length < tried * 2) continue;
    const { rows, taken } = parseCsvText(rest, { ...dialect, isLast: false });
    takeRows(rows, collector, { state, dialect });
    rest = rest.slice(taken);
    tried = rest.length;
    if (rest.length > LONGEST_ROW) stopUnclosedQuote(state.lineNumber + 1);
  }
  rest += decoder.decode();
  const { rows, isOpen } = parseCsvText(rest, { ...dialect, isLast: true });
  if (isOpen) stopUnclosedQuote(state.lineNumber + 1);
  takeRows(rows, collector, { state, dialect });
  const last = rows.at(-1);
  if (!last || /[\r\n]$/.test(rest) || isBlank(last)) return;
  if (last.length < collector.plan.columnCount) collector.noteCutLine(state.lineNumber + 1 - countLines(last));
}

function isBlank(row: readonly string[]): boolean {
  return row.length === 1 && row[0] === "";
}

function takeRows(
  rows: readonly string[][],
  collector: RecordCollector,
  { state, dialect }: { state: GeneralState; dialect: CsvDialect },
): void {
  const { columnCount } = collector.plan;
  for (const row of rows) {
    const lineNumber = state.lineNumber + 1;
    state.lineNumber += countLines(row);
    if (state.rowsBefore > 0) {
      state.rowsBefore--;
      continue;
    }
    if (isBlank(row)) continue;
    if (row.length !== columnCount) {
      collector.rejectLine("ragged-rows", lineNumber);
      continue;
    }
    if (isHeadRow(row, dialect)) {
      collector.notes.add("repeated-header", lineNumber);
      continue;
    }
    for (let field = 0; field < columnCount; field++) {
      collector.takeText(field, row[field] ?? "", lineNumber, dialect.decimalComma);
    }
    collector.commit(lineNumber);
  }
}

/** The header or the line of units once more, as files put together from parts have it. */
function isHeadRow(row: readonly string[], { hasHeader, names, units }: CsvDialect): boolean {
  const first = row[0]?.trim();
  if (hasHeader && first === names[0]) return nameColumns(row).every((name, i) => name === names[i]);
  return units !== null && first === units[0] && row.every((cell, i) => cell.trim() === units[i]);
}
