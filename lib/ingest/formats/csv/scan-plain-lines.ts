// One long function on purpose: it is the hot loop of reading logs, and a call a cell would double its time.
import { isMissing, TEN_TO } from "@/lib/ingest/records/parse-number";
import { readNumberBytes } from "@/lib/ingest/records/read-number-bytes";
import { CELL } from "@/lib/ingest/records/read-plan";
import type { RecordCollector } from "@/lib/ingest/records/record-collector";

const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
const QUOTE = 34;
const MINUS = 45;
const POINT = 46;
const ZERO = 48;
const NINE = 57;

export interface PlainScan {
  collector: RecordCollector;
  delimiter: number;
  decoder: TextDecoder;
  /** Lines of the file seen so far. */
  lineNumber: number;
  /** Fields of the last line that was left out for their number; 0 before there is one. */
  raggedFields: number;
  /** Lines at the top that are no data. */
  linesBefore: number;
  /** The header line, and the line of units under it: a file put together from parts repeats them. */
  headLines: readonly Uint8Array[];
}

/**
 * kernel: reads whole lines `bytes[0 .. end)`, the last byte being a line feed, and commits each to the collector.
 * Numbers of up to 15 digits are read straight from the bytes (exactly); any other cell goes through the text parsers, so
 * both ways agree. Takes quoted cells of one line; returns false at a quote inside a cell, a line break inside quotes and
 * whatever else only the general reader understands.
 */
export function scanPlainLines(scan: PlainScan, bytes: Uint8Array, end: number): boolean {
  const { collector, delimiter, decoder } = scan;
  const { line, plan } = collector;
  const { kinds, columnCount } = plan;
  const headByte = scan.headLines[0]?.[0] ?? -1;
  const unitsByte = scan.headLines[1]?.[0] ?? -1;
  let at = 0;
  while (at < end) {
    scan.lineNumber++;
    let byte = bytes[at]!;
    if (byte === LINE_FEED || (byte === CARRIAGE_RETURN && bytes[at + 1] === LINE_FEED)) {
      at += byte === LINE_FEED ? 1 : 2;
      continue;
    }
    if (scan.lineNumber <= scan.linesBefore) {
      at = bytes.indexOf(LINE_FEED, at) + 1;
      continue;
    }
    if ((byte === headByte || byte === unitsByte) && isHeadLine(scan, bytes, at)) {
      collector.notes.add("repeated-header", scan.lineNumber);
      at = bytes.indexOf(LINE_FEED, at) + 1;
      continue;
    }
    let field = 0;
    for (;;) {
      const kind = field < columnCount ? kinds[field]! : CELL.skip;
      const start = at;
      byte = bytes[at]!;
      let isRead = false;
      if (kind === CELL.number) {
        let mantissa = 0;
        let digits = 0;
        let decimals = 0;
        const isNegative = byte === MINUS;
        if (isNegative) byte = bytes[++at]!;
        while (byte >= ZERO && byte <= NINE) {
          mantissa = mantissa * 10 + (byte - ZERO);
          digits++;
          byte = bytes[++at]!;
        }
        if (byte === POINT) {
          byte = bytes[++at]!;
          const mark = at;
          while (byte >= ZERO && byte <= NINE) {
            mantissa = mantissa * 10 + (byte - ZERO);
            byte = bytes[++at]!;
          }
          decimals = at - mark;
          digits += decimals;
        }
        const isEnd =
          byte === delimiter || byte === LINE_FEED || (byte === CARRIAGE_RETURN && bytes[at + 1] === LINE_FEED);
        if (isEnd && digits > 0 && digits <= 15) {
          const value = mantissa / TEN_TO[decimals]!;
          line[field] = isNegative ? -value : value;
          isRead = true;
        } else if (isEnd && at === start) {
          line[field] = NaN;
          isRead = true;
        }
      }
      if (!isRead && bytes[start] === QUOTE) {
        at = bytes.indexOf(QUOTE, start + 1);
        if (at < 0 || at >= end || !isCellEnd(bytes, at + 1, delimiter)) return false;
        if (!isOneLine(bytes, start, at)) return false;
        if (kind !== CELL.skip) takeCell(scan, { field, kind, bytes, start: start + 1, end: at }, decoder);
        byte = bytes[++at]!;
        if (byte === CARRIAGE_RETURN) byte = bytes[++at]!;
      } else if (!isRead) {
        while (byte !== delimiter && byte !== LINE_FEED) {
          if (byte === QUOTE) return false;
          byte = bytes[++at]!;
        }
        if (kind !== CELL.skip) {
          const isReturn = byte === LINE_FEED && at > start && bytes[at - 1] === CARRIAGE_RETURN;
          takeCell(scan, { field, kind, bytes, start, end: isReturn ? at - 1 : at }, decoder);
        }
      } else if (byte === CARRIAGE_RETURN) byte = bytes[++at]!;
      at++;
      field++;
      if (byte === LINE_FEED) break;
    }
    if (field === columnCount) collector.commit(scan.lineNumber);
    else {
      scan.raggedFields = field;
      collector.rejectLine("ragged-rows", scan.lineNumber);
    }
  }
  return true;
}

function isHeadLine({ headLines }: PlainScan, bytes: Uint8Array, start: number): boolean {
  return headLines.some((line) => {
    for (let i = 0; i < line.length; i++) if (bytes[start + i] !== line[i]) return false;
    const next = bytes[start + line.length];
    return next === LINE_FEED || next === CARRIAGE_RETURN;
  });
}

interface Cell {
  field: number;
  kind: number;
  bytes: Uint8Array;
  start: number;
  end: number;
}

function takeCell(scan: PlainScan, cell: Cell, decoder: TextDecoder): void {
  const { field, kind, bytes, start, end } = cell;
  if (kind === CELL.number) {
    const value = readNumberBytes(bytes, start, end);
    if (value === value) {
      scan.collector.line[field] = value;
      return;
    }
  }
  if (kind === CELL.isoTime) {
    const ms = readIsoBytes(bytes, start, end);
    if (ms === ms) {
      scan.collector.line[field] = ms;
      return;
    }
  }
  const text = decoder.decode(bytes.subarray(start, end));
  if (kind === CELL.number && isMissing(text)) scan.collector.line[field] = NaN;
  else scan.collector.takeText(field, text, scan.lineNumber);
}

function isCellEnd(bytes: Uint8Array, at: number, delimiter: number): boolean {
  const byte = bytes[at];
  return byte === delimiter || byte === LINE_FEED || (byte === CARRIAGE_RETURN && bytes[at + 1] === LINE_FEED);
}

function isOneLine(bytes: Uint8Array, start: number, end: number): boolean {
  for (let i = start; i < end; i++) if (bytes[i] === LINE_FEED) return false;
  return true;
}

let lastDayKey = -1;
let lastDayMs = 0;

/** kernel: `2026-05-03T14:22:01Z` with up to nine decimals to milliseconds; NaN for any other form, which the text parser then reads. */
function readIsoBytes(bytes: Uint8Array, start: number, end: number): number {
  if (end - start < 20 || bytes[end - 1] !== 90 || bytes[start + 4] !== MINUS || bytes[start + 7] !== MINUS) return NaN;
  if (bytes[start + 10] !== 84 || bytes[start + 13] !== 58 || bytes[start + 16] !== 58) return NaN;
  const dayKey =
    pair(bytes, start) * 1_000_000 +
    pair(bytes, start + 2) * 10_000 +
    pair(bytes, start + 5) * 100 +
    pair(bytes, start + 8);
  const hour = pair(bytes, start + 11);
  const minute = pair(bytes, start + 14);
  const second = pair(bytes, start + 17);
  // A pair that is no two digits is NaN, and NaN fails each of these.
  if (!(dayKey >= 0 && hour < 24 && minute < 60 && second < 60)) return NaN;
  if (dayKey !== lastDayKey) {
    const day = Date.parse(
      `${String(dayKey)
        .padStart(8, "0")
        .replace(/(....)(..)(..)/, "$1-$2-$3")}T00:00:00Z`,
    );
    if (Number.isNaN(day) || new Date(day).getUTCDate() !== dayKey % 100) return NaN;
    lastDayKey = dayKey;
    lastDayMs = day;
  }
  let fraction = 0;
  let decimals = 0;
  if (end - start > 20) {
    if (bytes[start + 19] !== POINT) return NaN;
    for (let i = start + 20; i < end - 1; i++) {
      const digit = bytes[i]! - ZERO;
      if (digit < 0 || digit > 9) return NaN;
      fraction = fraction * 10 + digit;
      decimals++;
    }
    if (decimals === 0 || decimals > 9) return NaN;
  }
  return lastDayMs + hour * 3_600_000 + minute * 60_000 + second * 1000 + fraction / 10 ** (decimals - 3);
}

function pair(bytes: Uint8Array, at: number): number {
  const tens = bytes[at]! - ZERO;
  const ones = bytes[at + 1]! - ZERO;
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : NaN;
}
