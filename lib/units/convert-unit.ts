import { AppError } from "@/lib/errors";
import { getUnit, UNITS, type UnitId } from "@/lib/units/unit-table";

export interface ConvertOptions {
  /** Weight of one bushel, needed for `bu/ac` only: 56 lb is one crop, 60 lb another. */
  poundsPerBushel?: number;
}

/**
 * SI units in one unit: SI value = value * factor.
 * @throws AppError `bushel-weight-missing` for `bu/ac` without a bushel weight, `not-a-quantity` for clock units.
 */
export function unitFactor(unit: UnitId, options: ConvertOptions = {}): number {
  if (unit === "bu/ac") {
    const pounds = options.poundsPerBushel;
    if (pounds === undefined || !(pounds > 0)) {
      throw new AppError("unprocessable", "Bushels per acre need the weight of a bushel in pounds, such as 56 lb.", {
        detailCode: "bushel-weight-missing",
      });
    }
    return pounds * UNITS["lb/ac"].factor;
  }
  const { factor, quantity } = getUnit(unit);
  if (quantity === "clock") {
    throw new AppError("unprocessable", `The unit ${unit} is a way to write a time and has no factor.`, {
      detailCode: "not-a-quantity",
    });
  }
  return factor;
}

/** `toSi(250, "lbf")` is 1112.05540382 (N). NaN stays NaN. @throws as `unitFactor`. */
export function toSi(value: number, unit: UnitId, options: ConvertOptions = {}): number {
  return value * unitFactor(unit, options);
}

/** `fromSi(1200, "lbf")` is 269.7707317. NaN stays NaN. @throws as `unitFactor`. */
export function fromSi(valueSi: number, unit: UnitId, options: ConvertOptions = {}): number {
  return valueSi / unitFactor(unit, options);
}
