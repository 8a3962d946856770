import Papa from "papaparse";
import { stopReading } from "@/lib/ingest/ingest-error";

export interface ParsedText {
  rows: string[][];
  /** Characters taken; the rest is the beginning of a row. */
  taken: number;
  /** A quote opened and was not closed by the end of the text. */
  isOpen: boolean;
}

interface RowParse {
  data: string[][];
  errors: { code: string }[];
  meta: { cursor: number };
}

export interface CsvTextOptions {
  delimiter: string;
  newline: "\n" | "\r";
  /** False leaves the last row, which may be unfinished, for the next piece. */
  isLast: boolean;
  maxRows?: number;
}

/**
 * Rows of a piece of RFC 4180 text, as texts. Rows are split at LF and a CR before it is dropped,
 * so that files which mix both read the same.
 */
export function parseCsvText(text: string, options: CsvTextOptions): ParsedText {
  // papaparse's row parser, which its streamers use: unlike `Papa.parse` it tells how far it got.
  const parser = new Papa.Parser({ delimiter: options.delimiter, newline: options.newline, preview: options.maxRows });
  const { data, errors, meta }: RowParse = parser.parse(text, 0, !options.isLast);
  for (const row of data) {
    const last = row.length - 1;
    const cell = row[last];
    if (cell !== undefined && cell.endsWith("\r")) row[last] = cell.slice(0, -1);
  }
  return { rows: data, taken: meta.cursor, isOpen: errors.some((error) => error.code === "MissingQuotes") };
}

/** Lines of the file that a row takes: one, and one more for each line break inside its cells. */
export function countLines(row: readonly string[]): number {
  let lines = 1;
  for (const cell of row) {
    for (let at = cell.indexOf("\n"); at >= 0; at = cell.indexOf("\n", at + 1)) lines++;
  }
  return lines;
}

export function stopUnclosedQuote(line: number): never {
  stopReading(
    "unclosed-quote",
    `A quote that opens on or after line ${line} is never closed, so the rest of the file cannot be split into cells. Export the log again, or close the quote.`,
    { line },
  );
}
