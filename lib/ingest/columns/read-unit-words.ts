import type { UnitId } from "@/lib/units/unit-table";

/** What a unit word may stand for: a unit, or `pound`, which is a force or a mass by what it measures. */
export type UnitWord = UnitId | "pound";

/** Spellings, lower case without spaces. Trade and standard abbreviations only. */
const SPELLINGS: Record<UnitWord, readonly string[]> = {
  N: ["n", "newton", "newtons"],
  daN: ["dan"],
  kN: ["kn"],
  lbf: ["lbf", "lbsf", "lbf.", "poundforce", "poundsforce", "pound-force", "pounds-force"],
  kgf: ["kgf", "kp"],
  pound: ["lb", "lbs", "pound", "pounds"],
  m: ["m", "metre", "metres", "meter", "meters"],
  cm: ["cm", "centimetre", "centimetres", "centimeter", "centimeters"],
  mm: ["mm", "millimetre", "millimetres", "millimeter", "millimeters"],
  in: ["in", "inch", "inches", '"'],
  ft: ["ft", "feet", "foot"],
  m2: ["m²", "sqm", "squaremetres", "squaremeters"],
  "m/s": ["m/s", "mps", "m_s", "ms-1", "m.s-1", "metrespersecond"],
  "km/h": ["km/h", "kmh", "kph", "km_h", "kmph", "km/hr", "kilometresperhour"],
  mph: ["mph", "mi/h", "mi/hr", "milesperhour"],
  deg: ["deg", "degree", "degrees", "°", "dd"],
  rad: ["rad", "radian", "radians"],
  s: ["s", "sec", "secs", "second", "seconds"],
  ms: ["ms", "msec", "millisecond", "milliseconds"],
  iso8601: ["iso8601", "iso", "iso-8601"],
  "unix-s": ["unix", "epoch", "unixs", "unixtime", "unix-s", "epochs", "posix"],
  "unix-ms": ["unixms", "epochms", "unix-ms"],
  "gps-s": ["gps-s", "gpss", "gpsseconds"],
  "gps-week": ["gps-week", "gpsweek", "gpsweeks"],
  local: ["local"],
  percent: ["%", "pct", "percent", "percentage", "perc"],
  fraction: ["fraction", "frac", "ratio", "0-1"],
  boolean: ["bool", "boolean", "on/off", "true/false", "0/1", "flag"],
  "1": ["1", "-", "count", "#", "n/a"],
  "1/m2": ["1/m2", "/m2", "perm2", "seeds/m2", "plants/m2", "seeds/m²", "per_m2", "m-2", "seeds_m2"],
  "1/ac": [
    "1/ac",
    "/ac",
    "peracre",
    "seeds/ac",
    "seeds/acre",
    "sds/ac",
    "plants/ac",
    "plants/acre",
    "per_ac",
    "seeds_ac",
  ],
  "1/ha": ["1/ha", "/ha", "perha", "seeds/ha", "plants/ha", "per_ha", "seeds_ha"],
  "kg/ha": ["kg/ha", "kgha", "kg_ha", "kgperha"],
  "lb/ac": ["lb/ac", "lbs/ac", "lb/acre", "lbs/acre", "lb_ac", "lbs_ac", "lbac"],
  "bu/ac": ["bu/ac", "bu/acre", "bu_ac", "buac", "bushels/acre", "bpa"],
  "kg/s": ["kg/s", "kg_s", "kgs", "kg/sec"],
  "lb/s": ["lb/s", "lbs/s", "lb_s", "lbs_s", "lb/sec", "lbs/sec"],
  Pa: ["pa", "pascal", "pascals"],
  kPa: ["kpa"],
  psi: ["psi", "lbf/in2"],
  bar: ["bar"],
  kg: ["kg", "kilogram", "kilograms"],
  lb: [],
};
const BY_SPELLING = new Map<string, UnitWord>();
for (const [unit, spellings] of Object.entries(SPELLINGS) as [UnitWord, readonly string[]][]) {
  for (const spelling of spellings) BY_SPELLING.set(spelling, unit);
}

/** The unit a text names by itself, such as a cell of a units line: `[lbf]`, `km/h`, `%`. Null when it is none. */
export function readUnitWord(text: string): UnitWord | null {
  const word = text
    .trim()
    .replace(/^[[(](.*)[\])]$/, "$1")
    .replace(/\s+/g, "")
    .toLowerCase();
  return BY_SPELLING.get(word) ?? null;
}

export interface HeaderUnit {
  unit: UnitWord;
  /** The header without its unit. */
  rest: string;
}

/** The unit a header names: in brackets anywhere, or as its last words. Null when it names none. */
export function readHeaderUnit(title: string): HeaderUnit | null {
  // "depth_mm[7]": a number in brackets is a row, not a unit.
  const header = title.replace(/\[(\d+)\]/g, " $1");
  for (const match of header.matchAll(/[[(]([^[\]()]+)[\])]/g)) {
    const unit = readUnitWord(match[1] ?? "");
    if (unit && !/^\d+$/.test((match[1] ?? "").trim())) return { unit, rest: header.replace(match[0], " ") };
  }
  if (header.trim().endsWith("%")) return { unit: "percent", rest: header.replace(/%\s*$/, "") };
  // The longest tail that is a unit: "speed_km_h" before "h". One letter alone counts only after a mark, and never first.
  const parts = header.split(/([_\s.,:-]+)/);
  for (const length of [5, 3, 1]) {
    const tail = parts.slice(-length).join("").trim();
    const unit = parts.length > length ? readUnitWord(tail) : null;
    if (unit && unit !== "1") return { unit, rest: parts.slice(0, -length).join("") };
  }
  return readMiddleUnit(parts);
}

/** A unit before a row number: `DF_lbf_07`, `margin lbf row 7`. Words of one letter are too short to trust there. */
function readMiddleUnit(parts: readonly string[]): HeaderUnit | null {
  for (let i = 2; i < parts.length; i += 2) {
    const part = parts[i] ?? "";
    const unit = part.length >= 2 || part === "N" || part === "m" ? readUnitWord(part) : null;
    if (unit && unit !== "1" && unit !== "in") return { unit, rest: parts.filter((_, index) => index !== i).join("") };
  }
  return null;
}
