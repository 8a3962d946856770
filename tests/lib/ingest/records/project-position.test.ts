import { describe, expect, it } from "vitest";
import { createToDegrees } from "@/lib/ingest/records/project-position";

describe("createToDegrees", () => {
  // PROJ 9 `cs2cs EPSG:4326 EPSG:326zz|327zz`.
  it.each([
    ["EPSG:32614", 414639.538157, 4428236.064633, -100, 40],
    ["32755", 610950.177019, 6248283.651076, 148.2, -33.9],
    ["urn:ogc:def:crs:EPSG::32635", 388455.958023, 6653097.435295, 25, 60],
    ["EPSG:32737", 255134.498772, 10000000, 36.8, 0],
    ["+proj=utm +zone=15 +datum=WGS84", 243900.35203, 4432069.056899, -96, 40],
  ])("%s", (crs, east, north, longitude, latitude) => {
    const [lon, lat] = createToDegrees(crs)?.(east, north) ?? [NaN, NaN];
    // 1e-8 degrees is 1 mm.
    expect(lon).toBeCloseTo(longitude, 8);
    expect(lat).toBeCloseTo(latitude, 8);
  });

  it("knows web Mercator", () => {
    // 20037508.342789244 m is pi times the radius 6378137 m: longitude 180, latitude 0.
    const [lon, lat] = createToDegrees("EPSG:3857")?.(20037508.342789244 / 2, 0) ?? [NaN, NaN];
    expect(lon).toBeCloseTo(90, 9);
    expect(lat).toBeCloseTo(0, 9);
  });

  it("refuses systems it does not know", () => {
    for (const crs of ["EPSG:2193", "32661", "somewhere", "+proj=nonsense", "PROJCS[", ""]) {
      expect(createToDegrees(crs)).toBeNull();
    }
  });
});
