import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { countBits, createBitGrid } from "@/lib/coverage/bit-grid";
import { fillPolygon } from "@/lib/coverage/fill-polygon";
import { fillQuad } from "@/lib/coverage/fill-quad";

const BOUNDS = { minX: -20, minY: -20, maxX: 20, maxY: 20 };
const corners = fc.array(fc.double({ min: -25, max: 25, noNaN: true }), { minLength: 8, maxLength: 8 });

describe("fillQuad", () => {
  it("sets the very cells that the filling of any polygon sets, also where the corners cross or leave the grid", () => {
    fc.assert(
      fc.property(corners, (quad) => {
        const ours = createBitGrid(BOUNDS, 0.37, 1e6);
        const general = createBitGrid(BOUNDS, 0.37, 1e6);
        fillQuad(ours, Float64Array.from(quad));
        fillPolygon(general, [Float64Array.from(quad)]);
        expect(Array.from(ours.words)).toEqual(Array.from(general.words));
      }),
      { seed: 3, numRuns: 500 },
    );
  });

  it("fills a square of 4 m to its area (hand-worked: 8 by 8 cells of 0.5 m)", () => {
    const grid = createBitGrid(BOUNDS, 0.5, 1e6);
    fillQuad(grid, Float64Array.of(0, 0, 4, 0, 4, 4, 0, 4));
    expect(countBits(grid)).toBe(64);
  });
});
