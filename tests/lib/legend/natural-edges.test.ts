import { describe, expect, it } from "vitest";
import { distanceHistogram } from "@/lib/legend/distance-histogram";
import { histogramOf } from "@/lib/legend/class-edges";
import { naturalEdges } from "@/lib/legend/natural-edges";
import { naturalBreaks } from "@/lib/statistics/natural-breaks";

/** v_i = round(100 frac(0.618... i)^2, 3), as anybody can make it again. */
const V = Array.from({ length: 60 }, (_, i) => Number((100 * ((0.6180339887498949 * (i + 1)) % 1) ** 2).toFixed(3)));

function tally(values: readonly number[], step: number) {
  const metres = new Map<number, number>();
  for (const value of values) metres.set(Math.round(value / step), (metres.get(Math.round(value / step)) ?? 0) + 1);
  const codes = [...metres.keys()].sort((a, b) => a - b);
  return { offset: 0, step, codes, distancesM: codes.map((code) => metres.get(code)!) };
}

describe("natural breaks weighted by distance", () => {
  it("are those of as many values where weights are whole numbers", () => {
    const values = [1, 2, 3.5, 8, 9, 9.5, 20, 21];
    const weights = [3, 1, 2, 1, 4, 1, 2, 1];
    const repeated = values.flatMap((value, i) => new Array<number>(weights[i]!).fill(value));
    for (const classes of [2, 3, 4]) {
      const plain = naturalBreaks(repeated, classes)!;
      const weighted = naturalBreaks(values, classes, weights)!;
      expect(weighted.upper).toEqual(plain.upper);
      expect(weighted.withinSumOfSquares).toBeCloseTo(plain.withinSumOfSquares, 9);
    }
  });

  // R 4.2.2, classInt 0.4-9: classIntervals(v, k, "fisher").
  it.each([[[30, 16, 14]], [[21, 12, 11, 9, 7]]])("group the 60 values as R does: %j", (expected) => {
    const edges = naturalEdges(tally(V, 0.001), expected.length);
    const sizes = expected.map(() => 0);
    for (const value of V) sizes[edges.filter((edge) => value >= edge - 1e-9).length]! += 1;
    expect(sizes).toEqual(expected);
  });

  it("move next to nothing where a long list of values is grouped", () => {
    const many = Array.from({ length: 40_000 }, (_, i) => [100, 500, 900][i % 3]! + ((i * 7919) % 1000) / 10);
    const [low, high] = naturalEdges(tally(many, 0.1), 3) as [number, number];
    // Three heaps of 100 wide from 100, 500 and 900 on (hand-worked): each edge begins a heap.
    expect(low).toBeCloseTo(500, 0);
    expect(high).toBeCloseTo(900, 0);
  });

  it("are fewer where values are few, and none without any", () => {
    expect(naturalEdges({ offset: 0, step: 1, codes: [3], distancesM: [2] }, 6)).toEqual([]);
    expect(naturalEdges({ offset: 0, step: 1, codes: [], distancesM: [] }, 6)).toEqual([]);
  });
});

describe("metres in bins", () => {
  it("add up to all that was driven, shared out over the bins that a step reaches (hand-worked)", () => {
    const distribution = { offset: 0, step: 1, codes: [0, 5, 10], distancesM: [4, 6, 2] };
    const histogram = histogramOf([0, 5, 10], 0, 10, 4);
    expect(distanceHistogram(distribution, histogram, null)).toEqual([4, 0, 6, 2]);
    // Bins of 2.5: 5 stands for 2.5 .. 7.5.
    const shared = distanceHistogram(distribution, histogram, 5);
    expect(shared).toEqual([4, 3, 3, 2]);
    expect(shared.reduce((a, b) => a + b)).toBe(12);
  });

  it("puts a channel that never changes into one bin", () => {
    const one = { offset: 5, step: 1, codes: [0], distancesM: [7] };
    expect(distanceHistogram(one, { minimum: 5, maximum: 5, counts: [1, 0] }, null)).toEqual([7, 0]);
  });
});
