import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { rowDistances } from "@/lib/rows/row-distances";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { classOf, hysteresisOf, nextClass } from "@/lib/zones/classify";
import { mergeShortRuns } from "@/lib/zones/merge-short-runs";
import { smoothTrack } from "@/lib/zones/smooth-track";
import { buildSwaths } from "@/lib/zones/swaths";
import { buildZones } from "@/lib/zones/zones";
import { makeLog, makeSeeder, straightTrack, type MadeRecord } from "@/tests/support/make-log";

const BREAKS = [180, 490, 890];

function place(value: (record: number, row: number) => number, records: MadeRecord[] = line(100)) {
  const built = buildLog(makeLog({ records, channels: [{ id: "margin", value }] }), makeSeeder());
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}
const line = (records: number) => straightTrack({ from: [0, 0], headingDeg: 30, records });

describe("classes", () => {
  it("take a value on an edge upwards (hand-worked)", () => {
    expect([179, 180, 489, 490, 890, 2000].map((value) => classOf(value, BREAKS))).toEqual([0, 1, 1, 2, 3, 3]);
  });

  it("change only where the edge is passed by the hysteresis (hand-worked: a twentieth of 310 is 15.5)", () => {
    expect(hysteresisOf(BREAKS)).toBeCloseTo(15.5, 9);
    expect(nextClass(1, 500, BREAKS, 15.5)).toBe(1);
    expect(nextClass(1, 506, BREAKS, 15.5)).toBe(2);
    expect(nextClass(2, 480, BREAKS, 15.5)).toBe(2);
    expect(nextClass(2, 474, BREAKS, 15.5)).toBe(1);
    expect(nextClass(null, 480, BREAKS, 15.5)).toBe(1);
  });
});

describe("smoothTrack", () => {
  it("is the length-weighted mean of the window (hand-worked)", () => {
    const values = Float64Array.of(0, 0, 10, 0, 0);
    expect(Array.from(smoothTrack(values, new Float64Array(5).fill(1), 2))).toEqual([0, 10 / 3, 10 / 3, 10 / 3, 0]);
  });
  it("leaves missing readings out (hand-worked)", () => {
    expect(Array.from(smoothTrack(Float64Array.of(4, NaN, 8), new Float64Array(3).fill(1), 2))).toEqual([4, 6, 8]);
  });
});

describe("mergeShortRuns", () => {
  it("gives a short run to the neighbour of the nearer class, and joins what then touches (hand-worked)", () => {
    const runs = [
      { class: 1, first: 0, last: 19, lengthM: 10 },
      { class: 2, first: 20, last: 21, lengthM: 1 },
      { class: 1, first: 22, last: 39, lengthM: 9 },
      { class: 3, first: 40, last: 59, lengthM: 10 },
    ];
    expect(mergeShortRuns(runs, { minLengthM: 5 })).toEqual([
      { class: 1, first: 0, last: 39, lengthM: 20 },
      { class: 3, first: 40, last: 59, lengthM: 10 },
    ]);
  });
});

describe("buildZones", () => {
  const step = (record: number, row: number) => (row === 2 && record >= 40 && record < 60 ? 300 : 600);

  it("with no least length are the plain runs of readings, numbers and area from the readings themselves", () => {
    const zones = buildZones(place(step), "margin", { breaks: BREAKS, minLengthM: 0 });
    const second = zones.features.filter((zone) => zone.properties.row === 2).map((zone) => zone.properties);
    expect(second.map(({ class: kind, n, mean, min, max }) => ({ kind, n, mean, min, max }))).toEqual([
      { kind: 2, n: 40, mean: 600, min: 600, max: 600 },
      { kind: 1, n: 20, mean: 300, min: 300, max: 300 },
      { kind: 2, n: 40, mean: 600, min: 600, max: 600 },
    ]);
    expect(second[1]!.areaM2).toBeCloseTo(20 * 0.5 * 0.25, 4);
    expect(second[1]!.startS).toBeCloseTo(8, 6);
    expect(second[1]!.endS).toBeCloseTo(11.8, 6);
  });

  it("draw the ground they speak of: polygons tile the pass", () => {
    const placed = place(step);
    const zones = buildZones(placed, "margin", { breaks: BREAKS, minLengthM: 0 });
    for (const zone of zones.features) {
      expect(geodesicAreaM2(zone.geometry) / zone.properties.areaM2).toBeCloseTo(1, 2);
      expect(zone.geometry.coordinates[0]).toHaveLength(5);
    }
    const total = zones.features.reduce((sum, zone) => sum + zone.properties.areaM2, 0);
    expect(total).toBeCloseTo(
      rowDistances(placed).reduce((sum, metres) => sum + metres * 0.25, 0),
      3,
    );
  });

  it("are not shattered by noise, yet keep the raw numbers", () => {
    const noisy = (record: number, row: number) => step(record, row) + (record % 2 === 0 ? 150 : -150);
    const zones = buildZones(place(noisy), "margin", { breaks: BREAKS });
    const second = zones.features.filter((zone) => zone.properties.row === 2);
    expect(second.map((zone) => zone.properties.class)).toEqual([2, 1, 2]);
    expect(second[1]!.properties.min).toBe(150);
    expect(zones.features.filter((zone) => zone.properties.row === 1)).toHaveLength(1);
    expect(buildZones(place(noisy), "margin", { breaks: BREAKS, minLengthM: 0 }).features.length).toBeGreaterThan(100);
  });

  it("leave a long silence blank, bridge a single missing reading", () => {
    const gaps = (record: number, row: number) =>
      row === 1 && (record === 20 || (record >= 50 && record < 60)) ? NaN : 600;
    const zones = buildZones(place(gaps), "margin", { breaks: BREAKS }).features.filter(
      (zone) => zone.properties.row === 1,
    );
    expect(zones.map((zone) => zone.properties.n)).toEqual([49, 40]);
    expect(zones[0]!.properties.areaM2).toBeCloseTo(50 * 0.5 * 0.25, 4);
  });

  it("outside a window are left out", () => {
    const placed = place(step);
    const [west, south] = placed.plane.toDegrees(-3, -3);
    const [east, north] = placed.plane.toDegrees(3, 3);
    const near = buildZones(placed, "margin", { breaks: BREAKS, minLengthM: 0, bbox: [west, south, east, north] });
    expect(near.features.map((zone) => zone.properties.row).sort()).toEqual([1, 2, 3, 4]);
    const far: [number, number, number, number] = [10, 10, 11, 11];
    expect(buildZones(placed, "margin", { breaks: BREAKS, bbox: far }).features).toEqual([]);
  });

  it("refuse a channel the log has not", () => {
    expect(() => buildZones(place(step), "depth", { breaks: BREAKS })).toThrow(/no channel "depth"/);
  });
});

describe("buildSwaths", () => {
  it("are one polygon a pass, as large as what it swept", () => {
    const { log, truth } = simulateSeedingLog({ seed: 2, headingDeg: 31 });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok || !truth.coverage) throw new Error("no truth to compare with");
    const { features } = buildSwaths(built.value.placed);
    expect(features.map((swath) => swath.properties.pass)).toEqual(truth.passes.map((pass) => pass.pass));
    const total = features.reduce((sum, swath) => sum + swath.properties.areaM2, 0);
    expect(Math.abs(total / truth.coverage.sweptM2 - 1)).toBeLessThan(0.001);
    expect(features[0]!.properties.headingDeg).toBeCloseTo(31, 3);
  });

  it("come in parts where a tight turn makes the strip cross itself", () => {
    const loop = Array.from({ length: 120 }, (_, k) => {
      const angle = (k * Math.PI) / 60;
      return { eastM: 3 * (1 - Math.cos(angle)), northM: 3 * Math.sin(angle), timeS: k * 0.2, speedMps: 1 };
    });
    const machine = makeSeeder({ rowSpacingM: 2.5 });
    const built = buildLog(makeLog({ records: loop, channels: [{ id: "margin", value: () => 1 }] }), machine);
    if (!built.ok) throw new Error(built.error.message);
    for (const swath of buildSwaths(built.value.placed).features) {
      expect(swath.properties.areaM2).toBeGreaterThan(0);
      expect(["Polygon", "MultiPolygon"]).toContain(swath.geometry.type);
    }
  });
});
