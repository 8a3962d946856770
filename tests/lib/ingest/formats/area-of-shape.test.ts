import proj4 from "proj4";
import { describe, expect, it } from "vitest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { readAsProposed, textSource } from "@/tests/lib/ingest/support/make-source";
import { makeDbf, makeManyPointShp, UTM14_PRJ, WGS84_PRJ, zipOf } from "@/tests/lib/ingest/support/make-shapefile";

/** Swaths 12 m wide, a few metres long, each a little longer than the one before; the last tapers to a point. */
const SWATHS: [number, number][][] = [3, 3.4, 4.1, 4.1].map((lengthM, i) => {
  const [west, south] = [-98.62 + i * 5e-5, 38.4];
  const [width, length] = [12 / 87_300, lengthM / 111_000];
  const ring: [number, number][] = [
    [west, south],
    [west, south + length],
    [west + width, south + length],
    [west + width, south],
    [west, south],
  ];
  return i < 3 ? ring : [...ring.slice(0, 3), ring[0]!];
});
/** On the ellipsoid, by GeographicLib (geographiclib-geodesic 2.2). */
const AREAS_M2 = SWATHS.map((ring) => geodesicAreaM2({ type: "Polygon", coordinates: [ring] }));
const DEPTHS = ["40", "41", "42", "43"];
const CHANNEL = "other:area of its shape";

function shapefile(rings: [number, number][][], prj: string) {
  const files = {
    "log.shp": makeManyPointShp(
      rings.map((ring) => [ring]),
      5,
    ),
    "log.dbf": makeDbf([{ name: "DEPTH_mm", type: "N", length: 4, cells: DEPTHS }]),
    "log.prj": prj,
  };
  return bytesSource("log.zip", zipOf(files));
}

const features = SWATHS.map((ring, i) => ({
  type: "Feature",
  geometry: { type: "Polygon", coordinates: [ring] },
  properties: { "depth (mm)": Number(DEPTHS[i]) },
}));
const toUtm = (place: [number, number]) => proj4("EPSG:4326", "+proj=utm +zone=14 +datum=WGS84", place) as typeof place;

describe("what the area of a record covers", () => {
  it.each([
    ["a shapefile in degrees", shapefile(SWATHS, WGS84_PRJ)],
    [
      "a shapefile in UTM",
      shapefile(
        SWATHS.map((ring) => ring.map(toUtm)),
        UTM14_PRJ,
      ),
    ],
    ["GeoJSON", textSource(JSON.stringify({ type: "FeatureCollection", features }), "log.geojson")],
  ])("is read from %s as the ellipsoid has it", async (_, source) => {
    const { log } = await readAsProposed(source);
    const area = log.channels.find(({ id }) => id === CHANNEL);
    expect(area?.unit).toBe("m2");
    AREAS_M2.forEach((areaM2, record) => expect(area!.values[record]! / areaM2).toBeCloseTo(1, 4));
    expect(log.channels.find(({ id }) => id === "depth")?.values[3]).toBeCloseTo(0.043, 6);
  });

  it("takes holes off and counts every part", async () => {
    const [outer, hole] = [SWATHS[2]!, SWATHS[2]!.map(([x, y]): [number, number] => [-98.6199 + (x + 98.62) / 2, y])];
    const cut = { type: "Polygon" as const, coordinates: [outer, [...hole].reverse()] };
    const two = { type: "MultiPolygon" as const, coordinates: [[SWATHS[0]!], [SWATHS[1]!]] };
    const made = [cut, two].map((geometry) => ({ type: "Feature", geometry, properties: { "depth (mm)": 40 } }));
    const { log } = await readAsProposed(
      textSource(JSON.stringify({ type: "FeatureCollection", features: made }), "log.geojson"),
    );
    const values = log.channels.find(({ id }) => id === CHANNEL)!.values;
    expect(values[0]! / geodesicAreaM2(cut)).toBeCloseTo(1, 4);
    expect(values[1]! / geodesicAreaM2(two)).toBeCloseTo(1, 4);
  });

  it("is no column of a log of points", async () => {
    const points = [
      { type: "Feature", geometry: { type: "Point", coordinates: [-98.62, 38.4] }, properties: { "depth (mm)": 40 } },
    ];
    const { log } = await readAsProposed(
      textSource(JSON.stringify({ type: "FeatureCollection", features: points }), "log.geojson"),
    );
    expect(log.channels.map(({ id }) => id)).toEqual(["depth"]);
  });
});
