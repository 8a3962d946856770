import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import type { GuessedUnit } from "@/lib/ingest/columns/guess-unit";
import type { UnitWord } from "@/lib/ingest/columns/read-unit-words";
import { readLocalPattern } from "@/lib/ingest/records/local-time";
import { parseIsoTime } from "@/lib/ingest/records/parse-time";

/** Unix seconds of 1990 and 2100: no log lies outside. */
const EARLIEST_S = 631_152_000;
const LATEST_S = 4_102_444_800;
const WEEK_S = 604_800;

/** How a time column is written. */
export function guessTimeUnit(word: UnitWord | null, summary: CellSummary, header: string): GuessedUnit {
  const texts = summary.sample;
  if (texts.length > 0 && texts.every((text) => parseIsoTime(text) !== null)) {
    const isZoned = texts.every((text) => parseIsoTime(text)?.zoned === true);
    return {
      unit: "iso8601",
      trust: isZoned ? 1 : 0.7,
      reason: isZoned ? "its cells are ISO 8601 times" : "its cells are ISO 8601 times that name no offset from UTC",
    };
  }
  if (summary.numericShare > 0.95) return guessNumber(word, summary, header);
  return guessPattern(texts);
}

function guessNumber(word: UnitWord | null, summary: CellSummary, header: string): GuessedUnit {
  const { min, max } = summary;
  if (min === null || max === null) return { unit: null, trust: 0.2, reason: "no cell is a time" };
  const isOfWeek = /\b(?:tow|of week)\b|gps[ _]?s(?:ec)/i.test(header.replaceAll("_", " "));
  if (/week/i.test(header) && !isOfWeek && max < 10_000 && summary.wholeShare === 1) {
    return { unit: "gps-week", trust: 0.8, reason: "the header says week and its values are whole weeks" };
  }
  if (isOfWeek && min >= 0 && max <= WEEK_S) {
    return { unit: "s", trust: 0.75, reason: "its values are seconds of a GPS week" };
  }
  if (isOfWeek && min >= 0 && max <= WEEK_S * 1000) {
    return { unit: "ms", trust: 0.75, reason: "its values are milliseconds of a GPS week" };
  }
  const saysGps = word === "gps-s" || /gps/i.test(header);
  if (min >= EARLIEST_S * 1000 && max <= LATEST_S * 1000) {
    return { unit: "unix-ms", trust: 1, reason: "its values are milliseconds since 1970" };
  }
  if (saysGps && min > 100_000_000 && max <= LATEST_S) {
    return { unit: "gps-s", trust: 0.7, reason: "the header says GPS and its values are seconds of that clock's size" };
  }
  if (min >= EARLIEST_S && max <= LATEST_S) {
    return { unit: "unix-s", trust: word === "unix-s" ? 1 : 0.85, reason: "its values are seconds since 1970" };
  }
  if (word === "ms" || word === "s")
    return { unit: word, trust: 0.9, reason: "the header names the unit, counted from the log's start" };
  if (min >= 0 && min < 60 && max < 1_000_000) {
    return { unit: "s", trust: 0.5, reason: "its values start near 0, so they may be seconds from the log's start" };
  }
  return { unit: null, trust: 0.2, reason: "its values fit no clock this program knows" };
}

const PATTERNS = [
  "yyyy/MM/dd HH:mm:ss",
  "yyyy/MM/dd HH:mm",
  "dd.MM.yyyy HH:mm:ss",
  "dd.MM.yyyy HH:mm",
  "MM/dd/yyyy HH:mm:ss",
  "dd/MM/yyyy HH:mm:ss",
  "MM/dd/yyyy hh:mm:ss a",
  "dd/MM/yyyy hh:mm:ss a",
  "MM/dd/yyyy HH:mm",
  "dd/MM/yyyy HH:mm",
  "MM/dd/yyyy hh:mm a",
  "dd MMM yyyy HH:mm:ss",
  "yyyy-MM-dd hh:mm:ss a",
  "yyyy-MM-dd HH:mm:ss.SSS",
  "dd/MM/yyyy HH:mm:ss.SSS",
  "MM/dd/yyyy HH:mm:ss.SSS",
  "yyyy-MM-dd",
  "yyyy/MM/dd",
  "dd.MM.yyyy",
  "MM/dd/yyyy",
  "dd/MM/yyyy",
  "HH:mm:ss.SSS",
  "HH:mm:ss",
  "hh:mm:ss a",
  "HH:mm",
] as const;

function guessPattern(texts: readonly string[]): GuessedUnit {
  const fitting = PATTERNS.filter((pattern) => {
    const local = readLocalPattern(pattern);
    return local !== null && texts.length > 0 && texts.every((text) => local.parse(text) !== null);
  });
  const [format, second] = fitting;
  if (format === undefined)
    return { unit: null, trust: 0.2, reason: "its cells fit no way of writing a time this program knows" };
  const isTwofold = second !== undefined && second.slice(0, 2) !== format.slice(0, 2);
  return {
    unit: "local",
    format,
    trust: isTwofold ? 0.35 : 0.6,
    reason: isTwofold
      ? `its cells fit ${format} and ${second}: say which, and the time zone`
      : `its cells are written ${format}; the time zone is needed`,
  };
}
