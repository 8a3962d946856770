import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { FLAGS } from "@/lib/cleaning/flags";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import { rowDistances } from "@/lib/rows/row-distances";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { makeLog, makeSeeder, straightTrack, type MadeRecord } from "@/tests/support/make-log";

const CHANNELS = [{ id: "downforce" as const, value: () => 900 }];

function place(records: MadeRecord[]) {
  const built = buildLog(makeLog({ records, channels: CHANNELS }), makeSeeder());
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

const line = (records: number) => straightTrack({ from: [0, 0], headingDeg: 0, records });
const lift = (records: MadeRecord[], from: number, end: number) =>
  records.map((record, i) => ({ ...record, working: i < from || i >= end }));

describe("segmentPasses", () => {
  it("ends a pass where the machine is lifted for more than 2 s", () => {
    const placed = place(lift(line(200), 90, 105));
    expect(placed.passes.map((pass) => [pass.first, pass.records])).toEqual([
      [0, 90],
      [105, 95],
    ]);
    expect(placed.passOf[95]).toBe(0);
  });

  it("bridges a drop-out under 2 s on the same line, whose ground counts for nobody", () => {
    const placed = place(lift(line(200), 90, 95));
    expect(placed.passes).toHaveLength(1);
    expect(placed.passOf[92]).toBe(0);
    const distances = rowDistances(placed);
    expect(distances[92 * 4]).toBe(0);
    expect(distances[95 * 4]).toBeCloseTo(0.5, 4);
    expect(distances.reduce((sum, metres) => sum + metres, 0) / 4).toBeCloseTo(195 * 0.5, 2);
  });

  it("ends a pass at a jump and at a silence", () => {
    const before = line(50);
    const jumped = straightTrack({ from: [6, 30], headingDeg: 180, records: 50, startS: 10 });
    expect(place([...before, ...jumped]).passes).toHaveLength(2);
    const later = straightTrack({ from: [0, 25], headingDeg: 0, records: 50, startS: 60 });
    expect(place([...before, ...later]).passes).toHaveLength(2);
  });

  it("ends a pass where the logged pass number changes, however smooth the line", () => {
    const placed = place(line(100).map((record, i) => ({ ...record, pass: i < 40 ? 7 : 8 })));
    expect(placed.passes.map((pass) => pass.records)).toEqual([40, 60]);
  });

  it("cuts a turn driven with the machine down in its middle, and flags it", () => {
    const up = line(100);
    const turn = Array.from({ length: 50 }, (_, k) => {
      const angle = ((k + 1) * Math.PI) / 51;
      return { eastM: 8 * (1 - Math.cos(angle)), northM: 49.5 + 8 * Math.sin(angle) };
    });
    const down = straightTrack({ from: [16, 49.5], headingDeg: 180, records: 100 });
    const placed = place([...up, ...turn, ...down].map((record, i) => ({ ...record, timeS: 0.2 * i })));
    expect(placed.passes).toHaveLength(2);
    expect(placed.passes[1]!.first).toBeGreaterThan(120);
    expect(placed.passes[1]!.first).toBeLessThan(130);
    expect(placed.flags[125]! & FLAGS.turning).not.toBe(0);
    expect(placed.flags[40]! & FLAGS.turning).toBe(0);
  });

  it("flags a pass under 10 m or 10 records, yet counts it", () => {
    const placed = place([...line(100), ...straightTrack({ from: [20, 0], headingDeg: 0, records: 8, startS: 40 })]);
    expect(placed.passes).toHaveLength(2);
    expect(placed.flags[104]! & FLAGS["short-pass"]).not.toBe(0);
    expect(placed.passOf[104]).toBe(2);
  });

  it("finds the passes of a simulated log", () => {
    const { log, truth } = simulateSeedingLog({ seed: 5, headingDeg: 63 });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    const { passes, passOf } = built.value.placed;
    expect(passes.map(({ pass, first, records }) => ({ pass, firstRecord: first, records }))).toEqual(
      truth.passes.map(({ pass, firstRecord, records }) => ({ pass, firstRecord, records })),
    );
    expect(Array.from(passOf)).toEqual(Array.from(truth.passOfRecord));
    passes.forEach((pass, k) => expect(pass.lengthM).toBeCloseTo(truth.passes[k]!.lengthM, 2));
  });
});

describe("headlands", () => {
  it("are passes more than 20 degrees off the main axis, or along the boundary", () => {
    const main = [0, 4, 8].flatMap((eastM, k) =>
      straightTrack({
        from: [eastM, k % 2 === 0 ? 0 : 100],
        headingDeg: k % 2 === 0 ? 0 : 180,
        records: 200,
        startS: k * 100,
      }),
    );
    const across = straightTrack({ from: [0, 110], headingDeg: 90, records: 60, startS: 400 });
    const log = makeLog({ records: [...main, ...across], channels: CHANNELS });
    const machine = makeSeeder();
    const free = buildLog(log, machine);
    if (!free.ok) throw new Error(free.error.message);
    expect(free.value.placed.passes.map((pass) => pass.headland)).toEqual([false, false, false, true]);
    const ring = [
      [-0.6, -5],
      [40, -5],
      [40, 200],
      [-0.6, 200],
      [-0.6, -5],
    ].map(([e, n]) => free.value.placed.plane.toDegrees(e!, n!));
    const bounded = buildLog(log, machine, {
      boundary: { type: "Polygon", coordinates: [shift(ring, free.value.placed)] },
    });
    if (!bounded.ok) throw new Error(bounded.error.message);
    expect(bounded.value.placed.passes.map((pass) => pass.headland)).toEqual([true, false, false, true]);
  });

  it("the main axis is the one that most distance is worked along", () => {
    const passes = [
      { headingDeg: 20, lengthM: 300 },
      { headingDeg: 200.5, lengthM: 300 },
      { headingDeg: 110, lengthM: 200 },
      { headingDeg: 290, lengthM: 200 },
    ];
    expect(mainAxisDeg(passes)).toBeCloseTo(20.25, 2);
    expect(mainAxisDeg([])).toBeNull();
  });
});

/** The ring above is about the log's centre; the first pass runs at that plane's own easting. */
function shift(
  ring: [number, number][],
  placed: {
    plane: { toPlane(a: number, b: number): [number, number]; toDegrees(a: number, b: number): [number, number] };
    originEastM: Float64Array;
    originNorthM: Float64Array;
  },
) {
  return ring.map(([longitude, latitude]) => {
    const [east, north] = placed.plane.toPlane(longitude, latitude);
    return placed.plane.toDegrees(east + placed.originEastM[0]!, north + placed.originNorthM[0]!);
  });
}
