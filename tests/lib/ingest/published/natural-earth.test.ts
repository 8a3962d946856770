import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { bytesSource } from "@/lib/ingest/byte-source";
import type { LogMapping } from "@/lib/ingest/mapping";
import { mustInspect, mustRead } from "@/tests/lib/ingest/support/make-source";
import { readWithGdal } from "@/tests/support/read-with-gdal";

// Shapefiles of Natural Earth (public domain) as Debian's python3-geopandas 0.12.2-1 ships them, zipped. The second reader is
// GDAL 3.6.2 (Debian's gdal-bin).
const FOLDER = "fixtures/published";
const open = (name: string) => bytesSource(`${name}.zip`, readFileSync(`${FOLDER}/${name}/input.zip`));
const PLACE: LogMapping["columns"] = [
  { name: "point longitude", channel: "longitude", unit: "deg" },
  { name: "point latitude", channel: "latitude", unit: "deg" },
];
const gdal = (name: string) => readWithGdal(`/vsizip/${FOLDER}/${name}/input.zip`);

describe("a published shapefile of points", () => {
  it("has the same columns, texts and places for GDAL and for us", async () => {
    const inspection = await mustInspect(open("naturalearth-cities"));
    expect(inspection).toMatchObject({ format: "shapefile" });
    expect(inspection.columns.map(({ name }) => name)).toEqual(["point longitude", "point latitude", "name"]);
    const features = gdal("naturalearth-cities");
    // `ogrinfo -so`: 243 features, extent (-175.220564, -41.292068) - (179.216647, 64.143459).
    expect(features).toHaveLength(243);
    const names = features.map(({ properties }) => properties.name);
    for (const text of inspection.columns[2]?.sample ?? []) expect(names).toContain(text);
    const columns = [...PLACE, { name: "name", channel: "other:name" as const, unit: "1" as const }];
    const { log } = await mustRead(open("naturalearth-cities"), { shape: "single", columns });
    expect(log.records).toBe(243);
    features.forEach(({ geometry }, record) => {
      const [x = NaN, y = NaN] = geometry?.coordinates as number[];
      // GDAL was asked for 12 decimals.
      expect(log.longitude[record]).toBeCloseTo(x, 11);
      expect(log.latitude[record]).toBeCloseTo(y, 11);
    });
    expect(Math.min(...log.longitude)).toBeCloseTo(-175.220564, 6);
    expect(Math.max(...log.latitude)).toBeCloseTo(64.143459, 6);
  });
});

describe("a published shapefile of polygons, of many parts and over the antimeridian", () => {
  it("has the same numbers for GDAL and for us, each placed within the bounds of its land", async () => {
    const columns: LogMapping["columns"] = [
      ...PLACE,
      { name: "pop_est", channel: "other:pop_est", unit: "1" },
      { name: "gdp_md_est", channel: "other:gdp_md_est", unit: "1" },
    ];
    const { log, notes } = await mustRead(open("naturalearth-lowres"), { shape: "single", columns });
    expect(notes.map(({ code }) => code)).toContain("area-centres");
    const features = gdal("naturalearth-lowres");
    expect(log.records).toBe(features.length);
    for (const id of ["pop_est", "gdp_md_est"]) {
      const channel = log.channels.find((candidate) => candidate.id === `other:${id}`);
      const theirs = features.map(({ properties }) => Math.fround(Number(properties[id])));
      expect([...(channel?.values ?? [])]).toEqual(theirs);
    }
    features.forEach(({ geometry, properties }, record) => {
      const flat = (geometry?.coordinates as number[][]).flat(Infinity) as unknown as number[];
      const [xs, ys] = [0, 1].map((side) => flat.filter((_, at) => at % 2 === side)) as [number[], number[]];
      const [x, y] = [log.longitude[record] ?? NaN, log.latitude[record] ?? NaN];
      const isWithin = x >= Math.min(...xs) && x <= Math.max(...xs) && y >= Math.min(...ys) && y <= Math.max(...ys);
      expect({ name: properties.name, isWithin }).toEqual({ name: properties.name, isWithin: true });
    });
  });
});
