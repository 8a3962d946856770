import { zipSync } from "fflate";
import proj4 from "proj4";
import { describe, expect, it } from "vitest";
import { readBoundaryFile } from "@/lib/fields/read-boundary-file";

const SQUARE = [
  [-98.01, 38.5],
  [-98.01, 38.51],
  [-98, 38.51],
  [-98, 38.5],
  [-98.01, 38.5],
];
const bytesOf = (text: string) => new TextEncoder().encode(text);

/** A shapefile of one polygon, by the layout of the ESRI Shapefile Technical Description (July 1998). */
function makeShp(ring: number[][]): Uint8Array {
  const contentBytes = 44 + 4 + ring.length * 16;
  const bytes = new Uint8Array(100 + 8 + contentBytes);
  const view = new DataView(bytes.buffer);
  const [xs, ys] = [ring.map((p) => p[0]!), ring.map((p) => p[1]!)];
  const box = [Math.min(...xs), Math.min(...ys), Math.max(...xs), Math.max(...ys)];
  view.setInt32(0, 9994);
  view.setInt32(24, bytes.length / 2);
  view.setInt32(28, 1000, true);
  view.setInt32(32, 5, true);
  box.forEach((side, i) => view.setFloat64(36 + i * 8, side, true));
  view.setInt32(100, 1);
  view.setInt32(104, contentBytes / 2);
  view.setInt32(108, 5, true);
  box.forEach((side, i) => view.setFloat64(112 + i * 8, side, true));
  view.setInt32(144, 1, true);
  view.setInt32(148, ring.length, true);
  view.setInt32(152, 0, true);
  ring.forEach(([x, y], i) => {
    view.setFloat64(156 + i * 16, x!, true);
    view.setFloat64(164 + i * 16, y!, true);
  });
  return bytes;
}

function errorOf(bytes: Uint8Array): string {
  const read = readBoundaryFile(bytes);
  return read.ok ? "no error" : `${read.error.code}: ${read.error.message}`;
}

describe("a zipped shapefile", () => {
  it("gives its polygon", () => {
    const read = readBoundaryFile(zipSync({ "field/edge.shp": makeShp(SQUARE) }));
    expect(read).toEqual({ ok: true, value: { type: "Polygon", coordinates: [SQUARE] } });
  });

  it("is brought to degrees by its .prj", () => {
    const utm = "+proj=utm +zone=14 +datum=WGS84 +units=m +no_defs";
    const wkt =
      'PROJCS["WGS 84 / UTM zone 14N",GEOGCS["WGS 84",DATUM["WGS_1984",SPHEROID["WGS 84",6378137,298.257223563]],' +
      'PRIMEM["Greenwich",0],UNIT["degree",0.0174532925199433]],PROJECTION["Transverse_Mercator"],' +
      'PARAMETER["latitude_of_origin",0],PARAMETER["central_meridian",-99],PARAMETER["scale_factor",0.9996],' +
      'PARAMETER["false_easting",500000],PARAMETER["false_northing",0],UNIT["metre",1]]';
    const planar = SQUARE.map((position) => proj4(utm, position as [number, number]));
    const read = readBoundaryFile(zipSync({ "edge.shp": makeShp(planar), "edge.prj": bytesOf(wkt) }));
    const [ring] = (read.ok ? read.value.coordinates : []) as number[][][];
    ring!.forEach((position, i) => {
      expect(position[0]).toBeCloseTo(SQUARE[i]![0]!, 8);
      expect(position[1]).toBeCloseTo(SQUARE[i]![1]!, 8);
    });
  });

  it("is refused when the archive or the shapes are cut short", () => {
    const whole = zipSync({ "edge.shp": makeShp(SQUARE) });
    expect(errorOf(whole.subarray(0, whole.length - 40))).toContain("file-damaged");
    expect(errorOf(zipSync({ "edge.shp": makeShp(SQUARE).subarray(0, 200) }))).toMatch(
      /should have 236 bytes and has 200/,
    );
    expect(errorOf(zipSync({ "edge.shp": bytesOf("not a shapefile at all") }))).toContain("first bytes are wrong");
    const prj = bytesOf("this is no projection");
    expect(errorOf(zipSync({ "edge.shp": makeShp(SQUARE), "edge.prj": prj }))).toContain("file-damaged");
  });

  it("is refused before it is unpacked when it holds too much", () => {
    const bomb = zipSync({ "edge.shp": new Uint8Array(60 * 1024 * 1024) });
    expect(bomb.length).toBeLessThan(100_000);
    expect(errorOf(bomb)).toContain("file-unsafe: The archive unpacks to more than");
    const crowd = Object.fromEntries(Array.from({ length: 201 }, (_, i) => [`${i}.txt`, new Uint8Array(1)]));
    expect(errorOf(zipSync(crowd))).toContain("more than 200 entries");
    expect(errorOf(zipSync({ "readme.txt": bytesOf("hello") }))).toContain("no .shp file");
  });
});

describe("several polygons", () => {
  it("become one boundary of several parts, whatever they lie in", () => {
    const far = SQUARE.map(([x, y]) => [x! + 1, y!]);
    const file = {
      type: "FeatureCollection",
      features: [
        { type: "Feature", properties: {}, geometry: { type: "Polygon", coordinates: [SQUARE] } },
        { type: "Feature", properties: {}, geometry: { type: "MultiPolygon", coordinates: [[far]] } },
        { type: "Feature", properties: {}, geometry: { type: "Point", coordinates: [0, 0] } },
        { type: "Feature", properties: {}, geometry: null },
      ],
    };
    const read = readBoundaryFile(bytesOf(JSON.stringify(file)));
    expect(read).toEqual({ ok: true, value: { type: "MultiPolygon", coordinates: [[SQUARE], [far]] } });
  });
});

describe("KML", () => {
  it("is told from other XML, and refused with a document type in any case or spacing", () => {
    expect(errorOf(bytesOf("<gpx></gpx>"))).toContain("not <kml>");
    for (const head of ["<!DOCTYPE kml>", "<! doctype kml>", '<!ENTITY a "b">']) {
      expect(errorOf(bytesOf(`<?xml version="1.0"?>${head}<kml></kml>`))).toContain("file-unsafe");
    }
  });
});
