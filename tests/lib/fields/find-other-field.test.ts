import { describe, expect, it } from "vitest";
import { findHoldingField, liesElsewhere, samplePlaces, sayElsewhere } from "@/lib/fields/find-other-field";
import { distanceToBoundary } from "@/lib/geo/distance-to-boundary";
import { createLocalPlane } from "@/lib/geo/local-plane";
import type { Boundary } from "@/lib/schemas/geometry";

const plane = createLocalPlane(-98.2, 40.6);
const at = (eastM: number, northM: number) => plane.toDegrees(eastM, northM);

/** A square of 400 m with its south-west corner so far from the plane's centre. */
function square(eastM: number, northM: number): Boundary {
  const corners: [number, number][] = [
    [0, 0],
    [400, 0],
    [400, 400],
    [0, 400],
    [0, 0],
  ];
  return { type: "Polygon", coordinates: [corners.map(([x, y]) => at(eastM + x, northM + y))] };
}

const HERE = square(0, 0);
const THERE = square(3500, 0);
const places = (count: number, eastM: number) => Array.from({ length: count }, (_, i) => at(eastM + i, 200));

describe("the distance to a boundary", () => {
  // Hand-worked in the plane: 3, 4, 5 off a corner.
  it.each([
    [200, 200, 0],
    [500, 200, 100],
    [430, 440, 50],
    [-30, 200, 30],
  ])("of a place %s m east and %s m north is %s m", (eastM, northM, expectedM) => {
    expect(distanceToBoundary(HERE)(...at(eastM, northM))).toBeCloseTo(expectedM, 3);
  });

  it("counts a hole as outside, and says nothing without a position", () => {
    const hole = [at(100, 100), at(100, 300), at(300, 300), at(300, 100), at(100, 100)];
    const holed: Boundary = { type: "Polygon", coordinates: [...(HERE.coordinates as [number, number][][]), hole] };
    expect(distanceToBoundary(holed)(...at(200, 150))).toBeCloseTo(50, 3);
    expect(distanceToBoundary(HERE)(NaN, 40)).toBeNaN();
  });

  it("is still a distance on another continent", () => {
    expect(distanceToBoundary(HERE)(151, -33)).toBeGreaterThan(10_000_000);
  });
});

describe("a log in another field", () => {
  it("is told with its distance, and the field that holds it is found", () => {
    const found = liesElsewhere(places(100, 3600), HERE);
    expect(found).toMatchObject({ shareInside: 0, shareElsewhere: 1 });
    // Records stand 3600 to 3699 m east; the edge of the field is at 400 m.
    expect(found?.distanceM).toBeCloseTo(3249.5, 1);
    expect(sayElsewhere("Mill bottom", found!)).toBe("None of these records lie in Mill bottom: they lie 3.2 km away.");
    const fields = [
      { id: "fld_other", boundary: square(9000, 0) },
      { id: "fld_there", boundary: THERE },
    ];
    expect(findHoldingField(places(100, 3600), fields)).toBe("fld_there");
    expect(findHoldingField(places(100, 20_000), fields)).toBeNull();
  });

  it("is not one that merely turns outside, nor one of which half is here", () => {
    expect(liesElsewhere(places(100, 200), HERE)).toBeNull();
    expect(liesElsewhere(places(100, 450), HERE)).toBeNull();
    expect(liesElsewhere([...places(50, 100), ...places(50, 3600)], HERE)).toBeNull();
    const mostly = liesElsewhere([...places(49, 100), ...places(51, 3600)], HERE);
    expect(sayElsewhere("Mill bottom", mostly!)).toMatch(/^Only 49 % of these records lie in Mill bottom: most lie/);
  });

  it("is judged by records with a position only", () => {
    const longitude = Float64Array.from([NaN, -98, 0]);
    const latitude = Float64Array.from([40, 40.5, 0]);
    expect(samplePlaces({ records: 3, longitude, latitude })).toEqual([[-98, 40.5]]);
    expect(liesElsewhere([], HERE)).toBeNull();
  });
});
