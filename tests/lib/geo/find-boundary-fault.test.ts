import { describe, expect, it } from "vitest";
import { findBoundaryFault } from "@/lib/geo/find-boundary-fault";

const polygon = (...rings: number[][][]) => ({ type: "Polygon" as const, coordinates: rings });
const square = [
  [0, 0],
  [2, 0],
  [2, 2],
  [0, 2],
  [0, 0],
];
const bowtie = [
  [0, 0],
  [2, 2],
  [2, 0],
  [0, 2],
  [0, 0],
];

describe("findBoundaryFault", () => {
  it("finds nothing wrong with squares, holes and repeated corners", () => {
    const hole = [
      [0.5, 0.5],
      [1, 0.5],
      [1, 1],
      [0.5, 0.5],
    ];
    expect(findBoundaryFault(polygon(square))).toBeNull();
    expect(findBoundaryFault(polygon(square, hole))).toBeNull();
    expect(
      findBoundaryFault(
        polygon([
          [0, 0],
          [2, 0],
          [2, 0],
          [2, 2],
          [0, 2],
          [0, 2],
          [0, 0],
        ]),
      ),
    ).toBeNull();
  });

  it("names the ring and the place of a crossing", () => {
    // Hand-worked: the diagonals of the square (0,0)-(2,2) meet at (1,1).
    const fault = { place: "ring 2", message: "crosses itself at longitude 1.000000, latitude 1.000000" };
    expect(findBoundaryFault(polygon(square, bowtie))).toEqual(fault);
    const several = { type: "MultiPolygon" as const, coordinates: [[square], [bowtie]] };
    expect(findBoundaryFault(several)).toMatchObject({ place: "part 2, ring 1" });
  });

  it("refuses a ring of too few different corners, and one too long to look through", () => {
    expect(
      findBoundaryFault(
        polygon([
          [0, 0],
          [0, 0],
          [0, 0],
          [0, 0],
        ]),
      )?.message,
    ).toContain("fewer than three");
    const circle = Array.from({ length: 9_000 }, (_, i) => [Math.cos(i / 1432), Math.sin(i / 1432)]);
    expect(findBoundaryFault(polygon([...circle, circle[0]!]))?.message).toContain("at most 8000");
    const many = Array.from({ length: 4 }, () => [circle.slice(0, 6_000)]);
    expect(findBoundaryFault({ type: "MultiPolygon", coordinates: many })?.place).toBe("rings");
  });
});
