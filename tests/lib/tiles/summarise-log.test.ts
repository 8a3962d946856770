import { describe, expect, it } from "vitest";
import { summariseLog } from "@/lib/tiles/summarise-log";
import { placeStraightPasses, type StraightPasses } from "./place-straight-passes";

const LOG: StraightPasses = {
  centre: [-98.612, 38.417],
  headingDeg: 0,
  passes: 3,
  recordsPerPass: 40,
  stepM: 2,
  rows: 4,
  rowSpacingM: 0.25,
};

describe("summariseLog", () => {
  it("lays passes end to end and means what each column covers", () => {
    const { placed, channel } = placeStraightPasses({
      ...LOG,
      value: (pass, record, row) => pass * 100 + record + row / 10,
    });
    const summary = summariseLog(placed, channel, 60);
    expect(summary.passes).toEqual([
      { pass: 1, from: 0, to: 20 },
      { pass: 2, from: 20, to: 40 },
      { pass: 3, from: 40, to: 60 },
    ]);
    // 40 records in 20 columns: the first column means records 0 and 1, the last records 38 and 39 (hand-worked).
    expect(summary.values[0]![0]).toBeCloseTo(100 + 0.5 + 0.1, 4);
    expect(summary.values[3]![59]).toBeCloseTo(300 + 38.5 + 0.4, 4);
  });

  it("leaves a column empty where nothing was logged, and gives a short pass one column", () => {
    const { placed, channel } = placeStraightPasses({ ...LOG, value: (pass) => (pass === 2 ? NaN : 7) });
    placed.passes[2]!.lengthM = 0.1;
    const summary = summariseLog(placed, channel, 10);
    expect(summary.values[1]![summary.passes[1]!.from]).toBeNaN();
    expect(summary.passes[2]!.to - summary.passes[2]!.from).toBe(1);
    expect(summary.histogram.counts.reduce((a, b) => a + b)).toBe(2 * 40 * 4);
  });

  it("counts steps evenly also where bins and steps are out of tune", () => {
    // 160 steps of 0.5, alike often, in 100 bins: 1.6 steps a bin.
    const { placed, channel } = placeStraightPasses({ ...LOG, value: (_, record, row) => 0.5 * (record * 4 + row) });
    const { counts } = summariseLog(placed, { ...channel, resolution: 0.5 }, 60).histogram;
    const each = (3 * 160) / counts.length;
    for (const count of counts) expect(Math.abs(count - each)).toBeLessThanOrEqual(1);
  });

  it("leaves out what was logged while lifted", () => {
    const { placed, channel } = placeStraightPasses({ ...LOG, value: () => 5 });
    placed.passes.pop();
    channel.values.fill(-999, 80 * 4);
    const { histogram } = summariseLog(placed, channel, 60);
    expect(histogram.minimum).toBeGreaterThan(0);
  });
});
