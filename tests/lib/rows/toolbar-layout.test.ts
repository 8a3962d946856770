import { describe, expect, it } from "vitest";
import { SeederInput } from "@/lib/machines/machine";
import { toolbarLayout, wingWords } from "@/lib/rows/toolbar-layout";
import type { RowStatisticsItem } from "@/lib/schemas/logs";
import { groupRows, rowsInWords } from "@/lib/statistics/group-rows";
import { makeSeeder } from "@/tests/support/make-log";

const DRILL = makeSeeder({ rowCount: 6, sections: [2, 4], wings: [2, 2, 2] });

describe("a toolbar's layout", () => {
  it("is that of the machine: offsets about the centre, wings and sections as runs of rows", () => {
    expect(toolbarLayout(6, DRILL)).toEqual({
      offsetM: [-0.625, -0.375, -0.125, 0.125, 0.375, 0.625],
      forwardM: [0, 0, 0, 0, 0, 0],
      wings: [
        { first: 1, last: 2 },
        { first: 3, last: 4 },
        { first: 5, last: 6 },
      ],
      sections: [
        { first: 1, last: 2 },
        { first: 3, last: 6 },
      ],
      known: true,
    });
  });

  it("is even and whole where no machine, or one with other rows, is named", () => {
    for (const machine of [null, DRILL]) {
      const layout = toolbarLayout(4, machine);
      expect(layout).toMatchObject({ known: false, wings: [{ first: 1, last: 4 }], sections: [] });
      expect(layout.offsetM).toEqual([-1.5, -0.5, 0.5, 1.5]);
    }
  });

  it("must add up to the machine's rows", () => {
    expect(SeederInput.safeParse(DRILL).success).toBe(true);
    expect(wingWords(1, 3)).toBe("centre");
    expect(wingWords(4, 5)).toBe("wing 5");
  });
});

describe("groups of rows", () => {
  const item = (row: number, mean: number, distanceM: number, share: number | null): RowStatisticsItem => ({
    row,
    n: 1,
    distanceM,
    mean,
    sd: 0,
    min: mean,
    p05: mean,
    p25: mean,
    p50: mean,
    p75: mean,
    p95: mean,
    max: mean,
    shareUnderTarget: share,
    shareAtLimit: null,
    shareContactLost: null,
    longestUnderTargetM: null,
    deviationZ: null,
    flagged: false,
    reason: null,
  });
  const items = [
    item(1, 100, 10, 0.5),
    item(2, 400, 30, 0.1),
    item(3, 200, 10, 0),
    item(4, 300, 10, 0),
    item(5, 500, 10, null),
    item(6, 700, 10, 1),
  ];

  it("weigh their rows by distance; the middle is that of the rows' medians (hand-worked)", () => {
    const groups = groupRows({ items, wheelTrackRows: [2, 5] }, toolbarLayout(6, DRILL));
    expect(groups.map(({ words }) => words)).toEqual([
      ...["left wing", "centre", "right wing", "section 1", "section 2"],
      ...["wheel tracks", "beside wheel tracks"],
    ]);
    // (10 x 100 + 30 x 400) / 40; (10 x 0.5 + 30 x 0.1) / 40.
    expect(groups[0]).toMatchObject({ rows: [1, 2], distanceM: 40, mean: 325, p50: 250, shareUnderTarget: 0.2 });
    // Row 5 has no share: only row 6 counts for it.
    expect(groups[2]).toMatchObject({ mean: 600, shareUnderTarget: 1, shareAtLimit: null });
    expect(groups[5]).toMatchObject({ rows: [2, 5], mean: (30 * 400 + 10 * 500) / 40 });
    expect(groups[6]!.rows).toEqual([1, 3, 4, 6]);
  });

  it("are none where the machine says nothing and no row runs in a track", () => {
    expect(groupRows({ items })).toEqual([]);
  });

  it("are named by their rows", () => {
    expect([rowsInWords([1, 2, 3]), rowsInWords([5, 6]), rowsInWords([]), rowsInWords([1, 2, 4])]).toEqual([
      "1 to 3",
      "5, 6",
      "",
      "1, 2, 4",
    ]);
  });
});
