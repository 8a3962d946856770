import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { quantileType7, sortFinite } from "@/lib/statistics/quantile";
import { selectQuantiles } from "@/lib/statistics/select-quantiles";
import { weightedMean } from "@/lib/statistics/weighted-mean";
import { weightedMoments } from "@/lib/statistics/weighted-moments";
import { weightedQuantile, weightedQuantileLower } from "@/lib/statistics/weighted-quantile";
import { weightedSd } from "@/lib/statistics/weighted-sd";
import { LEVELS, S10 } from "./samples";

const WEIGHTS = [1, 2, 1, 0.5, 3, 1, 2, 1, 0.25, 1.5];

describe("weighted statistics of s10", () => {
  it("mean agrees with R 4.2.2 weighted.mean", () => {
    expect(weightedMean(S10, WEIGHTS)).toBeCloseTo(3.82452830189, 10);
  });

  it("midpoint quantiles agree with numpy interp over (cum w - w / 2) / W", () => {
    const expected = [1.9325, 2.065, 2.825, 3.65, 4.391666667, 4.9775, 7.976666667];
    LEVELS.forEach((p, k) => expect(weightedQuantile(S10, WEIGHTS, p)).toBeCloseTo(expected[k]!, 8));
  });

  it("step quantiles are the smallest value whose cumulative weight reaches p (R 4.2.2)", () => {
    const expected = [1.9, 2.1, 2.7, 3.4, 4.4, 5.0, 8.8];
    LEVELS.forEach((p, k) => expect(weightedQuantileLower(S10, WEIGHTS, p)).toBe(expected[k]));
  });

  it("sd keeps its digits at a large offset (hand-worked: 1, 2, 3 with weights 1, 2, 1 has sd sqrt(0.5))", () => {
    expect(weightedSd([1, 2, 3], [1, 2, 1])).toBeCloseTo(Math.SQRT1_2, 12);
    expect(weightedSd([1e9 + 1, 1e9 + 2, 1e9 + 3], [1, 2, 1])).toBeCloseTo(Math.SQRT1_2, 6);
  });

  it("leaves out NaN and readings without weight", () => {
    expect(weightedMean([1, NaN, 5], [1, 1, 0])).toBe(1);
    expect(weightedMean([], [])).toBeNaN();
    expect(weightedQuantile([NaN], [1], 0.5)).toBeNaN();
  });
});

const readings = fc.array(
  fc.record({
    value: fc.oneof(fc.float({ min: -2000, max: 2000, noNaN: true }), fc.integer({ min: 0, max: 5 }), fc.constant(NaN)),
    weight: fc.float({ min: 0, max: 3, noNaN: true }),
  }),
  { minLength: 1, maxLength: 400 },
);

describe("selectQuantiles", () => {
  it("gives what a full sort gives, on any readings", () => {
    fc.assert(
      fc.property(readings, (list) => {
        const values = Float32Array.from(list, (one) => one.value);
        const weights = Float32Array.from(list, (one) => one.weight);
        const found = selectQuantiles(values, weights, LEVELS);
        LEVELS.forEach((p, k) => {
          const sorted = weightedQuantile(Array.from(values), Array.from(weights), p);
          if (Number.isNaN(sorted)) expect(found.quantiles[k]).toBeNaN();
          else expect(found.quantiles[k]).toBeCloseTo(sorted, 3);
        });
      }),
      { seed: 7, numRuns: 300 },
    );
  });

  it("needs no sort for a log's rounded readings, and gives what a full sort gives", () => {
    const rounded = fc.record({
      step: fc.constantFrom(1, 10, 0.1, 4.4482216152605, 0.001),
      list: fc.array(
        fc.record({ steps: fc.integer({ min: -60, max: 60 }), weight: fc.double({ min: 0, max: 2, noNaN: true }) }),
        {
          minLength: 1,
          maxLength: 300,
        },
      ),
    });
    fc.assert(
      fc.property(rounded, ({ step, list }) => {
        const values = Float32Array.from(list, (one) => one.steps * step);
        const weights = Float32Array.from(list, (one) => one.weight);
        const found = selectQuantiles(values, weights, LEVELS);
        LEVELS.forEach((p, k) => {
          const sorted = weightedQuantile(Array.from(values), Array.from(weights), p);
          if (Number.isNaN(sorted)) expect(found.quantiles[k]).toBeNaN();
          else expect(Math.abs(found.quantiles[k]! - sorted)).toBeLessThan(1e-6 * step);
        });
      }),
      { seed: 11, numRuns: 300 },
    );
  });

  it("is the plain median where all weights are equal", () => {
    const values = Float32Array.from({ length: 4001 }, (_, i) => Math.fround(Math.sin(i * 12.9898) * 43758.5453) % 500);
    const found = selectQuantiles(values, new Float32Array(4001).fill(0.5), [0.5]);
    expect(found.quantiles[0]).toBeCloseTo(quantileType7(sortFinite(values), 0.5), 6);
  });
});

describe("weightedMoments", () => {
  it("gives the very numbers of weightedMean and weightedSd, on any readings", () => {
    fc.assert(
      fc.property(readings, (list) => {
        const values = Float32Array.from(list, (one) => one.value);
        const weights = Float32Array.from(list, (one) => one.weight);
        const { mean, sd } = weightedMoments(values, weights);
        expect(mean).toBe(weightedMean(values, weights));
        expect(sd).toBe(weightedSd(values, weights));
      }),
      { seed: 13, numRuns: 300 },
    );
  });
});
