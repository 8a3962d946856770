import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { AppError } from "@/lib/errors";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import type { Seeder } from "@/lib/machines/machine";
import { LimitZonesBody } from "@/lib/schemas/limit-zones";
import { buildLimitZones } from "@/lib/zones/limit-zones";
import { mergePatches } from "@/lib/zones/merge-patches";
import { makeLog, makeSeeder, straightTrack, type MadeLog } from "@/tests/support/make-log";

const MACHINE = { targetMarginN: 450, marginDeadbandN: 100, maxDownforceN: 1280 };
const records = straightTrack({ from: [0, 0], headingDeg: 30, records: 200 });

function place(channels: MadeLog["channels"], machine: Partial<Seeder> = MACHINE) {
  const built = buildLog(makeLog({ records, channels }), makeSeeder(machine));
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** 40 m of rows 2 and 3, overlapping, and 10 m of row 4 elsewhere. */
const low = (record: number, row: number) =>
  (row === 2 && record >= 40 && record < 100) ||
  (row === 3 && record >= 80 && record < 120) ||
  (row === 4 && record >= 150 && record < 170);

describe("zones past a limit", () => {
  const placed = place([{ id: "margin", value: (record, row) => (low(record, row) ? 300 : 500) }]);
  const body = buildLimitZones(placed, { kind: "under-target" });

  it("fit what is promised", () => {
    expect(LimitZonesBody.parse(body)).toEqual(body);
    expect(body).toMatchObject({ kind: "under-target", channel: "margin", unit: "N", threshold: 350, minLengthM: 5 });
  });

  it("are the stretches of single rows, with length, area and numbers of the readings (hand-worked)", () => {
    const rows = body.features.map(({ properties }) => [
      properties.row,
      Math.round(properties.lengthM),
      properties.mean,
    ]);
    // Half a metre a record: 60, 40 and 20 records.
    expect(rows.toSorted()).toEqual([
      [2, 30, 300],
      [3, 20, 300],
      [4, 10, 300],
    ]);
    for (const { geometry, properties } of body.features) {
      expect(properties.areaM2).toBeCloseTo(properties.lengthM * 0.25, 9);
      if (geometry.type !== "Polygon") throw new Error("one part only");
      expect(geodesicAreaM2(geometry) / properties.areaM2).toBeCloseTo(1, 1);
    }
  });

  it("make one patch where neighbouring rows touch, the largest first (hand-worked)", () => {
    expect(
      body.patches.map((patch) => [patch.patch, patch.firstRow, patch.lastRow, Math.round(patch.lengthM)]),
    ).toEqual([
      // Records 40 to 119.
      [1, 2, 3, 40],
      [2, 4, 4, 10],
    ]);
    expect(body.patches[0]!.fromM).toBeCloseTo(20, 0);
    expect(body.patches[0]!.areaM2).toBeCloseTo(50 * 0.25, 1);
    expect(body.features.map(({ properties }) => properties.patch).toSorted()).toEqual([1, 1, 2]);
  });

  it("add up, and say which share of the worked ground and of the distance they are", () => {
    const { totals } = body;
    expect(totals.zones).toBe(3);
    expect(totals.areaM2).toBeCloseTo(60 * 0.25, 1);
    // Four rows over 100 m.
    expect(totals.workedM2).toBeCloseTo(100, 0);
    expect(totals.shareOfWorked).toBeCloseTo(0.15, 2);
    expect(totals.shareOfDistance).toBeCloseTo(0.15, 2);
    expect(body.patches.reduce((sum, patch) => sum + patch.shareOfWorked!, 0)).toBeCloseTo(totals.shareOfWorked!, 9);
  });

  it("leave single readings out of zones but not out of the share of distance", () => {
    const speckled = place([{ id: "margin", value: (record) => (record % 10 === 0 ? 300 : 500) }]);
    const { totals, features } = buildLimitZones(speckled, { kind: "under-target" });
    expect(features).toEqual([]);
    expect(totals.shareOfDistance).toBeCloseTo(0.1, 2);
    expect(buildLimitZones(speckled, { kind: "under-target", minLengthM: 0 }).totals.zones).toBe(80);
  });

  it("show only what meets a window, whole patches with it", () => {
    const box = body.patches[1]!.bbox;
    const within = buildLimitZones(placed, { kind: "under-target", bbox: box });
    expect(within.patches.map(({ patch }) => patch)).toEqual([2]);
    expect(within.totals).toEqual(body.totals);
  });
});

describe("each kind of limit", () => {
  const placed = place([
    { id: "margin", value: (record, row) => (low(record, row) ? 600 : 500) },
    { id: "downforce", value: (record, row) => (low(record, row) ? 1270 : 900) },
    { id: "depth", unit: "m", resolution: 0.0001, value: (record, row) => (low(record, row) ? 0.035 : 0.045) },
  ]);

  it.each([
    ["over-target", 550],
    // The limit less 1 %.
    ["at-limit", 1280 * 0.99],
    // The median less 6 mm.
    ["too-shallow", 0.039],
  ] as const)("%s", (kind, threshold) => {
    const body = buildLimitZones(placed, { kind });
    expect(body.threshold).toBeCloseTo(threshold, 6);
    expect(body.features.map(({ properties }) => properties.row).toSorted()).toEqual([2, 3, 4]);
  });

  it("takes a depth of one's own", () => {
    expect(buildLimitZones(placed, { kind: "too-shallow", depthM: 0.03 }).features).toEqual([]);
    expect(buildLimitZones(placed, { kind: "too-shallow", depthM: 0.05 }).totals.shareOfWorked).toBeCloseTo(1, 6);
  });

  it("is refused where nobody can say, with the reason", () => {
    const bare = place([{ id: "margin", value: () => 500 }], {});
    expect(() => buildLimitZones(bare, { kind: "under-target" })).toThrow(/need the machine's target margin/);
    expect(() => buildLimitZones(bare, { kind: "at-limit" })).toThrow(AppError);
    expect(() => buildLimitZones(bare, { kind: "too-shallow" })).toThrow(/no channel "depth"/);
  });
});

describe("patches", () => {
  it("join through several rows and not across a gap (hand-worked)", () => {
    const run = (row: number, first: number, last: number) => ({ row, first, last });
    expect(mergePatches([run(1, 0, 5), run(2, 5, 9), run(3, 10, 12), run(3, 9, 9), run(5, 0, 9)])).toEqual([
      0, 0, 1, 0, 2,
    ]);
    expect(mergePatches([run(1, 0, 2), run(1, 6, 8), run(2, 1, 7)])).toEqual([0, 0, 0]);
  });
});
