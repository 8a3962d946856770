import { formatNumber } from "@/lib/units/format-quantity";
import { systemName, type SystemName, type UnitSystem } from "@/lib/units/display-unit";

export interface ScaleBarLength {
  widthPx: number;
  /** "200 ft", "5 km". */
  text: string;
}

interface BarUnit {
  symbol: string;
  metres: number;
}

/** Larger unit from one of it on. International foot and mile (NIST SP 811). */
const UNITS: Record<SystemName, { small: BarUnit; large: BarUnit }> = {
  metric: { small: { symbol: "m", metres: 1 }, large: { symbol: "km", metres: 1000 } },
  imperial: { small: { symbol: "ft", metres: 0.3048 }, large: { symbol: "mi", metres: 1609.344 } },
};

/** The longest bar of 1, 2 or 5 times a power of ten that fits. Null where a map shows no ground. */
export function chooseScaleBar(pixelsPerM: number, mostPx: number, system: UnitSystem): ScaleBarLength | null {
  if (!(pixelsPerM > 0) || !Number.isFinite(pixelsPerM)) return null;
  const { small, large } = UNITS[systemName(system)];
  const mostM = mostPx / pixelsPerM;
  const unit = mostM >= large.metres ? large : small;
  const most = mostM / unit.metres;
  const power = 10 ** Math.floor(Math.log10(most));
  const digit = [5, 2, 1].find((candidate) => candidate * power <= most) ?? 1;
  const length = digit * power;
  const decimals = Math.max(0, -Math.floor(Math.log10(length) + 1e-9));
  return {
    widthPx: length * unit.metres * pixelsPerM,
    text: `${formatNumber(length, decimals)}\u202f${unit.symbol}`,
  };
}
