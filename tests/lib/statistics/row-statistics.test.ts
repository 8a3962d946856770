import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import type { Seeder } from "@/lib/machines/machine";
import { rowDistances } from "@/lib/rows/row-distances";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { LARKSPUR } from "@/lib/simulator/scenario/larkspur";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { makeLog, makeSeeder, straightTrack, type MadeLog } from "@/tests/support/make-log";

function place(made: MadeLog, machine: Seeder | null) {
  const built = buildLog(makeLog(made), machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** Steps of 1 m for the first half, 0.5 m for the second: half the readings stand for two thirds of the ground. */
const uneven = Array.from({ length: 60 }, (_, i) => ({
  eastM: 0,
  northM: i < 30 ? i : 29 + (i - 29) * 0.5,
  timeS: i * 0.4,
}));

describe("rowStatistics", () => {
  it("weighs by the distance each reading stands for (hand-worked)", () => {
    const placed = place(
      { records: uneven, channels: [{ id: "downforce", value: (i) => (i < 30 ? 600 : 900) }] },
      makeSeeder(),
    );
    const distances = rowDistances(placed);
    expect(distances[0]).toBeCloseTo(1, 4);
    const [row] = rowStatistics(placed, "downforce").items;
    // 30 m at 600 N, 15 m at 900 N.
    expect(row?.n).toBe(60);
    expect(row?.distanceM).toBeCloseTo(45, 3);
    expect(row?.mean).toBeCloseTo(700, 2);
    expect(row?.sd).toBeCloseTo(Math.sqrt((30 * 100 ** 2 + 15 * 200 ** 2) / 45), 2);
    expect([row?.min, row?.p05, row?.p50, row?.p95, row?.max]).toEqual([600, 600, 600, 900, 900]);
  });

  it("takes shares and the longest stretch from the machine's target, deadband and limit (hand-worked)", () => {
    const machine = makeSeeder({ targetMarginN: 450, marginDeadbandN: 100, maxDownforceN: 1000 });
    const margin = (i: number) => (i >= 10 && i < 20 ? 349 : i >= 40 && i < 44 ? -2 : 350);
    const placed = place(
      {
        records: straightTrack({ from: [0, 0], headingDeg: 0, records: 100 }),
        channels: [
          { id: "margin", value: margin },
          { id: "downforce", value: (i) => (i < 25 ? 990 : 989) },
        ],
      },
      machine,
    );
    const row = rowStatistics(placed, "margin").items[0]!;
    expect(row.shareUnderTarget).toBeCloseTo(0.14, 6);
    expect(row.longestUnderTargetM).toBeCloseTo(5, 3);
    expect(row.shareContactLost).toBeCloseTo(0.04, 6);
    expect(row.shareAtLimit).toBeNull();
    const force = rowStatistics(placed, "downforce").items[0]!;
    expect(force.shareAtLimit).toBeCloseTo(0.25, 6);
    expect(force.shareUnderTarget).toBeNull();
    expect(force.longestUnderTargetM).toBeNull();
  });

  it("takes the log's own rounding for the limit where that is coarser than 1 % (hand-worked)", () => {
    const value = (i: number) => (i < 50 ? 980 : 979);
    const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 100 });
    const placed = place(
      { records, channels: [{ id: "downforce", value, resolution: 20 }] },
      makeSeeder({ maxDownforceN: 1000 }),
    );
    expect(rowStatistics(placed, "downforce").items[0]!.shareAtLimit).toBeCloseTo(0.5, 6);
  });

  it("keeps missing readings missing", () => {
    const value = (i: number, row: number) => (row === 2 ? NaN : i === 3 ? NaN : 500);
    const placed = place({ records: uneven, channels: [{ id: "margin", value }] }, null);
    const items = rowStatistics(placed, "margin").items;
    expect(items[1]).toMatchObject({ n: 0, mean: null, sd: null, min: null, p50: null, distanceM: 0 });
    expect(items[0]).toMatchObject({ n: 59, mean: 500, min: 500, shareUnderTarget: null });
  });

  it("averages what contact leaves to full", () => {
    const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 100 });
    const channels: MadeLog["channels"] = [{ id: "contact", unit: "fraction", value: (i) => (i < 20 ? 0.5 : 1) }];
    expect(rowStatistics(place({ records, channels }, null), "contact").items[0]!.shareContactLost).toBeCloseTo(0.1, 6);
  });

  it("refuses a channel the log has not, with the reason", () => {
    const placed = place({ records: uneven, channels: [{ id: "margin", value: () => 1 }] }, null);
    expect(() => rowStatistics(placed, "resistance")).toThrow(/force applied to each row/);
  });

  it.each([11, 12, 13])("means are within half a percent of the simulated truth, seed %d", (seed) => {
    const { log, truth } = simulateSeedingLog({ ...LARKSPUR.fields[0]!.seeding.input, seed });
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    for (const channel of truth.channels) {
      const { items } = rowStatistics(built.value.placed, channel.id);
      for (const row of channel.rows) {
        const item = items[row.row - 1]!;
        expect(Math.abs(item.mean! / row.mean - 1)).toBeLessThan(0.005);
        expect(Math.abs(item.sd! / row.sd - 1)).toBeLessThan(0.005);
        expect(item.n).toBe(row.n);
      }
    }
  });
});
