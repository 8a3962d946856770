import { describe, expect, it } from "vitest";
import { axialDifferenceDeg, axialMean, circularMean, turnDegrees } from "@/lib/geo/circular-mean";

describe("circularMean", () => {
  // scipy 1.10.1: atan2(sum w sin, sum w cos), sd = sqrt(-2 ln R)
  it.each([
    { angles: [350, 355, 0, 5, 20], weights: undefined, mean: 1.9612469172, r: 0.9839543512, sd: 10.3055260862 },
    { angles: [88, 91, 93, 89.5, 270], weights: undefined, mean: 90.5000127009, r: 0.5995888277, sd: 57.9515666379 },
    { angles: [350, 10, 40], weights: [1, 2, 1], mean: 12.3770508441, r: 0.9522488946, sd: 17.9233863032 },
  ])("agrees with scipy on $angles", ({ angles, weights, mean, r, sd }) => {
    const found = circularMean(angles, weights);
    expect(found?.meanDeg).toBeCloseTo(mean, 8);
    expect(found?.resultant).toBeCloseTo(r, 9);
    expect(found?.sdDeg).toBeCloseTo(sd, 7);
  });

  it("takes 359 and 1 for north, not south (hand-worked)", () => {
    const found = circularMean([359, 1]);
    expect(Math.abs(turnDegrees(0, found?.meanDeg ?? NaN))).toBeLessThan(1e-9);
    expect(found?.resultant).toBeCloseTo(0.9998476952, 9);
    expect(found?.sdDeg).toBeCloseTo(1.0000253865, 8);
  });

  it("has no mean where directions cancel or none is known", () => {
    expect(circularMean([0, 180])).toBeNull();
    expect(circularMean([NaN])).toBeNull();
    expect(circularMean([10, 20], [0, 0])).toBeNull();
  });

  it("leaves NaN out", () => {
    expect(circularMean([NaN, 90])?.meanDeg).toBeCloseTo(90, 12);
  });
});

describe("axialMean", () => {
  // scipy 1.10.1 on doubled angles
  it.each([
    { angles: [2, 182, 358, 179], mean: 0.2501334429, r: 0.9980587881 },
    { angles: [45, 225, 46, 224], mean: 45, r: 0.9996954135 },
  ])("agrees with scipy on $angles", ({ angles, mean, r }) => {
    expect(axialMean(angles)?.meanDeg).toBeCloseTo(mean, 8);
    expect(axialMean(angles)?.resultant).toBeCloseTo(r, 9);
  });
});

describe("turnDegrees and axialDifferenceDeg", () => {
  it("turn the short way (hand-worked)", () => {
    expect(turnDegrees(350, 10)).toBeCloseTo(20, 12);
    expect(turnDegrees(10, 350)).toBeCloseTo(-20, 12);
    expect(axialDifferenceDeg(2, 178)).toBeCloseTo(4, 12);
    expect(axialDifferenceDeg(90, 271)).toBeCloseTo(1, 12);
  });
});
