import type { SiUnit } from "@/lib/logs/machine-log";
import { UNITS } from "@/lib/units/unit-table";

export type SystemName = "metric" | "imperial";

/** Units that a person may choose one by one, whatever the rest is shown in. */
export const OWN_UNITS = {
  force: ["N", "lbf", "kgf"],
  depth: ["mm", "cm", "in"],
  area: ["ha", "ac"],
  speed: ["km/h", "mph", "m/s"],
} as const;
export type OwnUnitKind = keyof typeof OWN_UNITS;

/** What is left out is shown as the system has it. */
export type OwnUnits = { readonly [Kind in OwnUnitKind]?: (typeof OWN_UNITS)[Kind][number] };

/** Units a person reads in: a system as it stands, or one with units of the person's own. */
export type UnitSystem = SystemName | { readonly system: SystemName; readonly own: OwnUnits };

export function systemName(units: UnitSystem): SystemName {
  return typeof units === "string" ? units : units.system;
}
/** Units that values are kept in, and areas. */
export type KeptUnit = SiUnit;

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
const RULER: Record<SystemName, DisplayUnit> = {
  metric: { symbol: "mm", factor: 0.001, decimals: 0, words: "millimetres" },
  imperial: { symbol: "in", factor: UNITS.in.factor, decimals: 2, words: "inches" },
};
const RULER_CHANNELS = /^(?:deviation:)?(?:depth|rowSpacing)$/;

type OwnUnit = NonNullable<OwnUnits[OwnUnitKind]>;
const CENTIMETRES: DisplayUnit = { symbol: "cm", factor: 0.01, decimals: 1, words: "centimetres" };

/** A kilogram-force is ten times a newton and an inch a hundred times a millimetre: decimals follow the unit. */
const BY_NAME: Record<OwnUnit, DisplayUnit> = {
  N: METRIC.N,
  lbf: IMPERIAL.N,
  kgf: { symbol: "kgf", factor: UNITS.kgf.factor, decimals: 1, words: "kilograms-force" },
  mm: RULER.metric,
  cm: CENTIMETRES,
  in: RULER.imperial,
  ha: METRIC.m2,
  ac: IMPERIAL.m2,
  "km/h": METRIC["m/s"],
  mph: IMPERIAL["m/s"],
  "m/s": { symbol: "m/s", factor: 1, decimals: 2, words: "metres per second" },
};

function ownKindOf(siUnit: KeptUnit, isRuler: boolean): OwnUnitKind | null {
  if (siUnit === "N") return "force";
  if (siUnit === "m2") return "area";
  if (siUnit === "m/s") return "speed";
  return isRuler ? "depth" : null;
}

function isKeptUnit(text: string): text is KeptUnit {
  return Object.hasOwn(METRIC, text);
}

/**
 * The unit a value kept in `siUnit` is shown in; one it does not know is shown as it is.
 * `channel` tells a seeding depth (mm, in) from a distance (m, ft).
 */
export function displayUnit(siUnit: string, units: UnitSystem, channel?: string): DisplayUnit {
  if (!isKeptUnit(siUnit)) return { symbol: siUnit, factor: 1, decimals: 2, words: siUnit };
  const isRuler = siUnit === "m" && channel !== undefined && RULER_CHANNELS.test(channel);
  const kind = typeof units === "string" ? null : ownKindOf(siUnit, isRuler);
  const own = typeof units === "string" || kind === null ? undefined : units.own[kind];
  if (own) return BY_NAME[own];
  if (isRuler) return RULER[systemName(units)];
  return (systemName(units) === "metric" ? METRIC : IMPERIAL)[siUnit];
}
