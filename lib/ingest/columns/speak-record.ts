import { channelWords } from "@/lib/ingest/channel-quantities";
import type { ColumnMeaning } from "@/lib/ingest/columns/describe-column";
import { readBushelWeight } from "@/lib/ingest/records/bushel-weight";
import { parseBoolean } from "@/lib/ingest/records/parse-boolean";
import { parseDegrees, readDegreesForm } from "@/lib/ingest/records/parse-degrees";
import { isMissing, parseNumber } from "@/lib/ingest/records/parse-number";
import { gpsSecondsToMs } from "@/lib/ingest/records/parse-time";
import type { ChannelId } from "@/lib/logs/channel";
import { unitFactor } from "@/lib/units/convert-unit";
import { getUnit } from "@/lib/units/unit-table";

/** A cell of one record beside what its column is taken to mean. */
export interface SpokenCell {
  cell: string;
  meaning: ColumnMeaning;
}

/** An SI value in a person's units. */
export type SayQuantity = (valueSi: number, unit: string, channel: ChannelId) => string;

export interface SpeakOptions {
  say: SayQuantity;
  decimalComma?: boolean;
  /** The zone that local times are read in. */
  timeZone?: string;
}

/** How a reading is said of a row; others by the channel's name. */
const READING_WORDS: Partial<Record<ChannelId, (value: string) => string>> = {
  downforce: (value) => `was pressed down with ${value}`,
  margin: (value) => `left ${value} on its gauge wheel`,
  contact: (value) => `had ground contact of ${value}`,
  depth: (value) => `ran ${value} deep`,
  population: (value) => `put down ${value} seeds`,
};

/**
 * One record of a file as a sentence by the meanings chosen so far, for a person to hold against what they know:
 * "At 2026-09-24 14:05:00 UTC, 38.41000° north, 98.61000° west, at 7.5 km/h: row 2 was pressed down with 943 N."
 * Null where nothing in it can be said.
 */
export function speakRecord(cells: readonly SpokenCell[], options: SpeakOptions): string | null {
  const of = (channel: ChannelId) => cells.find(({ meaning }) => meaning.channel === channel);
  const frame = [
    sayTime(cells, options),
    sayPlace(of("latitude"), of("longitude"), options),
    sayPlane(of("easting"), of("northing"), options),
    prefixed("heading ", sayValue(of("heading"), options)),
    prefixed("at ", sayValue(of("speed"), options)),
    sayWorking(of("working")),
  ].filter((part) => part !== null);
  const readings = sayReadings(cells, options);
  if (readings === null && frame.length === 0) return null;
  const start = frame.join(", ");
  const said = readings === null ? start : start === "" ? readings : `${start}: ${readings}`;
  return `${said.charAt(0).toUpperCase()}${said.slice(1)}.`;
}

const PLACING: ReadonlySet<ChannelId> = new Set<ChannelId>([
  ...(["time", "longitude", "latitude", "easting", "northing", "heading", "speed", "working", "pass", "row"] as const),
]);

function sayReadings(cells: readonly SpokenCell[], options: SpeakOptions): string | null {
  const measured = cells.filter(({ meaning }) => !PLACING.has(meaning.channel));
  const row = chooseRow(measured, options);
  const lone = cells.find(({ meaning }) => meaning.channel === "row");
  const parts = measured
    .filter(({ meaning }) => meaning.row === undefined || meaning.row === row)
    .flatMap((spoken) => {
      const value = sayValue(spoken, options);
      if (value === null) return [];
      const { channel } = spoken.meaning;
      return [READING_WORDS[channel]?.(value) ?? `has ${channelWords(channel)} of ${value}`];
    })
    .slice(0, 8);
  if (parts.length === 0) return null;
  const named = row ?? (lone ? rowNumber(lone) : null);
  return `${named === null ? "the machine" : `row ${named}`} ${joinWords(parts)}`;
}

function rowNumber({ cell, meaning }: SpokenCell): number | null {
  const value = parseNumber(cell);
  return Number.isNaN(value) ? null : value + (meaning.format === "from 0" ? 1 : 0);
}

/** The row of which most is said in this record; of equals the first past the leftmost. */
function chooseRow(measured: readonly SpokenCell[], options: SpeakOptions): number | null {
  const counts = new Map<number, number>();
  for (const spoken of measured) {
    const { row } = spoken.meaning;
    if (row !== undefined && sayValue(spoken, options) !== null) counts.set(row, (counts.get(row) ?? 0) + 1);
  }
  const most = Math.max(...counts.values());
  const best = [...counts].filter(([, count]) => count === most).map(([row]) => row);
  return best.find((row) => row > 1) ?? best[0] ?? null;
}

function joinWords(parts: readonly string[]): string {
  const last = parts.at(-1) ?? "";
  return parts.length < 2 ? last : `${parts.slice(0, -1).join(", ")} and ${last}`;
}

function prefixed(words: string, value: string | null): string | null {
  return value === null ? null : words + value;
}

function readNumber({ cell, meaning }: SpokenCell, { decimalComma }: SpeakOptions): number {
  const value = isMissing(cell) ? NaN : parseNumber(cell, decimalComma);
  return meaning.missing?.includes(value) ? NaN : value;
}

function sayValue(spoken: SpokenCell | undefined, options: SpeakOptions): string | null {
  if (!spoken || spoken.meaning.unit === null) return null;
  const { unit, channel, format } = spoken.meaning;
  const value = readNumber(spoken, options);
  const kind = getUnit(unit);
  if (Number.isNaN(value) || kind.quantity === "clock" || kind.quantity === "switch") return null;
  const poundsPerBushel = unit === "bu/ac" ? readBushelWeight(format) : undefined;
  if (poundsPerBushel === null) return null;
  const valueSi = value * unitFactor(unit, { poundsPerBushel });
  const isLost = channel === "contact" && format === "lost";
  return options.say(isLost ? 1 - valueSi : valueSi, kind.si, channel);
}

const CLOCKS: Record<string, (value: number) => number> = {
  "unix-s": (value) => value * 1000,
  "unix-ms": (value) => value,
  "gps-s": gpsSecondsToMs,
};

function sayTime(cells: readonly SpokenCell[], options: SpeakOptions): string | null {
  const times = cells.filter(({ meaning }) => meaning.channel === "time" && meaning.unit !== null);
  const [first] = times;
  const unit = first?.meaning.unit;
  if (!first || !unit || first.cell.trim() === "") return null;
  if (times.some(({ meaning }) => meaning.unit === "gps-week")) return null;
  if (unit === "local")
    return `on ${times.map(({ cell }) => cell.trim()).join(" ")} by the clock of ${zoneWords(options)}`;
  if (unit === "iso8601") {
    const isZoned = /(?:Z|UTC|[+-]\d\d:?(?:\d\d)?)$/i.test(first.cell.trim().slice(10));
    return `at ${first.cell.trim()}${isZoned ? "" : ` by the clock of ${options.timeZone ? zoneWords(options) : "UTC"}`}`;
  }
  const value = readNumber(first, options);
  if (Number.isNaN(value)) return null;
  const clock = CLOCKS[unit];
  if (!clock) return `${unit === "ms" ? value / 1000 : value} s from the start of the log`;
  const date = new Date(clock(value));
  return Number.isNaN(date.getTime()) ? null : `at ${date.toISOString().slice(0, 19).replace("T", " ")} UTC`;
}

function zoneWords({ timeZone }: SpeakOptions): string {
  return timeZone === undefined || timeZone.trim() === "" ? "a zone still to be named" : timeZone.trim();
}

function sayPlace(
  latitude: SpokenCell | undefined,
  longitude: SpokenCell | undefined,
  options: SpeakOptions,
): string | null {
  if (!latitude || !longitude) return null;
  const [north, east] = [readDegrees(latitude, options), readDegrees(longitude, options)];
  if (Number.isNaN(north) || Number.isNaN(east)) return null;
  const say = (degrees: number, words: [string, string]) =>
    `${Math.abs(degrees).toFixed(5)}° ${degrees < 0 ? words[1] : words[0]}`;
  return `at ${say(north, ["north", "south"])}, ${say(east, ["east", "west"])}`;
}

function readDegrees(spoken: SpokenCell, options: SpeakOptions): number {
  const form = spoken.meaning.format === undefined ? null : readDegreesForm(spoken.meaning.format);
  return form ? parseDegrees(spoken.cell, form) : readNumber(spoken, options);
}

function sayPlane(
  easting: SpokenCell | undefined,
  northing: SpokenCell | undefined,
  options: SpeakOptions,
): string | null {
  if (!easting || !northing) return null;
  const [east, north] = [readNumber(easting, options), readNumber(northing, options)];
  return Number.isNaN(east) || Number.isNaN(north) ? null : `at easting ${east}, northing ${north}`;
}

function sayWorking(spoken: SpokenCell | undefined): string | null {
  if (!spoken) return null;
  const state = parseBoolean(spoken.cell.trim().toLowerCase());
  return Number.isNaN(state) ? null : state > 0 ? "working" : "not working";
}
