import { describe, expect, it } from "vitest";
import { equalDistanceEdges, sharesOfClasses } from "@/lib/legend/value-distribution";
import { weighValues } from "@/lib/tiles/weigh-values";
import { placeStraightPasses, type StraightPasses } from "./place-straight-passes";

const LOG: StraightPasses = {
  centre: [-98.612, 38.417],
  headingDeg: 0,
  passes: 1,
  recordsPerPass: 10,
  stepM: 2,
  rows: 2,
  rowSpacingM: 0.25,
};

const POUND_N = 4.4482216152605;

describe("weighValues", () => {
  it("gives each class its share of distance, not of readings", () => {
    const { placed, channel } = placeStraightPasses({ ...LOG, value: (_, record) => (record < 5 ? 100 : 200) });
    // The second half was driven three times as fast: 6 m between readings in place of 2 m.
    for (let record = 5; record < 10; record += 1) placed.originNorthM[record] = 8 + (record - 4) * 6;
    const distribution = weighValues(placed, channel);
    // Two rows: 5 readings of 2 m each at 100, 5 of 6 m each at 200 (hand-worked): 20 m and 60 m.
    expect(distribution.distancesM).toEqual([20, 60]);
    expect(sharesOfClasses(distribution, [150])).toEqual([0.25, 0.75]);
  });

  it("puts a value that lies on an edge into the class above, in pounds-force too", () => {
    const { placed, channel } = placeStraightPasses({ ...LOG, value: (_, record) => (90 + record) * POUND_N });
    const distribution = weighValues(placed, { ...channel, resolution: POUND_N });
    for (let edge = 91; edge < 100; edge += 1) {
      // Ten values, one a record, alike far: those from the edge on are above.
      expect(sharesOfClasses(distribution, [edge * POUND_N])[1]).toBeCloseTo((100 - edge) / 10, 6);
    }
    expect(sharesOfClasses(distribution, [95.5 * POUND_N])[1]).toBeCloseTo(0.4, 6);
  });

  it("keeps values between the steps apart, as a sum of two readings has them", () => {
    const { placed, channel } = placeStraightPasses({ ...LOG, value: (_, record) => 1000 + record * 0.5 });
    const distribution = weighValues(placed, { ...channel, resolution: 1 });
    expect(distribution.codes).toHaveLength(10);
    expect(sharesOfClasses(distribution, [1000.5])[0]).toBeCloseTo(0.1, 6);
  });

  it("leaves out what is missing and what was logged in no pass", () => {
    const { placed, channel } = placeStraightPasses({ ...LOG, value: (_, record) => (record === 3 ? NaN : 5) });
    placed.passOf[9] = 0;
    const distribution = weighValues(placed, channel);
    expect(distribution.codes).toHaveLength(1);
    expect(sharesOfClasses(distribution, [5])).toEqual([0, 1]);
  });
});

describe("equalDistanceEdges", () => {
  it("parts the distance as evenly as the values allow", () => {
    const distribution = { offset: 0, step: 1, codes: [1, 2, 3, 4], distancesM: [10, 10, 10, 10] };
    expect(equalDistanceEdges(distribution, 4)).toEqual([2, 3, 4]);
    expect(equalDistanceEdges(distribution, 2)).toEqual([3]);
    expect(equalDistanceEdges({ ...distribution, distancesM: [37, 1, 1, 1] }, 4)).toEqual([2]);
  });
});
