import { describe, expect, it } from "vitest";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { geodesicDestination, geodesicDistanceM } from "@/lib/geo/geodesic-distance";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { createToDegrees } from "@/lib/ingest/records/project-position";
import { worldPerMetre } from "@/lib/tiles/tile-address";

describe("UTM at the edges of its zones", () => {
  // PROJ 9 `cs2cs EPSG:4326 EPSG:326zz|327zz`: a zone reaches beyond its edge, over the antimeridian too.
  it.each([
    ["EPSG:32614", 500000, 4427757.218738, -99, 40],
    ["EPSG:32614", 756099.64797, 4432069.056899, -96, 40],
    ["EPSG:32615", 243900.35203, 4432069.056899, -96, 40],
    ["EPSG:32760", 819362.305821, 8140154.825223, 179.996, -16.8],
    ["EPSG:32701", 180637.694179, 8140154.825223, -179.996, -16.8],
    ["EPSG:32701", 179784.26959, 8140141.89776, 179.996, -16.8],
    ["EPSG:32637", 255134.498772, 0, 36.8, 0],
    ["EPSG:32632", 271409.134644, 6658498.792351, 4.9, 60],
    ["EPSG:32631", 605967.888791, 6652933.018832, 4.9, 60],
  ])("%s %d %d", (crs, east, north, longitude, latitude) => {
    const [lon, lat] = createToDegrees(crs)?.(east, north) ?? [NaN, NaN];
    expect(geodesicDistanceM([lon, lat], [longitude, latitude])).toBeLessThan(0.001);
  });

  it.each([
    // GeographicLib 2.1.2 `GeoConvert -c`: meridian convergence in zones 14 north and 55 south.
    [-99, -100, 40, -0.64282636801],
    [147, 148.2, -33.9, -0.66936249818],
  ])(
    "a plane about meridian %d turns from true north at %d %d as UTM does",
    (centre, longitude, latitude, convergenceDeg) => {
      const plane = createLocalPlane(centre, latitude);
      const here = plane.toPlane(longitude, latitude);
      const north = plane.toPlane(longitude, latitude + 1e-4);
      const trueNorthDeg = (Math.atan2(north[0] - here[0], north[1] - here[1]) * 180) / Math.PI;
      expect(trueNorthDeg).toBeCloseTo(-convergenceDeg, 4);
    },
  );
});

describe("the ellipsoid", () => {
  it("is met across the antimeridian (GeographicLib 2.1.2 GeodSolve)", () => {
    expect(geodesicDistanceM([179.995, -16.8], [-179.995, -16.8])).toBeCloseTo(1065.9813035, 6);
    const [longitude, latitude] = geodesicDestination([179.999, -16.8], 90, 500);
    expect(longitude).toBeCloseTo(-179.9963094862151, 9);
    expect(latitude).toBeCloseTo(-16.79999994654789, 9);
  });

  it.each([
    // GeographicLib 2.1.2 Planimeter: squares of 0.0072 degrees of latitude by as much over the cosine of the latitude.
    [0, 638102.2958],
    [40, 641611.4072],
    [60, 644488.7469],
  ])("gives a square at %d degrees its area, which a sphere misses", (latitude, areaM2) => {
    const wide = Math.round((0.0072 / Math.cos((latitude * Math.PI) / 180)) * 1e7) / 1e7;
    const ring = [
      [0, latitude],
      [wide, latitude],
      [wide, latitude + 0.0072],
      [0, latitude + 0.0072],
      [0, latitude],
    ];
    const found = geodesicAreaM2({ type: "Polygon", coordinates: [ring] });
    expect(Math.abs(found / areaM2 - 1)).toBeLessThan(1e-6);
    const plane = createLocalPlane(wide / 2, latitude + 0.0036);
    const corners = ring.map(([lon, lat]) => plane.toPlane(lon!, lat!));
    const shoelace = corners.slice(1).reduce((sum, [x, y], k) => sum + corners[k]![0] * y - x * corners[k]![1], 0) / 2;
    expect(Math.abs(shoelace / areaM2 - 1)).toBeLessThan(1e-6);
  });

  it.each([
    // GeographicLib 2.1.2: metres a degree of latitude and of longitude.
    [0, 110574.27582, 111319.49079],
    [40, 111034.63258, 85393.85696],
    [41.5, 111063.58465, 83496.16866],
    [60, 111412.28746, 55800.00157],
    [-33.9, 110920.58106, 92492.90267],
  ])("has so many metres a degree at %d", (latitude, northM, eastM) => {
    const scale = worldPerMetre(latitude);
    expect(1 / (scale.east * 360)).toBeCloseTo(eastM, 3);
    expect(1 / (scale.north * 360 * Math.cos((latitude * Math.PI) / 180))).toBeCloseTo(northM, 3);
  });
});
