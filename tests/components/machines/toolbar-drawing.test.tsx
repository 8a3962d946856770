import { describe, expect, it } from "vitest";
import { layoutMachine } from "@/components/machines/toolbar-drawing";

describe("the machine from above", () => {
  it("spaces rows evenly about the centre line, row 1 leftmost", () => {
    const { rows } = layoutMachine({ kind: "seeder", rowCount: 24, rowSpacingM: 0.25 });
    expect(rows).toHaveLength(24);
    // Hand-worked: the outer rows of 24 at 0.25 m stand 23 / 2 * 0.25 m from the middle.
    expect(rows[0]?.xM).toBe(-2.875);
    expect(rows[23]?.xM).toBe(2.875);
  });

  it("follows uneven rows and the antenna", () => {
    const layout = layoutMachine({
      kind: "seeder",
      rowCount: 2,
      rowSpacingM: 1,
      rowOffsetsM: [-0.3, 0.6],
      rowForwardM: [0, -0.5],
      antennaToRowsM: 4,
      antennaRightM: 0.1,
      hitch: "rigid",
    });
    expect(layout.rows).toEqual([
      { xM: -0.3, yM: 0 },
      { xM: 0.6, yM: -0.5 },
    ]);
    expect(layout.antenna).toEqual({ xM: 0.1, yM: 4 });
    expect(layout.hitch).toBeNull();
  });

  it("puts the antenna of a trailed machine ahead of its pin", () => {
    const layout = layoutMachine({ kind: "seeder", hitch: "trailed", hitchToRowsM: 5, antennaToHitchM: 1.5 });
    expect(layout.hitch).toEqual({ xM: 0, yM: 5 });
    expect(layout.antenna).toEqual({ xM: 0, yM: 6.5 });
  });

  it("draws a combine's header and what it spreads over", () => {
    const { bars } = layoutMachine({ kind: "combine", headerWidthM: 6.096, spreadWidthM: 4 });
    expect(bars.map((bar) => bar.widthM)).toEqual([6.096, 4]);
  });
});
