import { describe, expect, it } from "vitest";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { mergeOverlappingParts, sayOverlap } from "@/lib/geo/merge-overlapping-parts";
import type { Boundary } from "@/lib/schemas/geometry";

/** A box of west, south, east, north. */
const box = (w: number, s: number, e: number, n: number) => [
  [
    [w, s],
    [e, s],
    [e, n],
    [w, n],
    [w, s],
  ],
];
const parts = (...coordinates: number[][][][]): Boundary => ({ type: "MultiPolygon", coordinates });
const areaOf = (...box: number[][][]) => geodesicAreaM2({ type: "Polygon", coordinates: box });

describe("the parts of a boundary", () => {
  it("that overlap count their common ground once", () => {
    const given = parts(box(-98.61, 38.41, -98.6, 38.42), box(-98.605, 38.41, -98.595, 38.42));
    const { boundary, overlapM2 } = mergeOverlappingParts(given);
    // The two cover -98.61 to -98.595 and share -98.605 to -98.6: hand-worked as one box.
    expect(geodesicAreaM2(boundary)).toBeCloseTo(areaOf(...box(-98.61, 38.41, -98.595, 38.42)), 0);
    expect(overlapM2 / areaOf(...box(-98.605, 38.41, -98.6, 38.42))).toBeCloseTo(1, 6);
    expect(boundary.type).toBe("Polygon");
    expect(sayOverlap(overlapM2)).toMatch(/^Parts of the boundary overlap by 48\d,\d{3} m2/);
  });

  it("one within another add nothing, and a hole filled by another part is filled", () => {
    const outer = box(-98.61, 38.41, -98.6, 38.42);
    const inner = box(-98.607, 38.413, -98.603, 38.417);
    expect(geodesicAreaM2(mergeOverlappingParts(parts(outer, inner)).boundary)).toBeCloseTo(areaOf(...outer), 0);
    const holed = [...outer, ...inner];
    const filled = parts(holed, inner);
    expect(mergeOverlappingParts(filled)).toEqual({ boundary: filled, overlapM2: 0 });
    expect(geodesicAreaM2(filled)).toBeCloseTo(areaOf(...outer), 3);
  });

  it("that lie apart, touch, or reach over the antimeridian stay as they are", () => {
    for (const given of [
      parts(box(-98.61, 38.41, -98.6, 38.42), box(-98.59, 38.41, -98.58, 38.42)),
      parts(box(-98.61, 38.41, -98.6, 38.42), box(-98.6, 38.41, -98.59, 38.42)),
      parts(box(179.99, -17, -179.99, -16.99), box(-179.98, -17, -179.97, -16.99)),
    ]) {
      expect(mergeOverlappingParts(given)).toEqual({ boundary: given, overlapM2: 0 });
    }
  });
});
