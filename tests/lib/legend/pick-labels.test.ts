import { describe, expect, it } from "vitest";
import { pickLabels } from "@/lib/legend/pick-labels";

describe("pickLabels", () => {
  it("lets rows side by side not run together, though all stand out", () => {
    const rows = Array.from({ length: 24 }, (_, index) => index + 1);
    const wanted = rows.map((row) => ({ row, weight: row >= 8 && row <= 17 ? 2 : 0 }));
    // 12 px a row and 20 px a label: every second row at most; the flagged 8, 10 … 16 first.
    const kept = pickLabels(wanted, { rowPx: 12, leastPx: 20 });
    expect(kept.filter((row) => row >= 8 && row <= 17)).toEqual([8, 10, 12, 14, 16]);
    expect(kept.every((row, index) => index === 0 || row - kept[index - 1]! >= 2)).toBe(true);
  });

  it("gives way to the weightiest", () => {
    const wanted = [
      { row: 1, weight: 1 },
      { row: 2, weight: 3 },
      { row: 3, weight: 2 },
    ];
    expect(pickLabels(wanted, { rowPx: 10, leastPx: 20 })).toEqual([2]);
    expect(pickLabels(wanted, { rowPx: 20, leastPx: 20 })).toEqual([1, 2, 3]);
  });
});
