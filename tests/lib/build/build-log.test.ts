import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { rowPosition } from "@/lib/rows/row-position";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const CHANNELS = [{ id: "downforce" as const, value: () => 900 }];
const straight = (headingDeg = 0) => straightTrack({ from: [0, 0], headingDeg, records: 100 });

describe("buildLog", () => {
  it("refuses a machine with another number of rows, and says what to do", () => {
    const built = buildLog(
      makeLog({ records: straight(), channels: CHANNELS }),
      makeSeeder({ rowCount: 6, name: "Old drill" }),
    );
    expect(built).toEqual({
      ok: false,
      error: { code: "rows-differ", message: expect.stringMatching(/log has 4 rows.*"Old drill" has 6/) },
    });
  });

  it("refuses a log without any position", () => {
    const log = makeLog({ records: straight(), channels: CHANNELS });
    log.longitude.fill(0);
    log.latitude.fill(0);
    const built = buildLog(log, makeSeeder());
    expect(built.ok ? "" : built.error.code).toBe("no-positions");
  });

  it("tells its progress up to the end", () => {
    const shares: number[] = [];
    buildLog(makeLog({ records: straight(), channels: CHANNELS }), makeSeeder(), {
      onProgress: (share) => shares.push(share),
    });
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares.at(-1)).toBe(1);
  });

  it("takes heading and speed from the track where the log has none", () => {
    const built = buildLog(makeLog({ records: straight(123), channels: CHANNELS }), makeSeeder());
    if (!built.ok) throw new Error(built.error.message);
    expect(built.value.placed.headingDeg[50]).toBeCloseTo(123, 2);
    expect(built.value.placed.speedMps[50]).toBeCloseTo(2.5, 3);
  });

  it("does not believe a heading that is not the direction of travel, and says so", () => {
    const records = straight(90).map((record) => ({ ...record, headingDeg: 0 }));
    const built = buildLog(makeLog({ records, channels: CHANNELS }), makeSeeder());
    if (!built.ok) throw new Error(built.error.message);
    expect(built.value.placed.headingDeg[50]).toBeCloseTo(90, 2);
    expect(built.value.notes.map((note) => note.code)).toEqual(["heading-not-used"]);
  });

  it("spreads the rows of an unknown machine over the distance between passes, and never silently", () => {
    const records = [0, 1, 2, 3, 4].flatMap((k) =>
      straightTrack({
        from: [6 * k, k % 2 === 0 ? 0 : 50],
        headingDeg: k % 2 === 0 ? 0 : 180,
        records: 100,
        startS: 60 * k,
      }),
    );
    const built = buildLog(makeLog({ records, rows: 24, channels: CHANNELS }), null);
    if (!built.ok) throw new Error(built.error.message);
    expect(built.value.placed.geometry.widthM[0]).toBeCloseTo(0.25, 3);
    expect(built.value.placed.machine).toBeNull();
    expect(built.value.notes[0]).toMatchObject({
      code: "machine-unknown",
      message: expect.stringContaining("neighbouring passes"),
    });
    const single = buildLog(makeLog({ records: straight(), rows: 24, channels: CHANNELS }), null);
    expect(single.ok && single.value.notes[0]!.message).toContain("guess of 0.762 m a row");
  });

  it("works across the antimeridian", () => {
    const log = makeLog({ records: straight(90), channels: CHANNELS });
    log.longitude.forEach((longitude, i) => {
      const moved = longitude + 98.612 + 179.9998;
      log.longitude[i] = moved > 180 ? moved - 360 : moved;
    });
    const built = buildLog(log, makeSeeder());
    if (!built.ok) throw new Error(built.error.message);
    expect(built.value.placed.passes).toHaveLength(1);
    expect(built.value.placed.passes[0]!.lengthM).toBeCloseTo(49.5, 2);
  });

  it("gives a log without times one pass, in the file's order", () => {
    const log = makeLog({ records: straight(), channels: CHANNELS });
    log.timeMs.fill(NaN);
    const built = buildLog(log, makeSeeder());
    if (!built.ok) throw new Error(built.error.message);
    expect(built.value.placed.passes.map((pass) => pass.records)).toEqual([100]);
  });

  it("puts rows where the simulator drove them, to a millimetre", () => {
    const { log, truth } = simulateSeedingLog({ seed: 9, headingDeg: 214 });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    const { placed } = built.value;
    // Row 1 and row 24 stand 23 spacings apart, square to the pass.
    const pass = truth.passes[2]!;
    const record = pass.firstRecord + 30;
    const [e1, n1] = rowPosition(placed, record, 1);
    const [e24, n24] = rowPosition(placed, record, 24);
    expect(Math.hypot(e24 - e1, n24 - n1)).toBeCloseTo(23 * 0.25, 3);
    const along = (pass.headingDeg * Math.PI) / 180;
    expect((e24 - e1) * Math.sin(along) + (n24 - n1) * Math.cos(along)).toBeCloseTo(0, 3);
  });
});

describe("rowDistances", () => {
  it("of the outer row of a circle are longer, of the inner shorter (hand-worked: radii 22 and 18)", () => {
    const circle = Array.from({ length: 60 }, (_, i) => {
      const angle = (0.5 * i) / 20;
      return {
        eastM: 20 * (1 - Math.cos(angle)),
        northM: 20 * Math.sin(angle),
        headingDeg: (angle * 180) / Math.PI,
        speedMps: 2.5,
      };
    });
    const machine = makeSeeder({ rowCount: 2, rowOffsetsM: [-2, 2] });
    const built = buildLog(makeLog({ records: circle, rows: 2, channels: CHANNELS }), machine);
    if (!built.ok) throw new Error(built.error.message);
    const distances = rowDistances(built.value.placed);
    const chord = 2 * Math.sin(0.5 / 20 / 2);
    expect(distances[2 * 30]).toBeCloseTo(22 * chord, 4);
    expect(distances[2 * 30 + 1]).toBeCloseTo(18 * chord, 4);
    expect(distances[0]).toBe(distances[2]);
  });

  it("weigh a sound log's rows alike", () => {
    const { log, truth } = simulateSeedingLog({ seed: 1 });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    const metres = rowStatistics(built.value.placed, "downforce").items.map((item) => item.distanceM);
    const rows = truth.channels[0]!.rows;
    metres.forEach((distance, k) => expect(Math.abs(distance / rows[k]!.distanceM - 1)).toBeLessThan(1e-4));
  });
});
