import { describe, expect, it } from "vitest";
import { comparedSide, figureOf, wholeFigure } from "@/lib/comparison/compared-side";
import { beyondOthers, differenceInterval, studentT975 } from "@/lib/comparison/difference-interval";
import { planBlocks } from "@/lib/comparison/plan-blocks";
import { niceStep } from "@/lib/comparison/nice-step";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { madeSide, ROWS } from "./made-comparison";

describe("blocks of passes", () => {
  it("are single passes where neighbours have nothing in common", () => {
    const { normal } = createSeededRandom(11, "white");
    const white = Float64Array.from({ length: 400 }, () => normal());
    expect(planBlocks([white])).toMatchObject({ passesPerBlock: 1, blocks: 400 });
  });

  it("are as long as the correlation asks: (1 + 0.6) / (1 - 0.6) = 4", () => {
    const { normal } = createSeededRandom(12, "drift");
    let value = 0;
    const drift = Float64Array.from({ length: 4000 }, () => (value = 0.6 * value + normal()));
    const planned = planBlocks([drift]);
    expect(planned.correlation).toBeCloseTo(0.6, 1);
    expect(planned.passesPerBlock).toBe(4);
    expect(planned.blocks).toBe(1000);
  });

  it("leave out passes without readings", () => {
    expect(planBlocks([Float64Array.of(1, NaN, 3, 1, NaN)])).toMatchObject({ blocks: 3 });
    expect(planBlocks([new Float64Array(0)]).blocks).toBe(0);
  });
});

describe("intervals", () => {
  it("use Student's t (R 4.2.2 qt(0.975, df))", () => {
    // qt(0.975, c(4, 7, 14, 30)) = 2.776445 2.364624 2.144787 2.042272
    expect(studentT975(4)).toBeCloseTo(2.776, 1);
    expect(studentT975(7)).toBeCloseTo(2.364624, 2);
    expect(studentT975(14)).toBeCloseTo(2.144787, 3);
    expect(studentT975(30)).toBeCloseTo(2.042272, 4);
  });

  const LOGS = 150;
  const pairs = Array.from({ length: LOGS }, (_, k) => {
    const side = (seed: number, label: string) => comparedSide(madeSide({ passes: 12, seed }), { label, centre: 450 });
    return [side(1000 + 2 * k, "before"), side(1001 + 2 * k, "after")] as const;
  });

  it("hold the true difference in 90 to 99 of 100 pairs of twelve passes", () => {
    const given = pairs.flatMap(([a, b]) => {
      const interval =
        a.whole.drawn && b.whole.drawn && differenceInterval(wholeFigure(a, "mean"), wholeFigure(b, "mean"));
      return interval ? [interval] : [];
    });
    expect(given.length).toBeGreaterThan(LOGS / 2);
    const held = given.filter(([low, high]) => low <= 0 && high >= 0).length / given.length;
    expect(held).toBeGreaterThanOrEqual(0.9);
    expect(held).toBeLessThanOrEqual(0.99);
  });

  it("name a row that did not change in at most one pair in ten, over all rows together", () => {
    const given = pairs.filter(([a, b]) => a.rows.drawn && b.rows.drawn);
    const wrong = given.filter(([a, b]) => {
      const rows = Array.from({ length: ROWS }, (_, row) => row);
      const beyond = beyondOthers(
        rows.map((row) => figureOf(a, a.rows, row)),
        rows.map((row) => figureOf(b, b.rows, row)),
      );
      return beyond.some((row) => row && (row.interval[0] > 0 || row.interval[1] < 0));
    });
    expect(wrong.length / given.length).toBeLessThanOrEqual(0.1);
  });
});

describe("steps of classes", () => {
  it("are round and never smaller than asked", () => {
    expect([0.3, 1, 1.1, 2.2, 3, 7, 70].map(niceStep)).toEqual([0.5, 1, 2, 2.5, 5, 10, 100]);
  });
});
