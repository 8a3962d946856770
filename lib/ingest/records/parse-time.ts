const ISO =
  /^(\d{4})-?(\d\d)-?(\d\d)[T ]?(\d\d):?(\d\d)(?::?(\d\d)(?:[.,](\d{1,9}))?)?\s*(Z|UTC|[+-]\d\d(?::?\d\d)?)?$/i;
const DAY_MS = 86_400_000;

/** Calendar fields of a time, month and day from 1. */
export interface CalendarTime {
  year: number;
  month: number;
  day: number;
  hour: number;
  minute: number;
  second: number;
}

const DAYS_BEFORE_MONTH = [0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334];
const DAYS_IN_MONTH = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];

function isLeapYear(year: number): boolean {
  return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
}

/** Milliseconds since 1970 of a UTC calendar time; NaN for dates and hours that do not exist. A leap second reads as the next second. */
export function calendarToMs(time: CalendarTime): number {
  const { year, month, day, hour, minute, second } = time;
  const daysInMonth = (DAYS_IN_MONTH[month - 1] ?? 0) + (month === 2 && isLeapYear(year) ? 1 : 0);
  if (day < 1 || day > daysInMonth || hour > 23 || minute > 59 || !(second < 61)) return NaN;
  const past = year - 1;
  // Days since 0001-01-01 by whole years, less those before 1970 (719,162), in the proleptic Gregorian calendar.
  const days = past * 365 + Math.floor(past / 4) - Math.floor(past / 100) + Math.floor(past / 400) - 719_162;
  const leapDay = month > 2 && isLeapYear(year) ? 1 : 0;
  const inYear = (DAYS_BEFORE_MONTH[month - 1] ?? 0) + leapDay + day - 1;
  return (days + inYear) * DAY_MS + hour * 3_600_000 + minute * 60_000 + second * 1000;
}

/** ISO 8601 text to milliseconds since 1970 as if it were UTC, and whether it named its offset. Null when it is no such text. */
export function parseIsoTime(text: string): { ms: number; zoned: boolean } | null {
  const match = ISO.exec(text.trim());
  if (!match) return null;
  const part = (index: number) => Number(match[index] ?? "0");
  const ms = calendarToMs({
    year: part(1),
    month: part(2),
    day: part(3),
    hour: part(4),
    minute: part(5),
    second: part(6),
  });
  if (Number.isNaN(ms)) return null;
  const fraction = match[7];
  const fractionMs = fraction === undefined ? 0 : Number(fraction) / 10 ** (fraction.length - 3);
  const zone = match[8];
  return { ms: ms + fractionMs - offsetMs(zone), zoned: zone !== undefined };
}

function offsetMs(zone: string | undefined): number {
  if (zone === undefined || !/^[+-]/.test(zone)) return 0;
  const digits = zone.slice(1).replace(":", "");
  const minutes = Number(digits.slice(0, 2)) * 60 + Number(digits.slice(2) || "0");
  return (zone.startsWith("-") ? -minutes : minutes) * 60_000;
}

const GPS_EPOCH_MS = 315_964_800_000;
/**
 * Days on which UTC fell one more second behind GPS time, as Unix seconds of the first second after the leap.
 * Source: IERS Bulletin C, leap seconds 1981-2016 (list from memory); 18 s since 2017.
 */
const LEAP_SECONDS_UNIX_S = [
  362793600, 394329600, 425865600, 489024000, 567993600, 631152000, 662688000, 709948800, 741484800, 773020800,
  820454400, 867715200, 915148800, 1136073600, 1230768000, 1341100800, 1435708800, 1483228800,
];

/** GPS seconds since 1980-01-06 to Unix milliseconds. */
export function gpsSecondsToMs(gpsS: number): number {
  const ms = GPS_EPOCH_MS + gpsS * 1000;
  let leaps = 0;
  for (const startS of LEAP_SECONDS_UNIX_S) if (ms >= (startS + leaps + 1) * 1000) leaps++;
  return ms - leaps * 1000;
}
