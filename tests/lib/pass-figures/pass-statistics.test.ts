import { describe, expect, it } from "vitest";
import { passStatistics } from "@/lib/pass-figures/pass-statistics";
import type { PassComparison, PassStatisticsBody } from "@/lib/schemas/pass-figures";
import { LARKSPUR } from "@/lib/simulator/scenario/larkspur";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { straightTrack, type MadeRecord } from "@/tests/support/make-log";
import { backAndForth, onGround, placeOnGround } from "./made-log";

const RECORDS = 121;
const comparison = (body: PassStatisticsBody, by: PassComparison["by"]) =>
  body.comparisons.find((candidate) => candidate.by === by)!;
const group = (compared: PassComparison, key: string) => compared.groups.find((one) => one.key === key)!;

describe("a channel pass by pass", () => {
  it("weighs each reading by its distance and counts shares of it (hand-worked)", () => {
    // 60 m a pass; the first quarter of each reads 300 N, the rest 500 N; target 450 less 100 N.
    const value = (record: number) => (record % RECORDS < 31 ? 300 : 500);
    const machine = { targetMarginN: 450, marginDeadbandN: 100 };
    const { items } = passStatistics(
      onGround({ records: backAndForth(3, RECORDS), channels: [{ id: "margin", value }] }, "margin", machine),
    );
    expect(items.map((item) => item.pass)).toEqual([1, 2, 3]);
    for (const item of items) {
      expect(item.n).toBe(4 * RECORDS);
      expect(item.lengthM).toBeCloseTo(60, 2);
      // The first record stands for the half metre to the next: 31 of 121 equal weights.
      expect(item.shareUnderTarget).toBeCloseTo(31 / 121, 3);
      expect(item.mean).toBeCloseTo((31 * 300 + 90 * 500) / 121, 1);
      expect(item.sd).toBeCloseTo(200 * Math.sqrt((31 / 121) * (90 / 121)), 1);
      expect([item.p05, item.p50, item.p95]).toEqual([300, 500, 500]);
      expect(item.shareAtLimit).toBeNull();
      expect(item.shareContactLost).toBe(0);
      // 0.5 m in 0.2 s.
      expect(item.speedMps).toBeCloseTo(2.5, 2);
    }
  });

  it("leaves missing readings out and says nothing of a pass without any", () => {
    const value = (record: number) => (record < RECORDS ? NaN : 400);
    const { items } = passStatistics(
      onGround({ records: backAndForth(2, RECORDS), channels: [{ id: "margin", value }] }, "margin"),
    );
    expect(items[0]).toMatchObject({ n: 0, distanceM: 0, mean: null, sd: null, p50: null, shareUnderTarget: null });
    expect(items[1]).toMatchObject({ mean: 400, sd: 0 });
  });
});

describe("passes driven either way", () => {
  const body = (passes: number) =>
    passStatistics(
      onGround(
        {
          records: backAndForth(passes, RECORDS),
          // 40 N more on the way back, and a little of its own in each pass.
          channels: [{ id: "downforce", value: (r) => 600 + (Math.floor(r / RECORDS) % 2) * 40 + (r % RECORDS) * 0.1 }],
        },
        "downforce",
      ),
    );

  it("are told apart, with an interval that holds the true difference", () => {
    const compared = comparison(body(10), "direction");
    expect(compared.groups.map(({ key, passes }) => [key, passes])).toEqual([
      ["along", 5],
      ["against", 5],
    ]);
    expect(Math.abs(compared.difference!.value)).toBeCloseTo(40, 1);
    const [low, high] = compared.difference!.interval!;
    expect(low).toBeLessThanOrEqual(compared.difference!.value);
    expect(high).toBeGreaterThanOrEqual(compared.difference!.value);
    expect(compared.reason).toBeNull();
  });

  it("get no interval from fewer than eight, and it is said", () => {
    const compared = comparison(body(6), "direction");
    expect(compared.difference!.interval).toBeNull();
    expect(compared.reason).toBe("An interval needs 8 passes; this log has 6.");
  });

  it("cannot be compared where all go one way", () => {
    const oneWay = Array.from({ length: 9 }, (_, p) =>
      straightTrack({ from: [p * 6, 0], headingDeg: 0, records: 60, startS: p * 1000 }).map((record) => ({
        ...record,
        pass: p + 1,
        working: true,
      })),
    ).flat();
    const channels = [{ id: "downforce" as const, value: () => 600 }];
    const compared = comparison(passStatistics(onGround({ records: oneWay, channels }, "downforce")), "direction");
    expect(compared.difference).toBeNull();
    expect(compared.reason).toMatch(/^There is no pass driven .* way: too few to compare\.$/);
  });
});

describe("speed", () => {
  it("is cut into thirds of the distance", () => {
    // A third of the records each at 2, 3 and 4 m/s, half a metre apart throughout.
    const records = backAndForth(9, 120).map((record, i) => {
      const speedMps = 2 + Math.floor((i % 120) / 40);
      return { ...record, speedMps };
    });
    const channels = [{ id: "margin" as const, value: (r: number) => 500 - 50 * Math.floor((r % 120) / 40) }];
    const compared = comparison(passStatistics(onGround({ records, channels }, "margin")), "speed");
    expect(compared.groups.map(({ key }) => key)).toEqual(["slow", "middle", "fast"]);
    expect(group(compared, "slow").mean).toBeCloseTo(500, 0);
    expect(group(compared, "fast").mean).toBeCloseTo(400, 0);
    expect(compared.difference!.value).toBeCloseTo(-100, 0);
    expect(group(compared, "fast").speedMps).toBeCloseTo(4, 2);
  });

  it("that never changes is no ground for a comparison", () => {
    const records = backAndForth(9, 60).map((record) => ({ ...record, speedMps: 2.5 }));
    const channels = [{ id: "margin" as const, value: () => 500 }];
    const compared = comparison(passStatistics(onGround({ records, channels }, "margin")), "speed");
    expect(compared.groups).toEqual([]);
    expect(compared.reason).toBe("The speed never changed, or is not known.");
  });
});

/** Passes that run 40 m straight and then along an arc to the right of 12 m radius, in steps of half a metre. */
function arcs(passes: number): MadeRecord[] {
  return Array.from({ length: passes }, (_, p) => {
    const straight = straightTrack({ from: [p * 60, 0], headingDeg: 0, records: 81, startS: p * 1000 });
    const arc = Array.from({ length: 16 }, (_, k) => {
      const angle = ((k + 1) * 0.5) / 12;
      return {
        eastM: p * 60 + 12 * (1 - Math.cos(angle)),
        northM: 40 + 12 * Math.sin(angle),
        timeS: p * 1000 + (81 + k) * 0.2,
      };
    });
    return [...straight, ...arc].map((record) => ({ ...record, pass: p + 1, working: true }));
  }).flat();
}

describe("turns", () => {
  it("tell inner rows from outer ones, by what the same rows read going straight", () => {
    // Row 6 (rightmost, the inside of a right turn) always reads 90 N more; in the arc the outer third reads 60 N less.
    const rows = 6;
    const value = (record: number, row: number) => {
      const isTurning = record % 97 >= 81;
      return 500 + (row === 6 ? 90 : 0) - (isTurning && row <= 2 ? 60 : 0);
    };
    const made = { records: arcs(9), rows, channels: [{ id: "margin" as const, value }] };
    const compared = comparison(passStatistics(onGround(made, "margin", { rowCount: rows, rowSpacingM: 0.5 })), "turn");
    const outer = group(compared, "outer");
    const inner = group(compared, "inner");
    expect(inner.passes).toBe(9);
    expect(inner.fromStraight!).toBeCloseTo(0, 0);
    expect(outer.fromStraight!).toBeLessThan(-45);
    expect(outer.fromStraightInterval![1]).toBeLessThan(0);
    // v (1 - y / R): thirds of the rows stand 1 m from the middle on average, R 12 m, v 2.5 m/s.
    expect(outer.speedMps!).toBeCloseTo(2.5 * (1 + 1 / 12), 1);
    expect(inner.speedMps!).toBeCloseTo(2.5 * (1 - 1 / 12), 1);
  });

  it("are not found where the rows only ran straight", () => {
    const made = {
      records: backAndForth(9, 60),
      rows: 6,
      channels: [{ id: "margin" as const, value: () => 500 }],
    };
    const compared = comparison(passStatistics(onGround(made, "margin", { rowCount: 6 })), "turn");
    expect(compared.reason).toBe("No turn was driven with the rows down.");
  });
});

describe("the whole log", () => {
  it("is what its passes come to: means of passes, weighted by their distance, give the mean of all readings", () => {
    const { log, truth } = simulateSeedingLog({ ...LARKSPUR.fields[0]!.seeding.input, seed: 41 });
    const from = placeOnGround(log, truth.options.machine, "margin");
    const { items } = passStatistics(from);
    let [sum, weight] = [0, 0];
    for (let at = 0; at < from.channel.values.length; at++) {
      const value = from.channel.values[at]!;
      const record = Math.floor(at / from.channel.rows);
      if (!Number.isFinite(value) || from.placed.passOf[record] === 0) continue;
      sum += value * from.distances[at]!;
      weight += from.distances[at]!;
    }
    const passSum = items.reduce((total, item) => total + (item.mean ?? 0) * item.distanceM, 0);
    const passMetres = items.reduce((total, item) => total + item.distanceM, 0);
    expect(passSum / passMetres).toBeCloseTo(sum / weight, 4);
  });
});
