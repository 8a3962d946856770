import { fromSi } from "@/lib/units/convert-unit";
import { isUnitId, type UnitId } from "@/lib/units/unit-table";

export type UnitSystemName = "metric" | "imperial";

export interface ShownQuantity {
  number: string;
  /** Empty for a bare number. */
  unit: string;
}

interface Display {
  unit: UnitId;
  /** As written after the number, where it differs from the unit's id. */
  label?: string;
}

const DISPLAY: Record<string, Record<UnitSystemName, Display>> = {
  N: { metric: { unit: "N" }, imperial: { unit: "lbf" } },
  m: { metric: { unit: "m" }, imperial: { unit: "ft" } },
  "m:depth": { metric: { unit: "mm" }, imperial: { unit: "in" } },
  "m/s": { metric: { unit: "km/h" }, imperial: { unit: "mph" } },
  kg: { metric: { unit: "kg" }, imperial: { unit: "lb" } },
  "kg/m2": { metric: { unit: "kg/ha" }, imperial: { unit: "lb/ac" } },
  "1/m2": { metric: { unit: "1/m2", label: "/m²" }, imperial: { unit: "1/ac", label: "/ac" } },
  "kg/s": { metric: { unit: "kg/s" }, imperial: { unit: "lb/s" } },
  Pa: { metric: { unit: "kPa" }, imperial: { unit: "psi" } },
  fraction: { metric: { unit: "percent", label: "%" }, imperial: { unit: "percent", label: "%" } },
  deg: { metric: { unit: "deg", label: "°" }, imperial: { unit: "deg", label: "°" } },
};

const AREA: Record<UnitSystemName, { perUnitM2: number; label: string }> = {
  metric: { perUnitM2: 10_000, label: "ha" },
  // International acre: 4840 yd2 of 0.9144 m (NIST SP 811).
  imperial: { perUnitM2: 4046.8564224, label: "ac" },
};

export function areaUnitOf(system: UnitSystemName): { perUnitM2: number; label: string } {
  return AREA[system];
}

/** About three figures, at most two decimals, thin spaces in thousands. */
export function writeNumber(value: number): string {
  const size = Math.abs(value);
  const digits = size >= 100 ? 0 : size >= 10 ? 1 : 2;
  const text = value.toLocaleString("en-US", { minimumFractionDigits: 0, maximumFractionDigits: digits });
  return text.replaceAll(",", "\u2009").replace(/^-/, "\u2212");
}

/** A value in SI, said in the person's units. Unknown units are passed through untouched. */
export function showQuantity(valueSi: number, unit: string, system: UnitSystemName, channel?: string): ShownQuantity {
  if (unit === "m2") {
    const { perUnitM2, label } = AREA[system];
    return { number: writeNumber(valueSi / perUnitM2), unit: label };
  }
  const display = DISPLAY[`${unit}:${channel ?? ""}`]?.[system] ?? DISPLAY[unit]?.[system];
  if (!display) return { number: writeNumber(valueSi), unit: isUnitId(unit) && unit !== "1" ? unit : "" };
  return { number: writeNumber(fromSi(valueSi, display.unit)), unit: display.label ?? display.unit };
}
