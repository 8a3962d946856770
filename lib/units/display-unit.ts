import type { SiUnit } from "@/lib/logs/machine-log";
import { UNITS } from "@/lib/units/unit-table";

export type UnitSystem = "metric" | "imperial";
/** Units that values are kept in, and areas. */
export type KeptUnit = SiUnit | "m2";

/** A unit that a screen shows. */
export interface DisplayUnit {
  /** As printed after the number; empty for a bare number. */
  symbol: string;
  /** Shown value = SI value / factor. */
  factor: number;
  /** Decimals of values around the size usual for it; `formatQuantity` gives small values more. */
  decimals: number;
  /** As said in a sentence. */
  words: string;
}

const ACRE_M2 = 1 / UNITS["1/ac"].factor;

const METRIC: Record<KeptUnit, DisplayUnit> = {
  N: { symbol: "N", factor: 1, decimals: 0, words: "newtons" },
  m: { symbol: "m", factor: 1, decimals: 1, words: "metres" },
  m2: { symbol: "ha", factor: 10_000, decimals: 2, words: "hectares" },
  "m/s": { symbol: "km/h", factor: 1 / 3.6, decimals: 1, words: "kilometres per hour" },
  s: { symbol: "s", factor: 1, decimals: 1, words: "seconds" },
  deg: { symbol: "°", factor: 1, decimals: 0, words: "degrees" },
  fraction: { symbol: "%", factor: 0.01, decimals: 0, words: "per cent" },
  boolean: { symbol: "", factor: 1, decimals: 0, words: "on or off" },
  "1": { symbol: "", factor: 1, decimals: 2, words: "a bare number" },
  "1/m2": { symbol: "/m²", factor: 1, decimals: 1, words: "per square metre" },
  "kg/m2": { symbol: "kg/ha", factor: 1e-4, decimals: 0, words: "kilograms per hectare" },
  "kg/s": { symbol: "kg/s", factor: 1, decimals: 1, words: "kilograms per second" },
  kg: { symbol: "kg", factor: 1, decimals: 0, words: "kilograms" },
  Pa: { symbol: "kPa", factor: 1000, decimals: 0, words: "kilopascals" },
};

const IMPERIAL: Record<KeptUnit, DisplayUnit> = {
  ...METRIC,
  N: { symbol: "lbf", factor: UNITS.lbf.factor, decimals: 0, words: "pounds-force" },
  m: { symbol: "ft", factor: UNITS.ft.factor, decimals: 0, words: "feet" },
  m2: { symbol: "ac", factor: ACRE_M2, decimals: 2, words: "acres" },
  "m/s": { symbol: "mph", factor: UNITS.mph.factor, decimals: 1, words: "miles per hour" },
  "1/m2": { symbol: "/ac", factor: UNITS["1/ac"].factor, decimals: 0, words: "per acre" },
  "kg/m2": { symbol: "lb/ac", factor: UNITS["lb/ac"].factor, decimals: 0, words: "pounds per acre" },
  "kg/s": { symbol: "lb/s", factor: UNITS["lb/s"].factor, decimals: 1, words: "pounds per second" },
  kg: { symbol: "lb", factor: UNITS.lb.factor, decimals: 0, words: "pounds" },
  Pa: { symbol: "psi", factor: UNITS.psi.factor, decimals: 0, words: "pounds-force per square inch" },
};

/** Lengths that people measure with a ruler. */
const RULER: Record<UnitSystem, DisplayUnit> = {
  metric: { symbol: "mm", factor: 0.001, decimals: 0, words: "millimetres" },
  imperial: { symbol: "in", factor: UNITS.in.factor, decimals: 2, words: "inches" },
};
const RULER_CHANNELS = /^(?:deviation:)?(?:depth|rowSpacing)$/;

function isKeptUnit(text: string): text is KeptUnit {
  return Object.hasOwn(METRIC, text);
}

/**
 * The unit a value kept in `siUnit` is shown in; one it does not know is shown as it is.
 * `channel` tells a seeding depth (mm, in) from a distance (m, ft).
 */
export function displayUnit(siUnit: string, system: UnitSystem, channel?: string): DisplayUnit {
  if (!isKeptUnit(siUnit)) return { symbol: siUnit, factor: 1, decimals: 2, words: siUnit };
  if (siUnit === "m" && channel !== undefined && RULER_CHANNELS.test(channel)) return RULER[system];
  return (system === "metric" ? METRIC : IMPERIAL)[siUnit];
}
