import { displayUnit, type DisplayUnit, type UnitSystem } from "@/lib/units/display-unit";
import { formatNumber } from "@/lib/units/format-quantity";

/** The unit in which a rule's number is typed and shown; accelerations as a change of speed each second. */
export function ruleUnit(unit: string, system: UnitSystem, channel?: string | null): Omit<DisplayUnit, "words"> {
  if (unit === "m/s2") {
    const speed = displayUnit("m/s", system);
    return { ...speed, symbol: `${speed.symbol} each second` };
  }
  if (unit === "m" && channel == null) return { ...displayUnit("m", system, "distance"), decimals: 1 };
  return displayUnit(unit, system, channel ?? undefined);
}

/** A limit of a rule as words: "200 m", "10 000". */
export function sayRuleNumber(value: number, unit: Omit<DisplayUnit, "words">): string {
  const shown = value / unit.factor;
  const number = formatNumber(shown, Number.isInteger(shown) ? 0 : Math.max(1, unit.decimals));
  return unit.symbol === "" ? number : `${number}\u202f${unit.symbol}`;
}
