import type { SiUnit } from "@/lib/logs/machine-log";

/** What a unit measures. Pressure is never force: it needs a cylinder area and a linkage to become one. */
export type Quantity =
  | "force"
  | "length"
  | "area"
  | "speed"
  | "angle"
  | "duration"
  | "clock"
  | "share"
  | "switch"
  | "number"
  | "arealCount"
  | "arealMass"
  | "massFlow"
  | "pressure"
  | "mass";

export interface Unit {
  quantity: Quantity;
  /** Unit the value is kept in; clock units are kept as milliseconds since 1970 and have none. */
  si: SiUnit;
  /** SI value = value * factor. NaN where the factor depends on more than the unit (bushels, clocks). */
  factor: number;
  /** As said in a sentence: "in pounds-force". */
  words: string;
}

const POUND_KG = 0.45359237;
const ACRE_M2 = 4046.8564224;
const POUND_FORCE_N = 4.4482216152605;
const INCH_M = 0.0254;

/**
 * Every unit a column may be in, with its exact factor.
 * Source: NIST SP 811 Appendix B.8 and GNU units 2.22 (international foot, 85 FR 62698); all exact by definition but deg.
 */
export const UNITS = {
  N: { quantity: "force", si: "N", factor: 1, words: "newtons" },
  daN: { quantity: "force", si: "N", factor: 10, words: "decanewtons" },
  kN: { quantity: "force", si: "N", factor: 1000, words: "kilonewtons" },
  lbf: { quantity: "force", si: "N", factor: POUND_FORCE_N, words: "pounds-force" },
  kgf: { quantity: "force", si: "N", factor: 9.80665, words: "kilograms-force" },
  m: { quantity: "length", si: "m", factor: 1, words: "metres" },
  cm: { quantity: "length", si: "m", factor: 0.01, words: "centimetres" },
  mm: { quantity: "length", si: "m", factor: 0.001, words: "millimetres" },
  in: { quantity: "length", si: "m", factor: INCH_M, words: "inches" },
  ft: { quantity: "length", si: "m", factor: 0.3048, words: "feet" },
  m2: { quantity: "area", si: "m2", factor: 1, words: "square metres" },
  "m/s": { quantity: "speed", si: "m/s", factor: 1, words: "metres per second" },
  "km/h": { quantity: "speed", si: "m/s", factor: 1 / 3.6, words: "kilometres per hour" },
  mph: { quantity: "speed", si: "m/s", factor: 0.44704, words: "miles per hour" },
  deg: { quantity: "angle", si: "deg", factor: 1, words: "degrees" },
  rad: { quantity: "angle", si: "deg", factor: 180 / Math.PI, words: "radians" },
  s: { quantity: "duration", si: "s", factor: 1, words: "seconds" },
  ms: { quantity: "duration", si: "s", factor: 0.001, words: "milliseconds" },
  iso8601: { quantity: "clock", si: "s", factor: NaN, words: "ISO 8601 date and time" },
  "unix-s": { quantity: "clock", si: "s", factor: NaN, words: "seconds since 1970 (UTC)" },
  "unix-ms": { quantity: "clock", si: "s", factor: NaN, words: "milliseconds since 1970 (UTC)" },
  "gps-s": { quantity: "clock", si: "s", factor: NaN, words: "GPS seconds since 6 January 1980" },
  "gps-week": { quantity: "clock", si: "s", factor: NaN, words: "GPS weeks since 6 January 1980" },
  local: { quantity: "clock", si: "s", factor: NaN, words: "local date and time" },
  percent: { quantity: "share", si: "fraction", factor: 0.01, words: "per cent" },
  fraction: { quantity: "share", si: "fraction", factor: 1, words: "a fraction of one" },
  boolean: { quantity: "switch", si: "boolean", factor: 1, words: "on or off" },
  "1": { quantity: "number", si: "1", factor: 1, words: "a bare number" },
  "1/m2": { quantity: "arealCount", si: "1/m2", factor: 1, words: "per square metre" },
  "1/ac": { quantity: "arealCount", si: "1/m2", factor: 1 / ACRE_M2, words: "per acre" },
  "1/ha": { quantity: "arealCount", si: "1/m2", factor: 1e-4, words: "per hectare" },
  "kg/ha": { quantity: "arealMass", si: "kg/m2", factor: 1e-4, words: "kilograms per hectare" },
  "lb/ac": { quantity: "arealMass", si: "kg/m2", factor: POUND_KG / ACRE_M2, words: "pounds per acre" },
  "bu/ac": { quantity: "arealMass", si: "kg/m2", factor: NaN, words: "bushels per acre" },
  "kg/s": { quantity: "massFlow", si: "kg/s", factor: 1, words: "kilograms per second" },
  "lb/s": { quantity: "massFlow", si: "kg/s", factor: POUND_KG, words: "pounds per second" },
  Pa: { quantity: "pressure", si: "Pa", factor: 1, words: "pascals" },
  kPa: { quantity: "pressure", si: "Pa", factor: 1000, words: "kilopascals" },
  psi: {
    quantity: "pressure",
    si: "Pa",
    factor: POUND_FORCE_N / (INCH_M * INCH_M),
    words: "pounds-force per square inch",
  },
  bar: { quantity: "pressure", si: "Pa", factor: 1e5, words: "bar" },
  kg: { quantity: "mass", si: "kg", factor: 1, words: "kilograms" },
  lb: { quantity: "mass", si: "kg", factor: POUND_KG, words: "pounds" },
} as const satisfies Record<string, Unit>;

export type UnitId = keyof typeof UNITS;
export const UNIT_IDS = Object.keys(UNITS) as [UnitId, ...UnitId[]];

export function isUnitId(text: string): text is UnitId {
  return Object.hasOwn(UNITS, text);
}

export function getUnit(id: UnitId): Unit {
  return UNITS[id];
}
