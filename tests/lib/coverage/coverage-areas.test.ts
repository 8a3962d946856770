import { kinks } from "@turf/turf";
import type { Polygon } from "geojson";
import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { connectRuns, countCells, joinRuns, wordRuns } from "@/lib/coverage/cell-runs";
import { coverageAreas } from "@/lib/coverage/coverage-areas";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import { doubledArea, outlineCells } from "@/lib/coverage/outline-cells";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { CoverageAreas } from "@/lib/schemas/coverage";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { makeLog, makeSeeder, straightTrack, type MadeRecord } from "@/tests/support/make-log";

function pass(from: [number, number], headingDeg: number, lengthM: number, startS: number): MadeRecord[] {
  const heading = (headingDeg * Math.PI) / 180;
  const start: [number, number] = [from[0] + 0.5 * Math.sin(heading), from[1] + 0.5 * Math.cos(heading)];
  return straightTrack({ from: start, headingDeg, records: lengthM / 0.5, startS });
}

function place(passes: MadeRecord[][]) {
  const channels = [{ id: "downforce" as const, value: () => 900 }];
  const machine = makeSeeder({ rowCount: 40, rowSpacingM: 0.25 });
  const built = buildLog(makeLog({ records: passes.flat(), rows: 40, channels }), machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

describe("coverageAreas", () => {
  it("two 100 x 10 m strips 9 m apart: one polygon of 1 x 100 m, its passes and its cause (hand-worked)", () => {
    const placed = place([pass([0, 0], 0, 100, 0), pass([9, 100], 180, 100, 100)]);
    const { features } = CoverageAreas.parse(coverageAreas(placed, null));
    expect(features).toHaveLength(1);
    const { geometry, properties } = features[0]!;
    expect(properties).toMatchObject({ kind: "overlap", cause: "guess-row", passes: [1, 2] });
    expect(Math.abs(properties.areaM2 - 100)).toBeLessThan(3);
    expect(Math.abs(properties.lengthM - 100)).toBeLessThan(1);
    // Straightened within one cell of 0.1 m along 202 m of outline.
    expect(Math.abs(geodesicAreaM2(geometry) - properties.areaM2)).toBeLessThan(10);
    const ring = (geometry as Polygon).coordinates[0]!;
    const corners = ring.map(([longitude, latitude]) => placed.plane.toPlane(longitude!, latitude!));
    expect(Math.min(...corners.map(([east]) => east))).toBeGreaterThan(4 - 0.2 - shift(placed)[0]);
    expect(doubledArea(corners)).toBeGreaterThan(0);
    expect(ring.length).toBeLessThan(60);
  });

  it("a gap of 2 x 100 m is a skip between its two passes, and none outside a boundary", () => {
    const placed = place([pass([0, 0], 0, 100, 0), pass([12, 100], 180, 100, 100)]);
    const { features } = coverageAreas(placed, null);
    expect(features).toHaveLength(1);
    expect(features[0]!.properties).toMatchObject({ kind: "skip", cause: null, passes: [1, 2] });
    expect(features[0]!.properties.areaM2).toBeCloseTo(measureCoverage(placed).skips.largestM2, 6);
    expect(Math.abs(features[0]!.properties.lengthM - 100)).toBeLessThan(3);
    const far = [0, 0.001, 0.002].map((more) => [-98 + more, 38 + more * more]);
    expect(coverageAreas(placed, { type: "Polygon", coordinates: [[...far, far[0]!]] }).features).toEqual([]);
  });

  it.each([11, 12, 13])("of a wandering field: no polygon crosses itself, areas are those counted, seed %i", (seed) => {
    const { log, truth } = simulateSeedingLog({
      seed,
      headingDeg: 23 * seed,
      passWanderM: 0.12,
      noise: { downforceN: 12, marginN: 40, depthM: 0.002, headingDeg: 0.3, positionM: 0.02 },
    });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    const { features } = CoverageAreas.parse(coverageAreas(built.value.placed, null));
    const measured = measureCoverage(built.value.placed);
    expect(features.length).toBeGreaterThanOrEqual(4);
    for (const { geometry, properties } of features) {
      const polygons = geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates;
      for (const coordinates of polygons) {
        expect(kinks({ type: "Polygon", coordinates }).features).toEqual([]);
      }
      expect(Math.abs(geodesicAreaM2(geometry) / properties.areaM2 - 1)).toBeLessThan(0.5);
    }
    const skips = features.filter(({ properties }) => properties.kind === "skip");
    expect(skips.length).toBe(measured.skips.count);
    expect(skips.reduce((sum, { properties }) => sum + properties.areaM2, 0)).toBeCloseTo(measured.skips.areaM2, 6);
  });
});

/** The plane of a log lies about its middle: where the test's zero is in it. */
function shift(placed: ReturnType<typeof place>): [number, number] {
  const [east, north] = placed.plane.toPlane(-98.612, 38.417);
  return [-east, -north];
}

describe("cells", () => {
  it("of a word become runs (hand-worked)", () => {
    expect(wordRuns(4, 2, 0b1011)).toEqual([
      { row: 4, from: 64, end: 66 },
      { row: 4, from: 67, end: 68 },
    ]);
    expect(wordRuns(0, 0, 0xffffffff | 0)).toEqual([{ row: 0, from: 0, end: 32 }]);
    expect(wordRuns(0, 1, 0x80000001 | 0)).toEqual([
      { row: 0, from: 32, end: 33 },
      { row: 0, from: 63, end: 64 },
    ]);
  });

  it("join along a row and connect from row to row, corners included", () => {
    const runs = joinRuns([
      { row: 1, from: 3, end: 5 },
      { row: 0, from: 2, end: 3 },
      { row: 0, from: 0, end: 2 },
      { row: 1, from: 9, end: 10 },
      { row: 2, from: 5, end: 6 },
    ]);
    expect(runs).toHaveLength(4);
    expect(connectRuns(runs).map(countCells).sort()).toEqual([1, 6]);
  });

  it("are outlined with their holes (hand-worked: 3 x 3 less its middle)", () => {
    const rings = outlineCells([
      { row: 0, from: 0, end: 3 },
      { row: 1, from: 0, end: 1 },
      { row: 1, from: 2, end: 3 },
      { row: 2, from: 0, end: 3 },
    ]);
    expect(rings.map(doubledArea).sort((a, b) => a - b)).toEqual([-2, 18]);
  });

  it("that touch in a corner are one piece of ground, but two parts of its outline", () => {
    const runs = [
      { row: 0, from: 0, end: 1 },
      { row: 1, from: 1, end: 2 },
    ];
    expect(connectRuns(runs)).toHaveLength(1);
    expect(connectRuns(runs, { sidesOnly: true })).toHaveLength(2);
  });

  it("leave a hole apart that touches the outline in a corner", () => {
    // A ring of 3 x 3 without its middle and one corner: the middle touches the outside there.
    const rings = outlineCells([
      { row: 0, from: 1, end: 3 },
      { row: 1, from: 0, end: 1 },
      { row: 1, from: 2, end: 3 },
      { row: 2, from: 0, end: 3 },
    ]);
    expect(rings.map(doubledArea).sort((a, b) => a - b)).toEqual([-2, 16]);
  });
});
