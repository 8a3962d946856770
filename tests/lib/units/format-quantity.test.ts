import { describe, expect, it } from "vitest";
import { displayUnit } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

const THIN = "\u202f";

describe("formatQuantity", () => {
  it.each([
    [943.02, "N", "metric", undefined, `943${THIN}N`],
    [943.02, "N", "imperial", undefined, `212${THIN}lbf`],
    [0.0508, "m", "metric", "depth", `51${THIN}mm`],
    [0.0508, "m", "imperial", "depth", `2.00${THIN}in`],
    [0.0508, "m", "imperial", "deviation:depth", `2.00${THIN}in`],
    [12.34, "m", "metric", undefined, `12.3${THIN}m`],
    [2.3611, "m/s", "metric", undefined, `8.5${THIN}km/h`],
    [2.3611, "m/s", "imperial", undefined, `5.3${THIN}mph`],
    [40_468.564224, "m2", "metric", undefined, `4.05${THIN}ha`],
    [40_468.564224, "m2", "imperial", undefined, `10.00${THIN}ac`],
    [0.985, "fraction", "metric", undefined, `99${THIN}%`],
    [8.40158297, "1/m2", "imperial", undefined, `34${THIN}000${THIN}/ac`],
    [-12, "N", "metric", undefined, `\u221212${THIN}N`],
    [-0.0001, "kg", "metric", undefined, `\u22120.0001${THIN}kg`],
    [271.2, "deg", "metric", undefined, "271°"],
    [1, "boolean", "metric", undefined, "on"],
    [5, "furlong", "metric", undefined, `5.00${THIN}furlong`],
  ] as const)("says %d %s in %s", (value, unit, system, channel, text) => {
    expect(formatQuantity(value, unit, system, { channel }).text).toBe(text);
  });

  it("never shows a missing value as 0", () => {
    for (const missing of [null, NaN, Infinity]) {
      expect(formatQuantity(missing, "N", "metric")).toEqual({ value: null, unit: "N", text: "–" });
    }
  });

  it("gives the value unrounded beside the text", () => {
    expect(formatQuantity(1000, "N", "imperial").value).toBeCloseTo(224.8089431, 7);
    expect(displayUnit("Pa", "imperial").symbol).toBe("psi");
  });
});
