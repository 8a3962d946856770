import { kinks } from "@turf/turf";
import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { buildSwaths } from "@/lib/zones/swaths";

describe("swaths in tight turns", () => {
  it.each([
    { turnRadiusM: 7, headingDeg: 0 },
    { turnRadiusM: 2, headingDeg: 0 },
    { turnRadiusM: 2, headingDeg: 33 },
  ])("are the ground of the pass, once, and never cross themselves: %o", (given) => {
    // A 6 m drill that stays down in the corners: at a radius of 2 m its inner rows run backwards.
    const { log, truth } = simulateSeedingLog({ ...given, seed: 3, headland: { rounds: 1, downInCorners: true } });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    const { placed } = built.value;
    const { features } = buildSwaths(placed);
    expect(features).toHaveLength(placed.passes.length);
    for (const { geometry, properties } of features) {
      const polygons = geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates;
      for (const coordinates of polygons) expect(kinks({ type: "Polygon", coordinates }).features).toEqual([]);
      const pass = placed.passes.find((one) => one.pass === properties.pass)!;
      const { coveredM2 } = measureCoverage({ ...placed, passes: [pass] });
      expect(Math.abs(properties.areaM2 / coveredM2 - 1)).toBeLessThan(0.01);
    }
  });
});
