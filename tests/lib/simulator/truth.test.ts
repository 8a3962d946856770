import geodesic from "geographiclib-geodesic";
import { describe, expect, it } from "vitest";
import type { MachineLog } from "@/lib/logs/machine-log";
import { measureUnionM2 } from "@/lib/simulator/measure-coverage";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { SIMULATION_DEFAULTS } from "@/lib/simulator/simulation-options";
import { valuesOf } from "@/tests/lib/simulator/quiet-log";

describe("row truth", () => {
  it("equals means recomputed from the log's own positions on the ellipsoid", () => {
    const { log, truth } = simulateSeedingLog({
      seed: 31,
      headingDeg: 33,
      shape: { kind: "block", passes: 3, passLengthM: 90 },
      soil: { gradientEastNPerM: 1, gradientNorthNPerM: 0.5, noiseN: 40, noiseRangeM: 20 },
      missingShare: 0.02,
    });
    const weights = weighByGeodesic(log, truth.passOfRecord);
    for (const channel of truth.channels) {
      const values = valuesOf(log, channel.id);
      for (const { row, n, mean, sd, distanceM } of channel.rows) {
        const pairs = [...weights.keys()]
          .map((record) => [values[record * 24 + row - 1] ?? NaN, weights[record] ?? 0] as const)
          .filter(([value, weight]) => !Number.isNaN(value) && weight > 0);
        const total = pairs.reduce((sum, [, weight]) => sum + weight, 0);
        const expected = pairs.reduce((sum, [value, weight]) => sum + value * weight, 0) / total;
        const square = pairs.reduce((sum, [value, weight]) => sum + weight * (value - expected) ** 2, 0) / total;
        expect(n).toBe(pairs.length);
        expect(distanceM / total).toBeCloseTo(1, 6);
        expect(mean / expected).toBeCloseTo(1, 7);
        expect(sd / Math.sqrt(square)).toBeCloseTo(1, 6);
      }
    }
  });

  it("lists the passes back and forth", () => {
    const { truth } = simulateSeedingLog({
      seed: 31,
      headingDeg: 20,
      shape: { kind: "block", passes: 5, passLengthM: 90 },
    });
    expect(truth.passes.map((pass) => Math.round(pass.headingDeg))).toEqual([20, 200, 20, 200, 20]);
    for (const pass of truth.passes) {
      expect(pass.lengthM).toBeLessThanOrEqual(90);
      // At most one record of 0.5 s at 2.55 m/s is missing at each end.
      expect(pass.lengthM).toBeGreaterThan(90 - 2 * 1.3);
    }
  });
});

describe("coverage truth", () => {
  it("finds 1900 m2 under two 100 x 10 m rectangles 9 m apart", () => {
    // Hand-worked: 2 x 1000 m2 less 100 m2 of overlap.
    const rectangle = (acrossM: number): Parameters<typeof measureUnionM2>[0][number] => ({
      fromAlongM: 0,
      toAlongM: 100,
      fromAcrossM: acrossM,
      toAcrossM: acrossM + 10,
    });
    expect(measureUnionM2([rectangle(0), rectangle(9)])).toBeCloseTo(1900, 9);
  });

  it("has no overlap and no skip where the passes meet", () => {
    const { coverage, passes } = simulateSeedingLog({ seed: 2 }).truth;
    expect(coverage?.overlapM2).toBeCloseTo(0, 6);
    expect(coverage?.skippedM2).toBe(0);
    expect(coverage?.coveredM2).toBeCloseTo(coverage?.sweptM2 ?? NaN, 6);
    // 6 m wide; each pass's cells reach from one record before the first to the last.
    const longest = passes.reduce((sum, pass) => sum + pass.lengthM, 0);
    expect(coverage?.sweptM2).toBeGreaterThan(6 * longest);
    expect(coverage?.sweptM2).toBeLessThan(6 * (longest + passes.length * 1.3));
  });

  it.each([5.4, 6.3])("agrees with counting a 2 cm raster at %s m between passes", (passSpacingM) => {
    const { log, truth } = simulateSeedingLog({
      seed: 2,
      headingDeg: 0,
      passSpacingM,
      shape: { kind: "block", passes: 3, passLengthM: 25 },
      machine: { ...SIMULATION_DEFAULTS.machine, antennaToRowsM: 0 },
    });
    const { covered, swept } = countRaster(log, truth.passes);
    expect(Math.abs((truth.coverage?.coveredM2 ?? NaN) / covered - 1)).toBeLessThan(0.004);
    expect(Math.abs((truth.coverage?.sweptM2 ?? NaN) / swept - 1)).toBeLessThan(0.004);
  });

  it("knows headland rounds, lifted in their corners, and admits that it does not know curves", () => {
    const headland = { rounds: 2, downInCorners: false };
    const shape = { kind: "block", passes: 4, passLengthM: 80 } as const;
    const { coverage, passes } = simulateSeedingLog({ seed: 2, shape, headland }).truth;
    // Hand-worked: (80 + 4 x 6) x (4 x 6 + 4 x 6) m, less the bare ends of each pass (one record or less).
    expect(Math.abs((coverage?.coveredM2 ?? NaN) / (104 * 48) - 1)).toBeLessThan(0.01);
    expect(passes).toHaveLength(12);
    const down = simulateSeedingLog({ seed: 2, shape, headland: { rounds: 1, downInCorners: true } }).truth;
    expect(down.coverage).toBeNull();
    expect(down.passes).toHaveLength(5);
  });
});

/** Geodesic distance since the record before, the first of a pass as the second; 0 outside passes. */
function weighByGeodesic(log: MachineLog, passOf: Int32Array): Float64Array {
  const weights = new Float64Array(log.records);
  for (let record = 1; record < log.records; record += 1) {
    if (passOf[record] === 0 || passOf[record] !== passOf[record - 1]) continue;
    weights[record] =
      geodesic.Geodesic.WGS84.Inverse(
        log.latitude[record - 1] ?? NaN,
        log.longitude[record - 1] ?? NaN,
        log.latitude[record] ?? NaN,
        log.longitude[record] ?? NaN,
      ).s12 ?? NaN;
    if (weights[record - 1] === 0) weights[record - 1] = weights[record] ?? 0;
  }
  return weights;
}

const CELL_M = 0.02;

/** Counts cells under each pass driven due north or south; metres by a flat-earth scale of the place itself. */
function countRaster(
  log: MachineLog,
  passes: { firstRecord: number; records: number }[],
): { covered: number; swept: number } {
  const metresPerDegree = (dLat: number, dLon: number): number =>
    geodesic.Geodesic.WGS84.Inverse(38.417, -98.612, 38.417 + dLat, -98.612 + dLon).s12 ?? NaN;
  const perLat = metresPerDegree(0.001, 0) / 0.001;
  const perLon = metresPerDegree(0, 0.001) / 0.001;
  const seen = new Set<number>();
  let cells = 0;
  for (const { firstRecord, records } of passes) {
    const north = (record: number): number => ((log.latitude[record] ?? NaN) - 38.417) * perLat;
    const east = ((log.longitude[firstRecord] ?? NaN) + 98.612) * perLon;
    const end = north(firstRecord + records - 1);
    const start = 2 * north(firstRecord) - north(firstRecord + 1);
    for (let y = Math.round(Math.min(start, end) / CELL_M); y < Math.round(Math.max(start, end) / CELL_M); y += 1) {
      for (let x = Math.round((east - 3) / CELL_M); x < Math.round((east + 3) / CELL_M); x += 1) {
        seen.add(y * 100_000 + x);
        cells += 1;
      }
    }
  }
  return { covered: seen.size * CELL_M ** 2, swept: cells * CELL_M ** 2 };
}
