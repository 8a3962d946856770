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
});
