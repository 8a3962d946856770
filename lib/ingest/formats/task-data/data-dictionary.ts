import * as dictionaryModule from "isoxml/dist/DDEntities.js";
import type { ChannelId } from "@/lib/logs/channel";
import type { UnitId } from "@/lib/units/unit-table";

/** What the data dictionary of ISO 11783-11 says of an identifier. */
export interface DictionaryEntry {
  /** Short words for a person. */
  words: string;
  channel: ChannelId;
  /** Unit of `raw * factor`; null where the dictionary is ambiguous and a person must say. */
  unit: UnitId | null;
  factor: number;
}

interface RawEntry {
  DDI: number;
  name: string;
  unit: string;
  bitResolution: number;
}

/** The module is CommonJS: bundlers and Node disagree on where its default stands. */
const loaded = dictionaryModule.default as unknown as Record<string, RawEntry> & { default?: Record<string, RawEntry> };
const DICTIONARY: Record<string, RawEntry | undefined> = loaded.default ?? loaded;

export const ACTUAL_WORK_STATE = 141;
/** Sixteen states of two bits each in one value; the actual ones, and those the machine was told. */
const CONDENSED = { actual: { first: 161, last: 176 }, set: { first: 290, last: 305 } } as const;
export const STATES_A_VALUE = 16;

/** Identifiers from here on are each maker's own. */
const FIRST_PROPRIETARY = 57_344;

export function isProprietary(ddi: number): boolean {
  return ddi >= FIRST_PROPRIETARY;
}

/** The first of the sixteen states a condensed value holds, from 0, and whether they are actual. Null for any other identifier. */
export function readCondensed(ddi: number): { firstState: number; isActual: boolean } | null {
  for (const [kind, { first, last }] of Object.entries(CONDENSED)) {
    if (ddi >= first && ddi <= last) {
      return { firstState: (ddi - first) * STATES_A_VALUE, isActual: kind === "actual" };
    }
  }
  return null;
}

/** Identifiers that mean one of our channels, or deserve plainer words. Raw units and resolutions: ISO 11783-11 by the dictionary. */
const KNOWN: Record<number, DictionaryEntry> = {
  6: { words: "set mass rate", channel: "other:set mass rate", unit: "kg/ha", factor: 0.01 },
  7: { words: "mass rate", channel: "other:mass rate", unit: "kg/ha", factor: 0.01 },
  11: { words: "set population", channel: "other:set population", unit: "1/m2", factor: 0.001 },
  12: { words: "population", channel: "population", unit: "1/m2", factor: 0.001 },
  16: { words: "set seed spacing", channel: "other:set seed spacing", unit: "mm", factor: 1 },
  17: { words: "seed spacing", channel: "other:seed spacing", unit: "mm", factor: 1 },
  51: { words: "set tillage depth", channel: "other:set tillage depth", unit: "mm", factor: 1 },
  52: { words: "tillage depth", channel: "other:tillage depth", unit: "mm", factor: 1 },
  56: { words: "set seeding depth", channel: "other:set seeding depth", unit: "mm", factor: 1 },
  57: { words: "seeding depth", channel: "depth", unit: "mm", factor: 1 },
  67: { words: "working width", channel: "swathWidth", unit: "mm", factor: 1 },
  84: { words: "yield", channel: "yieldMass", unit: "kg/ha", factor: 0.01 },
  87: { words: "grain flow", channel: "yieldFlow", unit: "kg/s", factor: 1e-6 },
  99: { words: "grain moisture", channel: "moisture", unit: "percent", factor: 1e-4 },
  141: { words: "work state", channel: "working", unit: "boolean", factor: 1 },
  289: { words: "set work state", channel: "other:set work state", unit: "boolean", factor: 1 },
  365: { words: "set downforce pressure", channel: "other:set downforce pressure", unit: "Pa", factor: 1 },
  366: { words: "downforce pressure", channel: "downforce", unit: "Pa", factor: 1 },
  397: { words: "ground speed", channel: "speed", unit: "m/s", factor: 0.001 },
  426: { words: "set downforce", channel: "other:set downforce", unit: "N", factor: 1 },
  427: { words: "downforce", channel: "downforce", unit: "N", factor: 1 },
};

/** Unit texts of the dictionary, the unit we keep them in, and its worth. "0.00%" is left out: it is ambiguous. */
const UNIT_TEXTS: Record<string, [unit: UnitId, factor: number]> = {
  mm: ["mm", 1],
  m: ["m", 1],
  "mg/m²": ["kg/ha", 0.01],
  "/m²": ["1/m2", 1],
  "mg/s": ["kg/s", 1e-6],
  "kg/h": ["kg/s", 1 / 3600],
  g: ["kg", 0.001],
  kg: ["kg", 1],
  ppm: ["percent", 1e-4],
  s: ["s", 1],
  h: ["s", 3600],
  ms: ["ms", 1],
  "°": ["deg", 1],
  Pa: ["Pa", 1],
  "mm/s": ["m/s", 0.001],
  N: ["N", 1],
};
const AMBIGUOUS_UNIT = "0.00%";

/** The meaning of an identifier; null for one that is not in the dictionary, or is a maker's own. */
export function lookUpData(ddi: number): DictionaryEntry | null {
  const known = KNOWN[ddi];
  if (known) return known;
  const entry = DICTIONARY[String(ddi)];
  if (!entry || isProprietary(ddi)) return null;
  const name = entry.name.replace(/\s+as \[[^\]]*\]$/i, "").toLowerCase();
  const channel = (words: string): ChannelId => `other:${words.replace(/[/\\]/g, " per ").slice(0, 80)}`;
  if (entry.unit === AMBIGUOUS_UNIT) {
    return { words: name, channel: channel(name), unit: null, factor: entry.bitResolution };
  }
  const [unit, factor] = UNIT_TEXTS[entry.unit] ?? ["1", 1];
  // A unit that is not in our table stays in the name, so that the number is never bare.
  const aside = UNIT_TEXTS[entry.unit] || !/[a-z]/i.test(entry.unit) || entry.unit === "n.a." ? "" : ` ${entry.unit}`;
  const worth = Number((entry.bitResolution * factor).toPrecision(12));
  return { words: name, channel: channel(name + aside), unit, factor: worth };
}
