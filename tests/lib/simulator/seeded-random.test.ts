import { describe, expect, it } from "vitest";
import { createSeededRandom } from "@/lib/simulator/seeded-random";

const DRAWS = 20_000;

describe("createSeededRandom", () => {
  it("repeats its numbers for the same seed and label", () => {
    const first = createSeededRandom(3, "soil");
    const again = createSeededRandom(3, "soil");
    for (let draw = 0; draw < 50; draw += 1) expect(again.uniform()).toBe(first.uniform());
  });

  it("gives every label a stream of its own", () => {
    const soil = createSeededRandom(3, "soil");
    const speed = createSeededRandom(3, "speed");
    let product = 0;
    for (let draw = 0; draw < DRAWS; draw += 1) product += soil.normal() * speed.normal();
    // Unrelated streams: the mean product has standard error 1 / sqrt(20 000) = 0.007.
    expect(Math.abs(product / DRAWS)).toBeLessThan(0.03);
  });

  it("draws evenly in [0, 1) with mean 1/2 and variance 1/12", () => {
    const random = createSeededRandom(11, "even");
    const values = Array.from({ length: DRAWS }, () => random.uniform());
    const mean = values.reduce((sum, value) => sum + value, 0) / DRAWS;
    const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / DRAWS;
    expect(Math.min(...values)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...values)).toBeLessThan(1);
    expect(Math.abs(mean - 0.5)).toBeLessThan(0.01);
    expect(Math.abs(variance - 1 / 12)).toBeLessThan(0.003);
  });

  it("draws normal numbers with mean 0, variance 1 and 5 % beyond 1.96", () => {
    const random = createSeededRandom(12, "normal");
    const values = Array.from({ length: DRAWS }, () => random.normal());
    const mean = values.reduce((sum, value) => sum + value, 0) / DRAWS;
    const variance = values.reduce((sum, value) => sum + value ** 2, 0) / DRAWS;
    const beyond = values.filter((value) => Math.abs(value) > 1.96).length / DRAWS;
    expect(Math.abs(mean)).toBeLessThan(0.03);
    expect(Math.abs(variance - 1)).toBeLessThan(0.04);
    expect(Math.abs(beyond - 0.05)).toBeLessThan(0.008);
  });
});
