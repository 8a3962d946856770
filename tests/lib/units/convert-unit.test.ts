import { describe, expect, it } from "vitest";
import { AppError } from "@/lib/errors";
import { fromSi, toSi } from "@/lib/units/convert-unit";
import { getUnit, UNIT_IDS, type UnitId } from "@/lib/units/unit-table";

// NIST SP 811 Appendix B.8 and GNU units 2.22 (`units -1 -t -d 15 lbf N` and so on); exact by definition.
const FACTORS: [UnitId, number][] = [
  ["lbf", 4.4482216152605],
  ["kgf", 9.80665],
  ["daN", 10],
  ["kN", 1000],
  ["lb", 0.45359237],
  ["in", 0.0254],
  ["ft", 0.3048],
  ["cm", 0.01],
  ["mm", 0.001],
  ["mph", 0.44704],
  ["km/h", 0.277777777777778],
  ["psi", 6894.75729316836],
  ["kPa", 1000],
  ["bar", 100_000],
  ["1/ac", 2.47105381467165e-4],
  ["1/ha", 1e-4],
  ["lb/ac", 1.12085115619446e-4],
  ["kg/ha", 1e-4],
  ["lb/s", 0.45359237],
  ["percent", 0.01],
  ["ms", 0.001],
  ["rad", 57.2957795130823],
];

describe("unit factors", () => {
  it.each(FACTORS)("one %s is %d in SI", (unit, factor) => {
    expect(Math.abs(toSi(1, unit) / factor - 1)).toBeLessThan(1e-14);
  });

  it("converts both ways", () => {
    // GNU units 2.22: 250 lbf, 1200 N, 34000 seeds an acre.
    expect(toSi(250, "lbf")).toBeCloseTo(1112.05540382, 8);
    expect(fromSi(1200, "lbf")).toBeCloseTo(269.7707317, 7);
    expect(toSi(34_000, "1/ac")).toBeCloseTo(8.40158297, 8);
    expect(toSi(30, "in")).toBeCloseTo(0.762, 14);
  });

  it.each([
    [56, 62.7676647468895],
    [60, 67.2510693716674],
    [48, 53.8008554973339],
  ])("a bushel of %d lb to the acre is %d kg/ha (GNU units 2.22)", (poundsPerBushel, kgPerHa) => {
    expect(toSi(1, "bu/ac", { poundsPerBushel }) * 1e4).toBeCloseTo(kgPerHa, 10);
  });

  it("refuses bushels without their weight and clocks", () => {
    expect(() => toSi(1, "bu/ac")).toThrow(AppError);
    expect(() => toSi(1, "iso8601")).toThrow(AppError);
  });

  it("keeps a missing value missing and a pressure a pressure", () => {
    expect(toSi(NaN, "lbf")).toBeNaN();
    for (const unit of ["psi", "bar", "kPa"] as const) expect(getUnit(unit).si).toBe("Pa");
  });

  it("has a positive finite factor for every unit but bushels and clocks", () => {
    const open = UNIT_IDS.filter((id) => !(getUnit(id).factor > 0));
    expect(open).toEqual(["iso8601", "unix-s", "unix-ms", "gps-s", "gps-week", "local", "bu/ac"]);
  });
});
