import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { median } from "@/lib/statistics/median";
import { medianOfOthers, middleReadings } from "@/lib/statistics/middle-readings";

const record = fc.array(fc.oneof(fc.integer({ min: -4, max: 4 }), fc.constant(NaN)), { minLength: 9, maxLength: 9 });

describe("medianOfOthers", () => {
  it("is the median of the record without the reading itself, on any record", () => {
    fc.assert(
      fc.property(fc.array(record, { minLength: 1, maxLength: 5 }), (records) => {
        const middles = middleReadings(Float32Array.from(records.flat()), 9);
        records.forEach((values, r) =>
          values.forEach((value, row) => {
            if (Number.isNaN(value)) return;
            const others = values.filter((other, k) => k !== row && !Number.isNaN(other));
            const found = medianOfOthers(middles, r, value);
            if (others.length === 0) expect(found).toBeNaN();
            else expect(found).toBeCloseTo(median(others), 9);
          }),
        );
      }),
      { seed: 5, numRuns: 300 },
    );
  });

  it("keeps to it where the ground drifts, jumps and leaves readings out over many records", () => {
    const rows = 24;
    const noise = (i: number) => ((Math.imul(i + 1, 2654435761) >>> 8) % 1000) / 10;
    const values = Float32Array.from({ length: 900 * rows }, (_, i) => {
      const record = Math.floor(i / rows);
      if (i % 97 === 0) return NaN;
      return Math.round((record > 500 ? 900 : 100) + record * 0.5 + noise(i) * (record % 300 < 20 ? 0 : 1));
    });
    const middles = middleReadings(values, rows);
    const differing = values.findIndex((value, i) => {
      if (Number.isNaN(value)) return false;
      const from = i - (i % rows);
      const others = [...values.subarray(from, from + rows)].filter((one, k) => k !== i % rows && !Number.isNaN(one));
      return medianOfOthers(middles, Math.floor(i / rows), value) !== median(others);
    });
    expect(differing).toBe(-1);
  });
});
