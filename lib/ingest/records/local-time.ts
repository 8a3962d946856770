import { calendarToMs, type CalendarTime } from "@/lib/ingest/records/parse-time";

/** A pattern such as `dd/MM/yyyy HH:mm:ss` or `M/d/yy h:mm a`, made ready. */
export interface LocalPattern {
  /** Calendar fields of a text; null when it does not follow the pattern. */
  parse(text: string): CalendarTime | null;
  hasDate: boolean;
  hasTime: boolean;
}

type Field = "year" | "month" | "day" | "hour" | "minute" | "second" | "fraction" | "meridiem" | "monthName";

const TOKENS: readonly [token: string, field: Field, source: string][] = [
  ["yyyy", "year", "(\\d{4})"],
  ["yy", "year", "(\\d{2})"],
  ["MMM", "monthName", "([A-Za-z]{3})[a-z]*"],
  ["MM", "month", "(\\d{1,2})"],
  ["M", "month", "(\\d{1,2})"],
  ["dd", "day", "(\\d{1,2})"],
  ["d", "day", "(\\d{1,2})"],
  ["HH", "hour", "(\\d{1,2})"],
  ["H", "hour", "(\\d{1,2})"],
  ["hh", "hour", "(\\d{1,2})"],
  ["h", "hour", "(\\d{1,2})"],
  ["mm", "minute", "(\\d{1,2})"],
  ["ss", "second", "(\\d{1,2})"],
  ["SSS", "fraction", "(\\d{1,9})"],
  ["a", "meridiem", "([AaPp])\\.?[Mm]\\.?"],
];
const MONTHS = ["jan", "feb", "mar", "apr", "may", "jun", "jul", "aug", "sep", "oct", "nov", "dec"];

/** Reads a pattern; null when a letter in it is no known token or it has neither a date nor a time. */
export function readLocalPattern(pattern: string): LocalPattern | null {
  const fields: Field[] = [];
  let source = "^\\s*";
  for (let at = 0; at < pattern.length;) {
    const token = TOKENS.find(([text]) => pattern.startsWith(text, at));
    if (token) {
      fields.push(token[1]);
      source += token[2];
      at += token[0].length;
      continue;
    }
    const letter = pattern[at] ?? "";
    if (/[A-Za-z]/.test(letter) && letter !== "T") return null;
    source += letter === " " ? "\\s+" : letter.replace(/[\\^$.*+?()[\]{}|/-]/g, "\\$&");
    at++;
  }
  const has = (field: Field) => fields.includes(field);
  const hasDate = has("year") && (has("month") || has("monthName")) && has("day");
  const hasTime = has("hour") && has("minute");
  if ((!hasDate && !hasTime) || new Set(fields).size !== fields.length) return null;
  const regex = new RegExp(`${source}\\s*$`);
  return { parse: (text) => readFields(regex.exec(text), fields), hasDate, hasTime };
}

function readFields(match: RegExpExecArray | null, fields: readonly Field[]): CalendarTime | null {
  if (!match) return null;
  const time: CalendarTime = { year: 1970, month: 1, day: 1, hour: 0, minute: 0, second: 0 };
  let meridiem = "";
  let fraction = 0;
  for (const [index, field] of fields.entries()) {
    const text = match[index + 1] ?? "";
    if (field === "meridiem") meridiem = text.toLowerCase();
    else if (field === "fraction") fraction = Number(`0.${text}`);
    else if (field === "monthName") time.month = MONTHS.indexOf(text.toLowerCase()) + 1;
    else time[field] = Number(text);
  }
  if (time.year < 100) time.year += time.year < 80 ? 2000 : 1900;
  if (meridiem) {
    if (time.hour < 1 || time.hour > 12) return null;
    time.hour = (time.hour % 12) + (meridiem === "p" ? 12 : 0);
  }
  time.second += fraction;
  return Number.isNaN(calendarToMs(time)) ? null : time;
}

/** Turns wall-clock times of one IANA zone into UTC. */
export interface ZoneClock {
  /** UTC milliseconds of a wall-clock time given as milliseconds "as if UTC". A time that occurs twice reads as the first. */
  toUtcMs(wallMs: number): number;
}

const QUARTER_HOUR_MS = 900_000;

/** A zone's clock; null when the name is not an IANA zone. Offsets are asked once a quarter hour and kept. */
export function createZoneClock(timeZone: string): ZoneClock | null {
  const format = createZoneFormat(timeZone);
  if (!format) return null;
  const known = new Map<number, number>();
  const offsetAt = (utcMs: number): number => {
    const key = Math.floor(utcMs / QUARTER_HOUR_MS);
    let offset = known.get(key);
    if (offset === undefined) {
      offset = zoneOffsetMs(format, key * QUARTER_HOUR_MS);
      known.set(key, offset);
    }
    return offset;
  };
  const toUtcMs = (wallMs: number): number => {
    // Offsets a day before and after bracket any change; the larger offset gives the earlier of two readings.
    const before = offsetAt(wallMs - 86_400_000);
    const after = offsetAt(wallMs + 86_400_000);
    for (const offset of [Math.max(before, after), Math.min(before, after)]) {
      if (offsetAt(wallMs - offset) === offset) return wallMs - offset;
    }
    return wallMs - before;
  };
  return { toUtcMs };
}

function createZoneFormat(timeZone: string): Intl.DateTimeFormat | null {
  try {
    return new Intl.DateTimeFormat("en-US", {
      timeZone,
      hourCycle: "h23",
      year: "numeric",
      month: "numeric",
      day: "numeric",
      hour: "numeric",
      minute: "numeric",
      second: "numeric",
    });
  } catch {
    return null;
  }
}

function zoneOffsetMs(format: Intl.DateTimeFormat, utcMs: number): number {
  const fields: Record<string, number> = {};
  for (const part of format.formatToParts(utcMs)) fields[part.type] = Number(part.value);
  const { year = 1970, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = fields;
  return calendarToMs({ year, month, day, hour, minute, second }) - utcMs;
}
