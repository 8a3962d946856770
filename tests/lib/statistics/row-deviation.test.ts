import { describe, expect, it } from "vitest";
import { deviationFromOthers, scoreRows } from "@/lib/statistics/row-deviation";

describe("deviationFromOthers", () => {
  it("takes the median of the other rows, not of all (hand-worked)", () => {
    // Others of 10 are 20, 30, 70: median 30. Others of 70 are 10, 20, 30: median 20.
    expect(Array.from(deviationFromOthers(Float32Array.of(10, 70, 20, 30), 4))).toEqual([-20, 50, -10, 10]);
    // Five rows: others of 5 are 1, 2, 8, 9: median 5.
    expect(Array.from(deviationFromOthers(Float32Array.of(5, 1, 9, 2, 8), 5))).toEqual([0, -5.5, 5.5, -4.5, 4.5]);
  });

  it("leaves missing rows out of the others and without a deviation themselves", () => {
    const found = deviationFromOthers(Float32Array.of(10, NaN, 20, 30, NaN, NaN, NaN, 4), 4);
    expect(Array.from(found)).toEqual([-15, NaN, 0, 15, NaN, NaN, NaN, NaN]);
  });
});

describe("scoreRows", () => {
  it("is the deviation from the median over rows in units of 1.4826 MAD (hand-worked)", () => {
    // Median 3; absolute deviations 2 1 0 1 17, MAD 1; the last row: 17 / 1.4826.
    const { z, deviation } = scoreRows([1, 2, 3, 4, 20]);
    expect(deviation[4]).toBe(17);
    expect(z[4]).toBeCloseTo(17 / 1.4826, 9);
    expect(z[0]).toBeCloseTo(-2 / 1.4826, 9);
  });

  it("falls back on the mean deviation where the MAD is 0, and says so where there is no spread", () => {
    const { z } = scoreRows([0, 0, 0, 0, 12]);
    expect(z[4]).toBeCloseTo(12 / (1.2533 * 2.4), 9);
    const flat = scoreRows([3, 3, 3, 3, 3]);
    expect(flat.z).toEqual([null, null, null, null, null]);
    expect(flat.reason).toContain("no spread");
  });

  it("ranks nothing under five rows", () => {
    expect(scoreRows([1, 2, 3, NaN, 90]).reason).toContain("only 4 rows");
  });

  // Rows 6, 7, 18 and 19 of 24 run in wheel tracks; the rest differ by a few newtons.
  const wobble = Array.from({ length: 24 }, (_, row) => ((row * 7) % 5) - 2);
  const tracked = wobble.map((value, row) => value - ([5, 6, 17, 18].includes(row) ? 80 : 0));

  it("compares wheel-track rows among themselves", () => {
    const { z, wheelTrackRows } = scoreRows(tracked);
    expect(wheelTrackRows).toEqual([6, 7, 18, 19]);
    for (const score of z) expect(Math.abs(score!)).toBeLessThan(3.5);
  });

  it("still finds a bad row among them, and leaves other rows' z as it was", () => {
    const bad = tracked.map((value, row) => value - (row === 17 ? 120 : 0));
    const { z, wheelTrackRows } = scoreRows(bad);
    expect(wheelTrackRows).toContain(18);
    expect(z.flatMap((score, row) => (Math.abs(score!) > 3.5 ? [row + 1] : []))).toEqual([18]);
    // The 24 values have median -0.5 and MAD 1.5: the plain score of a row outside the group.
    expect(z[0]).toBeCloseTo((wobble[0]! + 0.5) / (1.4826 * 1.5), 9);
  });

  it("takes one bad row and its sound mirror for no wheel track", () => {
    const { z, wheelTrackRows } = scoreRows(wobble.map((value, row) => value - (row === 16 ? 150 : 0)));
    expect(wheelTrackRows).toEqual([]);
    expect(z[16]).toBeLessThan(-3.5);
  });

  it("takes a broad block across the centre for no wheel track: a band driven along looks the same", () => {
    const block = wobble.map((value, row) => value + (row >= 8 && row <= 15 ? 200 : 0));
    const { z, wheelTrackRows } = scoreRows(block);
    expect(wheelTrackRows).toEqual([]);
    expect(z[10]).toBeGreaterThan(3.5);
  });

  it("takes four rows at either rim for no wheel track, two for one", () => {
    const rim = (count: number) => wobble.map((value, row) => value + (row < count || row >= 24 - count ? 200 : 0));
    expect(scoreRows(rim(4), { maxTrackRows: 4 }).wheelTrackRows).toEqual([]);
    expect(scoreRows(rim(2), { maxTrackRows: 4 }).wheelTrackRows).toEqual([1, 2, 23, 24]);
  });
});
