import fc from "fast-check";
import type { Polygon, Position } from "geojson";
import { describe, expect, it } from "vitest";
import { boundaryOf, outlinesOf } from "@/lib/drawing/boundary-shapes";
import { measureShape } from "@/lib/drawing/measure-shape";
import { readPlace } from "@/lib/drawing/read-place";
import { snapToRings, type ScreenProjection } from "@/lib/drawing/snap-to-rings";

const SQUARE: Position[] = [
  [-98.6, 38.4],
  [-98.59, 38.4],
  [-98.59, 38.41],
  [-98.6, 38.41],
  [-98.6, 38.4],
];

describe("measures while drawing", () => {
  it("are those of the ellipsoid", () => {
    // One degree of the equator: 2 pi a / 360 with a = 6378137 m (WGS 84), hand-worked.
    const equator = measureShape({
      type: "LineString",
      coordinates: [
        [0, 0],
        [1, 0],
      ],
    });
    expect(equator.lengthM).toBeCloseTo(111319.4908, 3);
    expect(equator).toMatchObject({ areaM2: null, lastSideM: equator.lengthM });
    // A 0.01 degree square at 38.4 N by the sides of the ellipsoid: 873.33 m x 1110.06 m about, hand-worked from the
    // radii of curvature (N cos phi, M) at 38.405 N.
    const square = measureShape({ type: "Polygon", coordinates: [SQUARE] });
    const [a, e2] = [6378137, 0.00669437999014];
    const phi = (38.405 * Math.PI) / 180;
    const w = Math.sqrt(1 - e2 * Math.sin(phi) ** 2);
    const [wideM, tallM] = [
      ((a / w) * Math.cos(phi) * 0.01 * Math.PI) / 180,
      (((a * (1 - e2)) / w ** 3) * 0.01 * Math.PI) / 180,
    ];
    expect(square.areaM2).toBeCloseTo(wideM * tallM, -1);
    expect(square.lengthM).toBeCloseTo(2 * (wideM + tallM), 1);
    expect(square.lastSideM).toBeCloseTo(wideM, 0);
  });

  it("take an outline with one or two corners as it is", () => {
    expect(measureShape({ type: "Polygon", coordinates: [[[1, 1]]] })).toEqual({
      lengthM: 0,
      lastSideM: null,
      areaM2: 0,
    });
    expect(measureShape({ type: "Point", coordinates: [1, 1] }).areaM2).toBeNull();
  });
});

/** A map on which a degree is a thousand pixels, north up. */
const SCREEN: ScreenProjection = {
  project: (longitude, latitude) => ({ x: longitude * 1000, y: -latitude * 1000 }),
  unproject: (x, y) => ({ lng: x / 1000, lat: -y / 1000 }),
};
const RING: Position[] = [
  [0, 0],
  [1, 0],
  [1, 1],
  [0, 0],
];

describe("snapping", () => {
  it("goes to a corner within reach, before the side beside it", () => {
    expect(snapToRings({ x: 1005, y: -6 }, [RING], SCREEN)).toEqual([1, 0]);
  });

  it("goes to the nearest place of a side where no corner is near", () => {
    expect(snapToRings({ x: 400, y: -9 }, [RING], SCREEN)).toEqual([0.4, 0]);
  });

  it("leaves a point in the open where it is, and never moves one farther than its reach", () => {
    expect(snapToRings({ x: 600, y: -200 }, [RING], SCREEN)).toBeUndefined();
    expect(snapToRings({ x: 0, y: 0 }, [], SCREEN)).toBeUndefined();
    fc.assert(
      fc.property(
        fc.double({ min: -50, max: 1050, noNaN: true }),
        fc.double({ min: -1050, max: 50, noNaN: true }),
        (x, y) => {
          const place = snapToRings({ x, y }, [RING], SCREEN);
          if (!place) return;
          const at = SCREEN.project(place[0]!, place[1]!);
          expect(Math.hypot(at.x - x, at.y - y)).toBeLessThanOrEqual(14.01);
        },
      ),
    );
  });
});

describe("a boundary as outlines", () => {
  it("comes back as it was, one part or several", () => {
    const one = { type: "Polygon" as const, coordinates: [SQUARE] };
    expect(boundaryOf(outlinesOf(one)!)).toEqual(one);
    const two = { type: "MultiPolygon" as const, coordinates: [[SQUARE], [RING]] };
    expect(boundaryOf(outlinesOf(two)!)).toEqual(two);
    expect(boundaryOf([] as Polygon[])).toBeNull();
  });

  it("is refused where ground is cut out of it", () => {
    expect(outlinesOf({ type: "Polygon", coordinates: [SQUARE, RING] })).toBeNull();
  });
});

describe("a typed place", () => {
  it("is latitude, then longitude", () => {
    expect(readPlace("38.41, -98.61")).toEqual([-98.61, 38.41]);
    expect(readPlace(" 38.41°  \u221298.61° ")).toEqual([-98.61, 38.41]);
  });

  it.each(["", "38.41", "95, 10", "10, 190", "a, b", "1,2,3", "1e3, 2"])("is none in %j", (text) => {
    expect(readPlace(text)).toBeNull();
  });
});
