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
    expect(read).toEqual({ ok: true, value: { boundary: { type: "Polygon", coordinates: [SQUARE] }, notes: [] } });
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
    const [ring] = (read.ok ? read.value.boundary.coordinates : []) as number[][][];
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
    const boundary = { type: "MultiPolygon", coordinates: [[SQUARE], [far]] };
    expect(read).toEqual({ ok: true, value: { boundary, notes: [] } });
  });
});

describe("KML", () => {
  it("is told from other XML, and refused with a document type in any case or spacing", () => {
    expect(errorOf(bytesOf("<osm></osm>"))).toContain("neither KML nor GPX: its outermost element is <osm>");
    for (const head of ["<!DOCTYPE kml>", "<! doctype kml>", '<!ENTITY a "b">']) {
      expect(errorOf(bytesOf(`<?xml version="1.0"?>${head}<kml></kml>`))).toContain("file-unsafe");
    }
  });
});

/** A GPX 1.1 document (Topografix schema: lat and lon in degrees as attributes). */
function gpxOf(...tracks: { name?: string; route?: boolean; segments: number[][][] }[]): Uint8Array {
  const points = (tag: string, line: number[][]) =>
    line.map(([lon, lat]) => `<${tag} lat="${lat}" lon="${lon}"><ele>520</ele></${tag}>`).join("");
  const body = tracks.map(({ name, route, segments }) => {
    const named = name ? `<name>${name}</name>` : "";
    if (route) return `<rte>${named}${points("rtept", segments.flat())}</rte>`;
    return `<trk>${named}${segments.map((line) => `<trkseg>${points("trkpt", line)}</trkseg>`).join("")}</trk>`;
  });
  return bytesOf(
    `<?xml version="1.0"?><gpx version="1.1" xmlns="http://www.topografix.com/GPX/1/1">${body.join("")}</gpx>`,
  );
}

describe("GPX", () => {
  const corners = SQUARE.slice(0, 4);

  it("gives the polygon of a track or a route that comes back to its start", () => {
    for (const route of [false, true]) {
      const read = readBoundaryFile(gpxOf({ name: "Edge", route, segments: [SQUARE] }));
      expect(read).toEqual({ ok: true, value: { boundary: { type: "Polygon", coordinates: [SQUARE] }, notes: [] } });
    }
  });

  it("joins the ends of one that nearly does, over its segments, and says how far open it was", () => {
    // 0.0003 degrees of longitude at 38.5 N, hand-worked on a sphere: 6378 km x 0.0003 x pi / 180 x cos(38.5) = 26.1 m.
    const open = [...corners, [-98.0097, 38.5]];
    const read = readBoundaryFile(gpxOf({ name: "Edge", segments: [open.slice(0, 2), open.slice(2)] }));
    expect(read).toMatchObject({ ok: true, value: { boundary: { type: "Polygon" } } });
    expect(read.ok && read.value.boundary.coordinates).toEqual([[...open, open[0]]]);
    expect(read.ok && read.value.notes).toEqual([
      'The ends of "Edge" lay 26 m apart and were joined by a straight line.',
    ]);
  });

  it("is refused where no track goes round, with how far it is open, and passes over ways beside one that does", () => {
    const way = { name: "Way to the field", segments: [corners.slice(0, 3)] };
    expect(errorOf(gpxOf(way))).toMatch(
      /no-polygon: No track goes round a field: "Way to the field" ends 14\d\d m from/,
    );
    expect(errorOf(gpxOf())).toContain("no track or route of three or more points");
    const read = readBoundaryFile(gpxOf(way, { segments: [SQUARE] }));
    expect(read.ok && read.value.notes).toHaveLength(1);
    expect(read.ok && read.value.notes[0]).toContain('"Way to the field" was left out');
  });
});
