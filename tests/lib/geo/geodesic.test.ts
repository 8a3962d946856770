import type { Polygon, Position } from "geojson";
import { describe, expect, it } from "vitest";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { geodesicDestination, geodesicLine } from "@/lib/geo/geodesic-distance";
import { createLocalPlane } from "@/lib/geo/local-plane";

describe("geodesicLine", () => {
  // GeographicLib 2.1.2 GeodSolve -i -p 9: lat1 lon1 lat2 lon2 -> azimuth, metres
  it.each([
    [40, -100, 40, -99.99, 89.99678606, 853.938569139],
    [40, -100, 40.01, -100, 0, 1110.347286652],
    [-33.9, 148.2, -33.893, 148.21, 49.99172865, 1207.654053033],
    [0, 30, 0, 30.01, 90, 1113.194907933],
    [-16.8, 179.995, -16.8, -179.995, 90.00144516, 1065.9813035],
    [60, 25, 60.007, 25.014, 45.03912372, 1103.796805476],
  ])("from %d %d to %d %d", (lat1, lon1, lat2, lon2, azimuth, metres) => {
    const line = geodesicLine([lon1, lat1], [lon2, lat2]);
    expect(line.azimuthDeg).toBeCloseTo(azimuth, 7);
    expect(line.distanceM).toBeCloseTo(metres, 6);
    // The plane about the first point, to 0.1 ppm.
    const [east, north] = createLocalPlane(lon1, lat1).toPlane(lon2, lat2);
    expect(Math.abs(Math.hypot(east, north) / metres - 1)).toBeLessThan(1e-7);
  });

  // GeographicLib 2.1.2 GeodSolve (direct)
  it.each([
    [40, -100, 90, 402.336, 39.99999990423483, -99.99528846671231],
    [40, -100, 45, 9.144, 40.00005823211622, -99.99992428272795],
    [-16.8, 179.999, 90, 500, -16.79999994654789, -179.9963094862151],
  ])("reaches the place from %d %d at %d degrees after %d m", (lat, lon, azimuth, metres, latEnd, lonEnd) => {
    const [foundLon, foundLat] = geodesicDestination([lon, lat], azimuth, metres);
    expect(foundLat).toBeCloseTo(latEnd, 9);
    expect(foundLon).toBeCloseTo(lonEnd, 9);
  });
});

function polygonOf(...latLon: [number, number][]): Polygon {
  const ring: Position[] = latLon.map(([lat, lon]) => [lon, lat]);
  return { type: "Polygon", coordinates: [[...ring, ring[0]!]] };
}

const SIXTEEN_HA: [number, number][] = [
  [40, -100],
  [40, -99.9953],
  [40.0036, -99.9953],
  [40.0036, -100],
];

describe("geodesicAreaM2", () => {
  // GeographicLib 2.1.2 Planimeter -p 9
  it.each<[string, [number, number][], number]>([
    ["16 ha", SIXTEEN_HA, 160425.7874],
    ["the same clockwise", [...SIXTEEN_HA].reverse(), 160425.7874],
    [
      "64 ha",
      [
        [41.5, -93.6],
        [41.5, -93.5904],
        [41.5072, -93.5904],
        [41.5072, -93.6],
      ],
      640941.1914,
    ],
    [
      "southern",
      [
        [-33.9, 148.2],
        [-33.9, 148.2087],
        [-33.8928, 148.2087],
        [-33.8928, 148.2],
      ],
      642673.3482,
    ],
    [
      "antimeridian",
      [
        [-16.8, 179.9962],
        [-16.8, -179.9963],
        [-16.7928, -179.9963],
        [-16.7928, 179.9962],
      ],
      637044.6954,
    ],
    [
      "equator",
      [
        [0, 36.8],
        [0, 36.8036],
        [0.0036, 36.8036],
        [0.0036, 36.8],
      ],
      159525.5741,
    ],
    [
      "L-shape",
      [
        [40.1, -98.5],
        [40.1, -98.4906],
        [40.1036, -98.4906],
        [40.1036, -98.4953],
        [40.1072, -98.4953],
        [40.1072, -98.5],
      ],
      480570.2584,
    ],
    [
      "quad",
      [
        [50.5, 10.2],
        [50.5017, 10.2056],
        [50.505, 10.2041],
        [50.5041, 10.1988],
      ],
      172989.534,
    ],
  ])("%s", (_, corners, areaM2) => {
    expect(geodesicAreaM2(polygonOf(...corners))).toBeCloseTo(areaM2, 3);
  });

  it("takes holes off and adds polygons up (sums of the values above)", () => {
    const outer = polygonOf([41.5, -93.6], [41.5, -93.5904], [41.5072, -93.5904], [41.5072, -93.6]).coordinates[0]!;
    const hole = polygonOf([41.501, -93.599], [41.501, -93.595], [41.504, -93.595], [41.504, -93.599]).coordinates[0]!;
    const holeM2 = geodesicAreaM2({ type: "Polygon", coordinates: [hole] });
    expect(geodesicAreaM2({ type: "Polygon", coordinates: [outer, hole] })).toBeCloseTo(640941.1914 - holeM2, 3);
    const both = { type: "MultiPolygon" as const, coordinates: [[outer], polygonOf(...SIXTEEN_HA).coordinates] };
    expect(geodesicAreaM2(both)).toBeCloseTo(640941.1914 + 160425.7874, 3);
  });
});
