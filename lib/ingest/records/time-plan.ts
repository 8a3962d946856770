import { stopReading } from "@/lib/ingest/ingest-error";
import type { MappedColumn } from "@/lib/ingest/mapping";
import { createZoneClock, readLocalPattern, type ZoneClock } from "@/lib/ingest/records/local-time";
import { calendarToMs, gpsSecondsToMs } from "@/lib/ingest/records/parse-time";

/** How the time of a record comes from its cells. */
export interface TimePlan {
  /** Milliseconds of a line; NaN when its cells hold no time. Null in `texts` plans. */
  fromNumber: ((value: number) => number) | null;
  /** Milliseconds from the joined texts of the local-time columns. */
  fromText: ((text: string) => number) | null;
  /** Places in the line: one, or a date and a time column of local texts. */
  fields: number[];
  isRelative: boolean;
  /** GPS week, beside the seconds (or milliseconds) of that week in `fields[0]`. */
  week?: { field: number; firstWeek: number; unitsAWeek: number };
  /** For ISO texts without an offset; null reads them as UTC, with a note. */
  zone: ZoneClock | null;
}

/** Stops with `unknown-time-format` or `unknown-time-zone`. Null without time columns. */
export function createTimePlan(
  columns: readonly (MappedColumn & { field: number })[],
  timeZone: string | undefined,
): TimePlan | null {
  const zone = timeZone === undefined ? null : createZoneClock(timeZone);
  if (timeZone !== undefined && !zone) {
    stopReading(
      "unknown-time-zone",
      `"${timeZone}" is not a time zone. Use an IANA name such as America/Chicago or UTC.`,
    );
  }
  const [first, second] = columns;
  if (!first) return null;
  if (columns.some((column) => column.unit === "local")) return planLocal(columns, zone);
  if (columns.some((column) => column.unit === "gps-week")) return planGpsWeek(columns);
  if (second) {
    stopReading(
      "mapping-mismatch",
      `Columns '${first.name}' and '${second.name}' are both mapped to the time. Only a local date and a local time may be joined; keep one.`,
      { column: second.name },
    );
  }
  const fromNumber = NUMBER_TIMES[first.unit] ?? ((value: number) => value);
  return {
    fromNumber,
    fromText: null,
    fields: [first.field],
    isRelative: first.unit === "s" || first.unit === "ms",
    zone,
  };
}

const NUMBER_TIMES: Partial<Record<MappedColumn["unit"], (value: number) => number>> = {
  "unix-s": (value) => value * 1000,
  "unix-ms": (value) => value,
  "gps-s": gpsSecondsToMs,
  s: (value) => value * 1000,
  ms: (value) => value,
};

const WEEK_S = 604_800;

/** A column of GPS weeks and one of seconds (or milliseconds) within them. A receiver that begins again at 0 each 1024 weeks has the format `from 1024` or `from 2048`. */
function planGpsWeek(columns: readonly (MappedColumn & { field: number })[]): TimePlan {
  const week = columns.find((column) => column.unit === "gps-week");
  const inWeek = columns.find((column) => column.unit === "s" || column.unit === "ms");
  if (!week || !inWeek || columns.length !== 2) {
    stopReading(
      "mapping-mismatch",
      `Column '${week?.name ?? ""}' holds GPS weeks, which are a time only with one column of seconds or milliseconds of the week beside them. Map that to the time too.`,
      { column: week?.name },
    );
  }
  const from = /^from (\d{1,5})$/i.exec(week.format ?? "from 0")?.[1];
  if (from === undefined) {
    stopReading(
      "unknown-time-format",
      `Column '${week.name}' has the format "${week.format ?? ""}". For GPS weeks write the week that the file's 0 stands for, such as "from 2048".`,
      { column: week.name },
    );
  }
  const perSecond = inWeek.unit === "ms" ? 1000 : 1;
  return {
    fromNumber: (value) => gpsSecondsToMs(value / perSecond),
    fromText: null,
    fields: [inWeek.field],
    isRelative: false,
    week: { field: week.field, firstWeek: Number(from), unitsAWeek: WEEK_S * perSecond },
    zone: null,
  };
}

function planLocal(columns: readonly (MappedColumn & { field: number })[], zone: ZoneClock | null): TimePlan {
  const first = columns[0];
  const odd = columns.find((column) => column.unit !== "local");
  if (odd) {
    stopReading(
      "mapping-mismatch",
      `Column '${odd.name}' is mapped to the time beside a local time. Only local texts may be joined; keep one.`,
      { column: odd.name },
    );
  }
  const pattern = columns.map((column) => column.format ?? "").join(" ");
  const place = { column: first?.name };
  if (!zone) {
    stopReading(
      "unknown-time-zone",
      `Column '${first?.name ?? ""}' is in local time, which is a moment only in a time zone. Give the mapping a time zone such as America/Chicago.`,
      place,
    );
  }
  const local = readLocalPattern(pattern);
  if (!local || !local.hasDate) {
    stopReading(
      "unknown-time-format",
      `The time format "${pattern}" of column '${first?.name ?? ""}' has no date in it or uses letters that mean nothing. Write it with yyyy, MM, dd, HH, mm, ss, such as dd/MM/yyyy HH:mm:ss.`,
      place,
    );
  }
  const fromText = (text: string): number => {
    const time = local.parse(text);
    return time ? zone.toUtcMs(calendarToMs(time)) : NaN;
  };
  return { fromNumber: null, fromText, fields: columns.map((column) => column.field), isRelative: false, zone };
}
