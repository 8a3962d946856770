import { stopReading } from "@/lib/ingest/ingest-error";
import { READ_LIMITS } from "@/lib/ingest/log-format";
import { readUnitWord } from "@/lib/ingest/columns/read-unit-words";
import { countLines, parseCsvText, stopUnclosedQuote } from "@/lib/ingest/formats/csv/parse-csv-text";
import { nameColumns } from "@/lib/ingest/columns/name-columns";
import { isMissing, parseNumber } from "@/lib/ingest/records/parse-number";

/** How a delimited text is written. */
export interface CsvDialect {
  delimiter: string;
  newline: "\n" | "\r";
  decimalComma: boolean;
  hasHeader: boolean;
  /** Unique names of the columns. */
  names: string[];
  /** Units line under the header, where there is one. */
  units: string[] | null;
  /** Rows, and lines of the file, before the first line of data. */
  rowsBefore: number;
  linesBefore: number;
  /** Lines before the header. */
  preamble: number;
}

const DELIMITERS = [",", ";", "\t", "|"] as const;
const SNIFF_ROWS = 80;
const SNIFF_CHARACTERS = 65_536;

interface Candidate {
  delimiter: string;
  rows: string[][];
  isOpen: boolean;
  fields: number;
  score: number;
}

/** The dialect of a text from its head; stops with `not-a-log` when the head is no table. `isWhole`: the head is the whole file. */
export function sniffDialect(head: string, isWhole: boolean, name: string): CsvDialect {
  const newline = !head.includes("\n") && head.includes("\r") ? "\r" : "\n";
  const sample = cutSample(head, isWhole, newline);
  const candidates = DELIMITERS.map((delimiter) => judge(sample, delimiter, newline));
  const best = candidates.reduce((a, b) => (b.score > a.score ? b : a));
  if (best.score <= 0) {
    const open = candidates.find((candidate) => candidate.isOpen && candidate.fields > 0);
    if (open) stopUnclosedQuote(countAllLines(open.rows.slice(0, -1)) + 1);
    stopReading(
      "not-a-log",
      `"${name}" is text, but not a table: no comma, semicolon, tab or bar splits its lines into the same number of fields. Export the log as CSV and upload that.`,
    );
  }
  return describeDialect(best, newline);
}

/** Enough of the head for 80 rows, cut at a line end. */
function cutSample(head: string, isWhole: boolean, newline: string): string {
  let end = -1;
  for (let rows = 0; rows < SNIFF_ROWS || end < SNIFF_CHARACTERS; rows++) {
    const next = head.indexOf(newline, end + 1);
    if (next < 0) return isWhole ? head : head.slice(0, end + 1);
    end = next;
  }
  return head.slice(0, end + 1);
}

function isNumeric(cell: string, delimiter: string): boolean {
  return !Number.isNaN(parseNumber(cell, delimiter !== ",")) || !Number.isNaN(parseNumber(cell, true));
}

function judge(text: string, delimiter: string, newline: "\n" | "\r"): Candidate {
  const { rows, isOpen } = parseCsvText(text, { delimiter, newline, isLast: true, maxRows: SNIFF_ROWS });
  const filled = rows.filter((row) => row.length > 1 || (row[0] ?? "").trim() !== "");
  const counts = new Map<number, number>();
  for (const row of filled) counts.set(row.length, (counts.get(row.length) ?? 0) + 1);
  let fields = 0;
  let most = 0;
  for (const [count, times] of counts) {
    if (count >= 2 && (times > most || (times === most && count > fields))) [fields, most] = [count, times];
  }
  if (fields === 0) return { delimiter, rows, isOpen, fields, score: 0 };
  const cells = filled.filter((row) => row.length === fields).flat();
  // Lines of prose fall into equal parts by chance, but hold no numbers; a header alone may.
  const hasNumber = cells.some((cell) => isNumeric(cell, delimiter));
  if (!hasNumber && filled.length > 1) return { delimiter, rows, isOpen, fields, score: 0 };
  const numeric = cells.filter((cell) => isMissing(cell) || isNumeric(cell, delimiter)).length;
  // Same-length lines first, then how many cells are numbers; more columns break a tie.
  const score = (most / filled.length) * (0.2 + numeric / cells.length) + Math.min(fields, 100) * 1e-4;
  return { delimiter, rows, isOpen, fields, score };
}

function describeDialect({ delimiter, rows, fields }: Candidate, newline: "\n" | "\r"): CsvDialect {
  const header = findHeader(rows, fields, delimiter);
  const first = header.index + (header.row ? 1 : 0);
  const units = header.row ? findUnits(rows, first, delimiter) : null;
  const rowsBefore = units ? first + 1 : first;
  const titles = header.row ?? (rows[header.index] ?? []).map(() => "");
  if (titles.length > READ_LIMITS.columns) {
    stopReading(
      "too-many-columns",
      `The header has ${titles.length.toLocaleString("en-US")} columns; a log may have ${READ_LIMITS.columns.toLocaleString("en-US")}. Export fewer channels.`,
    );
  }
  return {
    delimiter,
    newline,
    decimalComma: hasDecimalComma(rows.slice(rowsBefore), delimiter),
    hasHeader: header.row !== null,
    names: nameColumns(titles),
    units,
    rowsBefore,
    linesBefore: countAllLines(rows.slice(0, rowsBefore)),
    preamble: countAllLines(rows.slice(0, header.index)),
  };
}

function countAllLines(rows: readonly string[][]): number {
  return rows.reduce((sum, row) => sum + countLines(row), 0);
}

/** The header: the first full row if it is words, or the last row of words before it. Null row: there is none. */
function findHeader(
  rows: readonly string[][],
  fields: number,
  delimiter: string,
): { index: number; row: string[] | null } {
  const firstFull = rows.findIndex((row) => row.length === fields);
  const full = rows[firstFull] ?? [];
  if (isWords(full, delimiter)) return { index: firstFull, row: full };
  const index = rows.slice(0, firstFull).findLastIndex((row) => row.length >= 2 && isWords(row, delimiter));
  const before = rows[index];
  if (!before) return { index: firstFull, row: null };
  const body = rows.slice(firstFull).filter((row) => row.length === fields);
  // Every line ends in one more delimiter than the header has, or the header in one more than the lines.
  if (before.length === fields - 1 && body.every((row) => row[fields - 1] === "")) {
    return { index, row: [...before, ""] };
  }
  if (before.length === fields + 1 && before[fields] === "") return { index, row: before.slice(0, fields) };
  return { index, row: before };
}

/** More words than numbers, and no comment mark. */
function isWords(row: readonly string[], delimiter: string): boolean {
  if (/^\s*(#|\/\/|%|!)/.test(row[0] ?? "")) return false;
  const filled = row.filter((cell) => cell.trim() !== "");
  const words = filled.filter((cell) => !isNumeric(cell, delimiter) && !/^\d{4}-\d\d-\d\d/.test(cell.trim()));
  return words.length > filled.length / 2;
}

/** A line right under the header that names units, before a line with numbers. */
function findUnits(rows: readonly string[][], index: number, delimiter: string): string[] | null {
  const row = rows[index];
  const next = rows[index + 1];
  if (!row || !next || row.length < 2 || row.some((cell) => isNumeric(cell, delimiter))) return null;
  const filled = row.filter((cell) => cell.trim() !== "");
  const known = filled.filter((cell) => readUnitWord(cell) !== null);
  if (known.length === 0 || known.length < filled.length / 2) return null;
  return next.some((cell) => isNumeric(cell, delimiter)) ? row.map((cell) => cell.trim()) : null;
}

/**
 * Cells such as `12,5` and none such as `12.5`. With a comma between fields too, a quoted `1,234` may be a thousand, so
 * there some cell must have other than three digits after its comma.
 */
function hasDecimalComma(rows: readonly string[][], delimiter: string): boolean {
  const cells = rows.flat().map((cell) => cell.trim());
  const withComma = cells.filter((cell) => /^[+-]?\d*,\d+$/.test(cell));
  if (withComma.length === 0) return false;
  const withPoint = cells.filter((cell) => /^[+-]?\d*\.\d+$/.test(cell)).length;
  if (withPoint > withComma.length) return false;
  return delimiter !== "," || withComma.some((cell) => !/,\d{3}$/.test(cell));
}
