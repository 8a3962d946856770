import geodesic from "geographiclib-geodesic";
import { describe, expect, it } from "vitest";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { rectangleRing } from "@/lib/simulator/field-ring";
import { createBandTest } from "@/lib/simulator/ground-resistance";
import { LARKSPUR_COMBINE } from "@/lib/simulator/scenario/larkspur-machines";
import { bandsFromHarvest, type HarvestInput, simulateHarvestLog } from "@/lib/simulator/simulate-harvest-log";

const ORIGIN: [number, number] = [-98.6124, 38.4171];
const PLANE = createLocalPlane(...ORIGIN);

function harvest(headingDeg: number): HarvestInput {
  return {
    seed: 9,
    combine: LARKSPUR_COMBINE,
    origin: ORIGIN,
    ring: rectangleRing(PLANE, headingDeg, 150, 8 * 6.096),
    headingDeg,
  };
}

describe("simulateHarvestLog", () => {
  it("drives back and forth on lines one header width apart", () => {
    const { log, truth } = simulateHarvestLog(harvest(0));
    expect(truth.passes.map((pass) => Math.round(pass.headingDeg))).toEqual([0, 180, 0, 180, 0, 180, 0, 180]);
    const longitudes = truth.passes.map((pass) => log.longitude[pass.firstRecord + 20] ?? NaN);
    longitudes.slice(1).forEach((longitude, index) => {
      // Lines run due north, so the distance along one parallel is the spacing (lines are parallel, meridians close in by 0.1 mm).
      const spacing = geodesic.Geodesic.WGS84.Inverse(38.4171, longitudes[index] ?? NaN, 38.4171, longitude).s12;
      expect(spacing).toBeCloseTo(6.096, 3);
    });
  });

  it("logs the mass that it cut", () => {
    const { log, truth } = simulateHarvestLog({ ...harvest(0), yieldTrendPerM: 0 });
    const flow = log.channels.find((channel) => channel.id === "yieldFlow")?.values ?? new Float32Array();
    const massKg = flow.reduce((sum, kgPerS, record) => (log.working?.[record] ? sum + kgPerS : sum), 0);
    const areaM2 = truth.passes.reduce((sum, pass) => sum + (pass.lengthM + 1.9) * 6.096, 0);
    expect(massKg / areaM2).toBeCloseTo(0.52, 2);
  });

  it("sends the grain late when asked to", () => {
    const prompt = simulateHarvestLog({ ...harvest(0), flowNoise: 0 }).log.channels[0]?.values;
    const late = simulateHarvestLog({ ...harvest(0), flowNoise: 0, grainDelayS: 12 }).log.channels[0]?.values;
    expect(late?.subarray(12)).toEqual(prompt?.subarray(0, prompt.length - 12));
    expect(late?.[11]).toBe(0);
  });
});

describe("bandsFromHarvest", () => {
  it.each([0, 68, 200, 340])("centres a band on every line driven at %s degrees", (headingDeg) => {
    const input = harvest(headingDeg);
    const bands = bandsFromHarvest(input, { widthM: 2.5, sideShiftM: 0, contrastN: 240 });
    const isInBand = createBandTest(bands, PLANE);
    const right = (headingDeg * Math.PI) / 180 + Math.PI / 2;
    const shifted = (east: number, north: number, byM: number): boolean =>
      isInBand(east + byM * Math.sin(right), north + byM * Math.cos(right));
    for (const [from, to] of simulateHarvestLog(input).truth.lines) {
      for (const [east, north] of [PLANE.toPlane(...from), PLANE.toPlane(...to)]) {
        expect([-1.24, 0, 1.24].map((byM) => shifted(east, north, byM))).toEqual([true, true, true]);
        expect([-1.26, 1.26, 3.048].map((byM) => shifted(east, north, byM))).toEqual([false, false, false]);
      }
    }
    expect(bands.headingDeg).toBeGreaterThanOrEqual(0);
    expect(bands.headingDeg).toBeLessThan(180);
  });

  it.each([20, 200])("shifts to the same side of the field whichever way the lines are named (%s)", (headingDeg) => {
    const input = harvest(headingDeg);
    const bands = bandsFromHarvest(input, { widthM: 1, sideShiftM: 0.8, contrastN: 240 });
    const isInBand = createBandTest(bands, PLANE);
    const [line] = simulateHarvestLog(input).truth.lines;
    const [east, north] = PLANE.toPlane(...(line?.[0] ?? ORIGIN));
    // Right of the first line as the combine drives it.
    const right = (headingDeg * Math.PI) / 180 + Math.PI / 2;
    expect(isInBand(east + 0.8 * Math.sin(right), north + 0.8 * Math.cos(right))).toBe(true);
    expect(isInBand(east - 0.8 * Math.sin(right), north - 0.8 * Math.cos(right))).toBe(false);
  });
});
