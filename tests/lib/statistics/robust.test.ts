import { describe, expect, it } from "vitest";
import { huberLocation } from "@/lib/statistics/huber-location";
import { median } from "@/lib/statistics/median";
import { MAD_TO_SD, medianAbsoluteDeviation, robustSpread } from "@/lib/statistics/median-absolute-deviation";
import { naturalBreaks } from "@/lib/statistics/natural-breaks";
import { quantileType6, quantileType7, sortFinite } from "@/lib/statistics/quantile";
import { trimmedMean } from "@/lib/statistics/trimmed-mean";
import { H7, LEVELS, OATS, S10 } from "./samples";

// R 4.2.2 quantile(x, p, type = 6 | 7)
describe("quantiles", () => {
  it.each([
    ["s10", S10, quantileType6, [1.9, 1.92, 2.55, 3.75, 5.95, 9.61, 9.7]],
    ["s10", S10, quantileType7, [1.99, 2.08, 2.85, 3.75, 4.85, 8.89, 9.295]],
    ["oats", OATS, quantileType6, [61.65, 65.2, 86, 102.5, 121.75, 140.7, 156.35]],
    ["oats", OATS, quantileType7, [62.55, 68.2, 86, 102.5, 121.25, 139.3, 152.15]],
    ["h7", H7, quantileType6, [3, 3, 7, 9, 15, 21, 21]],
    ["h7", H7, quantileType7, [4.2, 5.4, 8, 9, 13.5, 17.4, 19.2]],
  ])("of %s", (_, sample, quantile, expected) => {
    const sorted = sortFinite(sample);
    LEVELS.forEach((p, k) => expect(quantile(sorted, p)).toBeCloseTo(expected[k]!, 9));
  });
});

describe("robust location and spread", () => {
  // R 4.2.2 mad(x), constant = 1 and 1.4826
  it.each([
    [S10, 1.15, 1.70499],
    [OATS, 18.5, 27.4281],
    [H7, 3, 4.4478],
  ])("MAD", (sample, raw, scaled) => {
    expect(medianAbsoluteDeviation(sample)).toBeCloseTo(raw, 9);
    expect(MAD_TO_SD * medianAbsoluteDeviation(sample)).toBeCloseTo(scaled, 9);
  });

  it("Huber's location agrees with R 4.2.2 MASS::huber, k 1.5", () => {
    expect(huberLocation(S10)).toBeCloseTo(4.00187060521, 5);
    expect(huberLocation(OATS)).toBeCloseTo(103.082556564, 5);
  });

  it("trimmed means agree with R 4.2.2 mean(x, trim)", () => {
    expect(trimmedMean(S10, 0.1)).toBeCloseTo(4.225, 9);
    expect(trimmedMean(S10, 0.2)).toBeCloseTo(3.81666667, 8);
    expect(trimmedMean(OATS, 0.1)).toBeCloseTo(103.0517241, 7);
    expect(trimmedMean(OATS, 0.2)).toBeCloseTo(103.3863636, 7);
  });

  it("falls back where more than half the values are equal, and gives up where all are (hand-worked)", () => {
    expect(robustSpread([5, 5, 5, 5, 9])).toBeCloseTo(1.2533 * 0.8, 9);
    expect(robustSpread([5, 5, 5])).toBeNull();
  });

  it("leaves NaN out, and has no median of nothing", () => {
    expect(median([NaN, 3, 1])).toBe(2);
    expect(median([])).toBeNaN();
  });
});

describe("naturalBreaks", () => {
  // R 4.2.2 classInt 0.4-9 classIntervals(x, k, "fisher"): group sizes and within sum of squares
  it.each([
    [OATS, [26, 33, 13], 9107.109557],
    [OATS, [13, 27, 24, 8], 4192.206553],
    [OATS, [13, 14, 17, 20, 8], 2780.540789],
  ])("oats", (sample, sizes, within) => {
    const found = naturalBreaks(sample, sizes.length);
    expect(found?.sizes).toEqual(sizes);
    expect(found?.withinSumOfSquares).toBeCloseTo(within, 5);
  });

  it("s10 and the fractions agree with classInt", () => {
    expect(naturalBreaks(S10, 2)?.withinSumOfSquares).toBeCloseTo(8.88375, 8);
    expect(naturalBreaks(S10, 3)?.withinSumOfSquares).toBeCloseTo(2.673, 8);
    const v = Array.from({ length: 60 }, (_, i) => {
      const product = 0.6180339887498949 * (i + 1);
      return Number((100 * (product - Math.floor(product)) ** 2).toFixed(3));
    });
    expect(v.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1996.452, 6);
    expect(naturalBreaks(v, 3)?.sizes).toEqual([30, 16, 14]);
    expect(naturalBreaks(v, 3)?.withinSumOfSquares).toBeCloseTo(5083.733165, 5);
    expect(naturalBreaks(v, 5)?.sizes).toEqual([21, 12, 11, 9, 7]);
  });
});
