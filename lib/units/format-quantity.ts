import { displayUnit, type UnitSystem } from "@/lib/units/display-unit";

/** Narrow no-break space: between number and unit, and between thousands from 10,000 on. */
const THIN_SPACE = "\u202f";
const MINUS = "\u2212";

export interface FormattedQuantity {
  /** In the shown unit, not rounded; null when missing. */
  value: number | null;
  unit: string;
  /** `943 N`, `5.1 km/h`, `98 %`; an en dash when missing, never 0. */
  text: string;
}

export interface FormatOptions {
  /** Tells a depth from a distance. */
  channel?: string;
  /** Decimals to use instead of the unit's own. */
  decimals?: number;
}

/** An SI value in a person's units, as text with its unit. Rounds to the unit's usual decimals, and keeps two figures of small values. */
export function formatQuantity(
  valueSi: number | null,
  siUnit: string,
  system: UnitSystem,
  options: FormatOptions = {},
): FormattedQuantity {
  const shown = displayUnit(siUnit, system, options.channel);
  if (valueSi === null || !Number.isFinite(valueSi)) return { value: null, unit: shown.symbol, text: "–" };
  if (siUnit === "boolean") return { value: valueSi, unit: "", text: valueSi > 0 ? "on" : "off" };
  const value = valueSi / shown.factor;
  const number = formatNumber(value, options.decimals ?? decimalsFor(value, shown.decimals));
  // A degree sign stands at its number; every other unit after a thin space (ISO 80000-1).
  const gap = shown.symbol === "" || shown.symbol === "°" ? "" : THIN_SPACE;
  return { value, unit: shown.symbol, text: `${number}${gap}${shown.symbol}` };
}

/** The unit's decimals, or more until a value other than 0 shows two figures (at most four decimals). */
function decimalsFor(value: number, usual: number): number {
  const size = Math.abs(value);
  if (size === 0 || size >= 10 ** (1 - usual)) return usual;
  return Math.min(4, Math.max(usual, 1 - Math.floor(Math.log10(size))));
}

/** A number with a true minus sign and thin spaces between thousands from 10,000 on. */
export function formatNumber(value: number, decimals: number): string {
  const [whole = "0", fraction] = Math.abs(value).toFixed(decimals).split(".");
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(?:\d{3})+$)/g, THIN_SPACE) : whole;
  const digits = fraction === undefined ? grouped : `${grouped}.${fraction}`;
  const isZero = /^[0.]*$/.test(digits);
  return value < 0 && !isZero ? `${MINUS}${digits}` : digits;
}
