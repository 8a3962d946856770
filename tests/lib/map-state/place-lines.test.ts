import { describe, expect, it } from "vitest";
import { linesOfPlace, middleOfPlace } from "@/lib/map-state/place-lines";

const SHORT = [
  [0, 0],
  [1, 0],
];
const LONG = [
  [0, 1],
  [2, 1],
  [4, 1],
  [6, 1],
];
const RING = [...LONG, [0, 1]];

describe("linesOfPlace", () => {
  it("takes one stretch, several, and the rings of areas", () => {
    expect(linesOfPlace({ type: "LineString", coordinates: SHORT })).toEqual([SHORT]);
    expect(linesOfPlace({ type: "MultiLineString", coordinates: [SHORT, LONG] })).toEqual([SHORT, LONG]);
    expect(linesOfPlace({ type: "MultiPolygon", coordinates: [[RING], [SHORT]] })).toEqual([RING, SHORT]);
    expect(linesOfPlace({ type: "Point", coordinates: [1, 2] })).toEqual([]);
    expect(linesOfPlace(null)).toEqual([]);
  });

  it("finds the middle of the longest stretch", () => {
    const place = { type: "MultiLineString", coordinates: [SHORT, LONG] };
    expect(middleOfPlace(place)).toEqual({ longitude: 3, latitude: 1 });
    expect(middleOfPlace({ type: "Point", coordinates: [1, 2] })).toBeNull();
  });
});
