import { unitsForChannel } from "@/lib/ingest/channel-quantities";
import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import type { UnitWord } from "@/lib/ingest/columns/read-unit-words";
import { guessTimeUnit } from "@/lib/ingest/columns/guess-time";
import { parseDegrees, readDegreesForm } from "@/lib/ingest/records/parse-degrees";
import type { ChannelId } from "@/lib/logs/channel";
import type { UnitId } from "@/lib/units/unit-table";

export interface GuessedUnit {
  unit: UnitId | null;
  format?: string;
  /** Multiplies the confidence of the name. */
  trust: number;
  reason: string;
}

/** The unit of a column from its header's unit word and its values. `unit: null` where neither tells: a person must choose. */
export function guessUnit(
  channel: ChannelId,
  word: UnitWord | null,
  { summary, header }: { summary: CellSummary; header: string },
): GuessedUnit {
  if (channel === "time") return guessTimeUnit(word, summary, header);
  if (channel === "working") {
    const isSwitch = summary.switchShare > 0.9;
    return {
      unit: "boolean",
      trust: isSwitch ? 1 : 0.4,
      reason: isSwitch ? "its cells say on or off" : "its cells are not plainly on or off",
    };
  }
  if (channel === "longitude" || channel === "latitude") {
    const written = guessDegrees(channel, summary);
    if (written) return written;
  }
  if (channel === "pass" || channel === "row") return guessCount(channel, summary);
  const named = word === null ? null : resolveWord(channel, word);
  if (named) return checkRange(channel, named, summary);
  return guessFromValues(channel, word, { summary, header });
}

/** "lb" on a force means pounds-force; on anything else a mass. Null when the unit does not measure the channel. */
function resolveWord(channel: ChannelId, word: UnitWord): { unit: UnitId; trust: number; reason: string } | null {
  const allowed = unitsForChannel(channel);
  if (word === "pound") {
    if (allowed.includes("lbf"))
      return { unit: "lbf", trust: 0.8, reason: "the header says pounds, which on a force are pounds-force" };
    return allowed.includes("lb") ? { unit: "lb", trust: 0.95, reason: "the header names the unit" } : null;
  }
  if (word === "kg" && allowed.includes("kgf")) {
    return { unit: "kgf", trust: 0.7, reason: "the header says kilograms, which on a force are kilograms-force" };
  }
  return allowed.includes(word) ? { unit: word, trust: 1, reason: "the header names the unit" } : null;
}

/** Degrees with minutes, as texts or packed into one number. Null for plain degrees. */
function guessDegrees(
  channel: "longitude" | "latitude",
  { sample, numericShare, min, max, median }: CellSummary,
): GuessedUnit | null {
  const [asTexts, packed] = [readDegreesForm("degrees minutes"), readDegreesForm("ddmm.mmmm")];
  if (!asTexts || !packed) return null;
  if (numericShare < 0.5) {
    const isFitting = sample.length > 0 && sample.every((text) => !Number.isNaN(parseDegrees(text, asTexts)));
    return isFitting
      ? {
          unit: "deg",
          format: "degrees minutes",
          trust: 0.65,
          reason: "its cells are degrees with minutes or a letter",
        }
      : null;
  }
  const limit = channel === "latitude" ? 90 : 180;
  const values = [min, max, median].map((value) => Math.abs(value ?? NaN));
  const isPacked =
    values.some((value) => value > limit) &&
    values.every((value) => value <= limit * 100 && value >= 100 && value % 100 < 60);
  if (!isPacked) return null;
  return {
    unit: "deg",
    format: "ddmm.mmmm",
    trust: 0.6,
    reason: `its values (${min} to ${max}) look like degrees and minutes in one number`,
  };
}

interface Range {
  low: number;
  high: number;
}

/** What a value may be at all, by unit, for the channels where a wrong unit shows. */
const PLAUSIBLE: Partial<Record<ChannelId, Partial<Record<UnitId, Range>>>> = {
  longitude: { deg: { low: -180, high: 180 } },
  latitude: { deg: { low: -90, high: 90 } },
  heading: { deg: { low: -180, high: 360 }, rad: { low: -6.3, high: 6.3 } },
  speed: { "m/s": { low: -1, high: 15 }, "km/h": { low: -3, high: 50 }, mph: { low: -2, high: 30 } },
  // No opener is pressed with a tonne, or lifted with a quarter of one.
  downforce: {
    N: { low: -2500, high: 10_000 },
    daN: { low: -250, high: 1000 },
    kN: { low: -2.5, high: 10 },
    kgf: { low: -250, high: 1000 },
    lbf: { low: -550, high: 2200 },
  },
  contact: { fraction: { low: 0, high: 1 }, percent: { low: 0, high: 100 } },
  moisture: { fraction: { low: 0, high: 1 }, percent: { low: 0, high: 100 } },
  depth: {
    m: { low: -0.1, high: 0.5 },
    cm: { low: -10, high: 50 },
    mm: { low: -100, high: 500 },
    in: { low: -4, high: 20 },
  },
};

function checkRange(
  channel: ChannelId,
  named: { unit: UnitId; trust: number; reason: string },
  summary: CellSummary,
): GuessedUnit {
  const range = PLAUSIBLE[channel]?.[named.unit];
  const { min, max } = summary;
  if (min === null || max === null)
    return { ...named, trust: named.trust * 0.5, reason: `${named.reason}, but no cell is a number` };
  if (range && (min < range.low || max > range.high)) {
    return { ...named, trust: 0.4, reason: `${named.reason}, but its values (${min} to ${max}) do not look like that` };
  }
  return named;
}

function guessCount(channel: ChannelId, summary: CellSummary): GuessedUnit {
  const isWhole = summary.wholeShare > 0.99 && summary.filled > 0;
  const reason = isWhole ? "its cells are whole numbers" : "its cells are not whole numbers";
  const fromZero = channel === "row" && summary.min === 0;
  return {
    unit: "1",
    ...(fromZero ? { format: "from 0" } : {}),
    trust: isWhole ? 1 : 0.3,
    reason: fromZero ? `${reason} that start at 0` : reason,
  };
}

function guessFromValues(
  channel: ChannelId,
  word: UnitWord | null,
  { summary, header }: { summary: CellSummary; header: string },
): GuessedUnit {
  const { min, max } = summary;
  if (word !== null) {
    return { unit: null, trust: 0.3, reason: `the header names a unit (${word}) that does not measure this` };
  }
  if (min === null || max === null) return { unit: null, trust: 0.2, reason: "no cell is a number" };
  if (channel === "longitude" || channel === "latitude") {
    return checkRange(channel, { unit: "deg", trust: 1, reason: "its values are degrees" }, summary);
  }
  if (channel === "heading") {
    if (max > 6.3 && max <= 360)
      return { unit: "deg", trust: 1, reason: `its values reach ${max}, so they are degrees` };
    return { unit: null, trust: 0.3, reason: "its values could be degrees or radians" };
  }
  if (channel === "contact" || channel === "moisture") return guessShare(min, max, summary);
  const aside = /[([]([^()[\]]+)[)\]]\s*$/.exec(header)?.[1]?.trim();
  return {
    unit: null,
    trust: 0.3,
    reason:
      aside === undefined || /\d/.test(aside)
        ? "neither the header nor the values name its unit"
        : `the header says "${aside}", which is no unit this program knows`,
  };
}

function guessShare(min: number, max: number, summary: CellSummary): GuessedUnit {
  if (min >= 0 && max > 1.5 && max <= 100)
    return { unit: "percent", trust: 0.9, reason: `its values reach ${max}, so they are per cent` };
  if (min >= 0 && max <= 1) {
    const isOnOff = summary.wholeShare === 1;
    return {
      unit: "fraction",
      trust: isOnOff ? 0.6 : 0.9,
      reason: isOnOff ? "its values are 0 and 1" : "its values lie between 0 and 1",
    };
  }
  return { unit: null, trust: 0.3, reason: `its values (${min} to ${max}) are neither 0 to 1 nor 0 to 100` };
}
