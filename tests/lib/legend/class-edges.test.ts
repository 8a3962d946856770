import { describe, expect, it } from "vitest";
import {
  areClassEdges,
  classOf,
  edgesAroundTarget,
  equalEdges,
  histogramOf,
  quantileEdges,
} from "@/lib/legend/class-edges";

describe("class edges", () => {
  it("put an edge into the class above", () => {
    expect([-5, 179.9, 180, 489, 490, 2000].map((value) => classOf(value, [180, 490, 890]))).toEqual([
      0, 0, 1, 1, 2, 3,
    ]);
  });

  it("are refused when they do not rise or are not numbers", () => {
    expect(areClassEdges([1, 2, 3])).toBe(true);
    expect(areClassEdges([1, 1])).toBe(false);
    expect(areClassEdges([2, 1])).toBe(false);
    expect(areClassEdges([NaN])).toBe(false);
    expect(areClassEdges([])).toBe(false);
  });

  it("cut a range evenly", () => {
    expect(equalEdges(0, 100, 5)).toEqual([20, 40, 60, 80]);
    expect(equalEdges(3, 3, 5)).toEqual([3]);
  });

  it("put as many readings in each class by quantiles", () => {
    // 1000 values, skewed: v = (i / 1000)^2 * 100; the q-quantile is 100 q^2 (hand-worked).
    const values = Float32Array.from({ length: 1000 }, (_, i) => (i / 1000) ** 2 * 100);
    const edges = quantileEdges(histogramOf(values, 0, 100, 400), 4);
    expect(edges[0]).toBeCloseTo(6.25, 0);
    expect(edges[1]).toBeCloseTo(25, 0);
    expect(edges[2]).toBeCloseTo(56.25, 0);
  });

  it("keep quantiles apart where most readings are alike", () => {
    const values = new Float32Array(100).fill(5);
    expect(areClassEdges(quantileEdges(histogramOf(values, 0, 10, 10), 5))).toBe(true);
  });

  it("count every finite value once", () => {
    const { counts } = histogramOf(Float32Array.of(0, 1, 10, NaN, 9.99), 0, 10, 10);
    expect(counts).toEqual([1, 1, 0, 0, 0, 0, 0, 0, 0, 2]);
  });

  it("hold a target in the middle of the middle class, with an edge where readings count as under target", () => {
    expect(edgesAroundTarget(450, 100)).toEqual([250, 350, 400, 500, 550, 650]);
  });
});
