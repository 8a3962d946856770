import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { makeLog, makeSeeder, type MadeLog, type MadeRecord } from "@/tests/support/make-log";

const MACHINE = makeSeeder({ targetMarginN: 400, marginDeadbandN: 50 });

/** 200 m at one record a second: the first half at 1 m/s, the second at 4 m/s. */
function slowThenFast(options: { eastM: number; south: boolean; startS: number; hasSpeed: boolean }): MadeRecord[] {
  const { eastM, south, startS, hasSpeed } = options;
  return Array.from({ length: 126 }, (_, i) => {
    const alongM = i <= 100 ? i : 100 + 4 * (i - 100);
    const speedMps = hasSpeed ? (i <= 100 ? 1 : 4) : undefined;
    return { eastM, northM: south ? 200 - alongM : alongM, timeS: startS + i, speedMps };
  });
}

const isFast = (record: number) => record % 126 > 100;
const CHANNELS: MadeLog["channels"] = [
  { id: "downforce", value: (record) => (isFast(record) ? 400 : 200) },
  { id: "margin", value: (record) => (isFast(record) ? 300 : 500) },
];

function place(records: MadeRecord[], loseTimes = false): PlacedLog {
  const log = makeLog({ records, channels: CHANNELS });
  if (loseTimes) log.timeMs.fill(NaN);
  const built = buildLog(log, MACHINE);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

const twoPasses = (hasSpeed: boolean, secondStartS: number) => [
  ...slowThenFast({ eastM: 0, south: false, startS: 0, hasSpeed }),
  ...slowThenFast({ eastM: 6, south: true, startS: secondStartS, hasSpeed }),
];

describe("a change of speed", () => {
  for (const hasSpeed of [true, false]) {
    for (const [turn, secondStartS] of [
      ["driven in a second", 126],
      ["of a minute", 190],
    ] as const) {
      it(`does not end a pass, ${hasSpeed ? "with" : "without"} logged speed, with a turn ${turn}`, () => {
        const placed = place(twoPasses(hasSpeed, secondStartS));
        expect(placed.passes.map((pass) => pass.records)).toEqual([126, 126]);
        const distances = rowDistances(placed);
        const force = rowStatistics(placed, "downforce", { distances }).items[1]!;
        expect(Math.abs(force.distanceM - 400)).toBeLessThan(8);
        expect(Math.abs(force.mean! - 300)).toBeLessThan(4);
        const margin = rowStatistics(placed, "margin", { distances }).items[1]!;
        expect(margin.shareUnderTarget!).toBeCloseTo(0.5, 1);
      });
    }
  }

  it("leaves the headings of the fast half along the pass", () => {
    const placed = place(twoPasses(false, 190));
    for (let record = 0; record < 126; record++) expect(placed.headingDeg[record]).toBeCloseTo(0, 1);
  });

  it("is judged by distance alone in a log without times", () => {
    expect(place(twoPasses(false, 190), true).passes.length).toBeGreaterThan(2);
  });
});

describe("a jump of the position", () => {
  it("still ends a pass, and a stray position still stands nowhere", () => {
    const first = slowThenFast({ eastM: 0, south: false, startS: 0, hasSpeed: false });
    const jumped = first.map((record, i) => (i >= 60 ? { ...record, eastM: 60 } : record));
    expect(place(jumped).passes.map((pass) => pass.records)).toEqual([60, 66]);
    const stray = first.map((record, i) => (i === 110 ? { ...record, eastM: 30 } : record));
    const placed = place(stray);
    expect(placed.passes.map((pass) => pass.records)).toEqual([126]);
    expect(placed.passOf[110]).toBe(0);
    expect(placed.passes[0]!.lengthM).toBeCloseTo(200, 1);
  });
});

describe("a pass of a single record", () => {
  /** One second apart, each in a pass of its own by the log's own numbers. */
  const single = (hasSpeed: boolean) =>
    Array.from({ length: 40 }, (_, i) => ({
      eastM: 0,
      northM: 2 * i,
      timeS: i,
      pass: i < 20 ? 1 : i,
      speedMps: hasSpeed ? 2 : undefined,
    }));

  it("counts for what the machine drove in the step beside it", () => {
    for (const hasSpeed of [true, false]) {
      const placed = place(single(hasSpeed));
      expect(placed.passes).toHaveLength(21);
      const distances = rowDistances(placed);
      expect(distances[25 * 4 + 1]).toBeCloseTo(2, 3);
      expect(distances[39 * 4 + 1]).toBeCloseTo(2, 3);
    }
  });

  it("is told of, first of all, where more than a fifth of the passes are", () => {
    const many = buildLog(makeLog({ records: single(false), channels: CHANNELS }), MACHINE);
    expect(many.ok && many.value.notes[0]).toMatchObject({
      code: "passes-of-one-record",
      count: 20,
      message: expect.stringContaining("20 of 21 passes are a single record"),
    });
    const few = buildLog(makeLog({ records: twoPasses(false, 190), channels: CHANNELS }), MACHINE);
    expect(few.ok && few.value.notes.map((note) => note.code)).not.toContain("passes-of-one-record");
  });

  it("counts for nothing where no time says how far it was, or the record beside it is a long way back in time", () => {
    const records = twoPasses(false, 190);
    const lone = place([
      ...records,
      { eastM: 200, northM: 0, timeS: 900 },
      ...slowThenFast({ eastM: 300, south: false, startS: 2000, hasSpeed: false }),
    ]);
    expect(lone.passes).toHaveLength(4);
    expect(rowDistances(lone)[252 * 4]).toBe(0);
  });
});
