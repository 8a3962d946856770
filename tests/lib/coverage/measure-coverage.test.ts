import type { Polygon } from "geojson";
import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { countBits, createBitGrid, nextColumn, setSpan } from "@/lib/coverage/bit-grid";
import { fillPolygon } from "@/lib/coverage/fill-polygon";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import type { Seeder } from "@/lib/machines/machine";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { makeLog, makeSeeder, straightTrack, type MadeRecord } from "@/tests/support/make-log";

function place(records: MadeRecord[], machine: Seeder) {
  const channels = [{ id: "downforce" as const, value: () => 900 }];
  const built = buildLog(makeLog({ records, rows: machine.rowCount, channels }), machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** A pass of `lengthM` whose first cell reaches back to its start. */
function pass(from: [number, number], headingDeg: number, lengthM: number, startS: number): MadeRecord[] {
  const heading = (headingDeg * Math.PI) / 180;
  const start: [number, number] = [from[0] + 0.5 * Math.sin(heading), from[1] + 0.5 * Math.cos(heading)];
  return straightTrack({ from: start, headingDeg, records: lengthM / 0.5, startS });
}

const TEN_METRES = makeSeeder({ rowCount: 40, rowSpacingM: 0.25 });

describe("measureCoverage", () => {
  it("two 100 x 10 m strips 9 m apart cover 1900 m2 and overlap on 100 (hand-worked)", () => {
    const records = [...pass([0, 0], 0, 100, 0), ...pass([9, 100], 180, 100, 100)];
    const found = measureCoverage(place(records, TEN_METRES));
    expect(found.sweptM2).toBeCloseTo(2000, 1);
    expect(Math.abs(found.coveredM2 / 1900 - 1)).toBeLessThan(0.002);
    expect(Math.abs(found.overlapM2 - 100)).toBeLessThan(0.002 * 1900);
    expect(found.resolutionM).toBeLessThanOrEqual(0.125);
  });

  it("two strips turned by one degree overlap as polygons do (shapely 1.8.5)", () => {
    // 500 x 9.144 m, the second turned by 1 degree about (0, 8.5): overlap 11.880104763, union 9132.119895237. Along x is east.
    const machine = makeSeeder({ rowCount: 12, rowSpacingM: 0.762 });
    const turned = (Math.PI / 180) * 1;
    const middle: [number, number] = [-4.572 * Math.sin(turned), 8.5 + 4.572 * Math.cos(turned)];
    const records = [...pass([0, 4.572], 90, 500, 0), ...pass(middle, 89, 500, 1000)];
    const found = measureCoverage(place(records, machine));
    expect(Math.abs(found.coveredM2 / 9132.119895237 - 1)).toBeLessThan(0.002);
    expect(Math.abs(found.overlapM2 - 11.880104763)).toBeLessThan(4);
  });

  it("counts a gap between passes as skipped, not the ground beyond them (hand-worked: 2 x 100 m)", () => {
    const records = [...pass([0, 0], 0, 100, 0), ...pass([12, 100], 180, 100, 100)];
    const found = measureCoverage(place(records, TEN_METRES));
    expect(Math.abs(found.skippedM2 - 200)).toBeLessThan(8);
    expect(Math.abs(found.coveredM2 / 2000 - 1)).toBeLessThan(0.002);
  });

  it("counts no skip outside the boundary", () => {
    const placed = place([...pass([0, 0], 0, 100, 0), ...pass([12, 100], 180, 100, 100)], TEN_METRES);
    const corners = [
      [-5, 0],
      [17, 0],
      [17, 50],
      [-5, 50],
      [-5, 0],
    ].map(([east, north]) => placed.plane.toDegrees(east!, north!));
    const boundary: Polygon = { type: "Polygon", coordinates: [corners] };
    expect(Math.abs(measureCoverage(placed, { boundary }).skippedM2 - 100)).toBeLessThan(5);
  });

  it("works strip by strip where the rows stand in ranks", () => {
    const rowForwardM = Array.from({ length: 40 }, (_, row) => (row % 2 === 0 ? 0 : 0.6));
    const placed = place(pass([0, 0], 30, 100, 0), { ...TEN_METRES, rowForwardM });
    const found = measureCoverage(placed);
    expect(found.sweptM2).toBeCloseTo(1000, 1);
    expect(Math.abs(found.coveredM2 / 1000 - 1)).toBeLessThan(0.002);
  });

  it("leaves out ground passed over with the machine lifted", () => {
    const records = pass([0, 0], 0, 100, 0).map((record, i) => ({ ...record, working: i < 80 || i >= 120 }));
    expect(measureCoverage(place(records, TEN_METRES)).sweptM2).toBeCloseTo(800, 0);
  });

  it("grows its cells rather than its memory", () => {
    const placed = place(pass([0, 0], 0, 100, 0), TEN_METRES);
    expect(measureCoverage(placed, { maxCells: 10_000 }).resolutionM).toBeGreaterThan(0.125);
  });

  it.each([
    { seed: 1, headingDeg: 0, passSpacingM: null },
    { seed: 2, headingDeg: 37, passSpacingM: 5.7 },
    { seed: 3, headingDeg: 140, passSpacingM: 6.4 },
  ])("is within 0.2 % of the simulated truth, seed $seed", (input) => {
    const { log, truth } = simulateSeedingLog({ ...input, passWanderM: 0.05 });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok || !truth.coverage) throw new Error("no truth to compare with");
    const found = measureCoverage(built.value.placed);
    expect(Math.abs(found.sweptM2 / truth.coverage.sweptM2 - 1)).toBeLessThan(0.002);
    expect(Math.abs(found.coveredM2 / truth.coverage.coveredM2 - 1)).toBeLessThan(0.002);
    expect(Math.abs(found.skippedM2 - truth.coverage.skippedM2)).toBeLessThan(0.002 * truth.coverage.coveredM2);
  });
});

describe("the grid", () => {
  const bounds = { minX: 0, minY: 0, maxX: 100, maxY: 50 };

  it("sets spans across words and finds their ends", () => {
    const grid = createBitGrid(bounds, 1, 1e6);
    setSpan(grid, 3, 5, 70);
    expect(countBits(grid)).toBe(65);
    expect(nextColumn(grid, 3, 0, true)).toBe(5);
    expect(nextColumn(grid, 3, 5, false)).toBe(70);
    expect(nextColumn(grid, 3, 70, true)).toBe(grid.columns);
  });

  it("fills both parts of a ring that crosses itself (hand-worked: two triangles of 25 m2)", () => {
    const grid = createBitGrid(bounds, 0.1, 1e7);
    fillPolygon(grid, [Float64Array.of(10, 10, 20, 20, 20, 10, 10, 20)]);
    expect(countBits(grid) * 0.01).toBeCloseTo(50, 0);
  });

  it("leaves holes empty (hand-worked: 400 - 100)", () => {
    const grid = createBitGrid(bounds, 0.1, 1e7);
    fillPolygon(grid, [
      Float64Array.of(10, 10, 30, 10, 30, 30, 10, 30),
      Float64Array.of(15, 15, 25, 15, 25, 25, 15, 25),
    ]);
    expect(countBits(grid) * 0.01).toBeCloseTo(300, 0);
  });
});
