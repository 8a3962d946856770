import { mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { tableFromIPC } from "apache-arrow";
import { unzipSync } from "fflate";
import type { MultiPolygon, Polygon } from "geojson";
import Papa from "papaparse";
import { parseZip } from "shpjs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { ExportAbout } from "@/lib/export/about";
import { estimateReadingsBytes } from "@/lib/export/estimate-size";
import { bytesSource } from "@/lib/ingest/byte-source";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Log, LogColumns, RowStatisticsBody } from "@/lib/schemas/logs";
import type { ZoneCollection } from "@/lib/zones/zones";
import { SeederInput } from "@/lib/machines/machine";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { mustBuild } from "@/tests/lib/export/make-export";
import { mustRead } from "@/tests/lib/ingest/support/make-source";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, fixtureMachine, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";
import type { Actor } from "@/tests/support/make-world";
import { describeWithGdal, readWithGdal } from "@/tests/support/read-with-gdal";

let world: LogWorld;
let log: Log;
let folder: string;
const ZONES = "level=zones&channel=margin&breaks=200,450&minLengthM=4";

async function ask(query: string, actor: Actor = "researcher", logId = log.id): Promise<Response> {
  return world.as(actor, { path: `/api/v1/logs/${logId}/export?${query}` });
}

async function download(query: string, actor?: Actor): Promise<Uint8Array> {
  const response = await ask(query, actor);
  const bytes = new Uint8Array(await response.arrayBuffer());
  if (response.status !== 200) throw new Error(`${response.status} ${new TextDecoder().decode(bytes)}`);
  return bytes;
}

async function text(query: string): Promise<string> {
  return new TextDecoder().decode(await download(query));
}

/** The file on disk, for GDAL. */
async function save(query: string, name: string): Promise<string> {
  const file = path.join(folder, name);
  writeFileSync(file, await download(query));
  return file;
}

async function csvLines(query: string): Promise<Record<string, string>[]> {
  return Papa.parse<Record<string, string>>(await text(query), { header: true, skipEmptyLines: true }).data;
}

async function readLog(name: string, bytes: Uint8Array, machineId?: null): Promise<Log> {
  const waiting = await world.uploadAndSettle({ bytes, name, machineId });
  const columns = (await world.read("owner", { path: `/api/v1/logs/${waiting.id}/columns` })) as unknown as LogColumns;
  const body = { ...confirmedMapping(columns), save: "Larkspur drill" };
  await world.read("operator", { method: "PUT", path: `/api/v1/logs/${waiting.id}/mapping`, body });
  return world.settle(waiting.id);
}

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), "coulterbook-export-test-"));
  world = await makeLogWorld();
  await world.startWorker();
  log = await readLog("=1+1 east.csv", fixtureBytes("csv/wide-newtons/input.csv"));
});
afterAll(async () => {
  await world.close();
  rmSync(folder, { recursive: true, force: true });
});

describe("who may export", () => {
  it.each([
    ["owner", 200],
    ["agronomist", 200],
    ["researcher", 200],
    ["operator", 403],
    ["viewer", 403],
    ["other-owner", 404],
    ["stranger", 401],
  ] as const)("%s: %i", async (actor, status) => {
    const response = await ask("level=swaths", actor);
    await response.body?.cancel();
    expect(response.status).toBe(status);
  });

  it("leaves an entry in the audit for each", async () => {
    await download("format=geojson&level=swaths", "agronomist");
    const { items } = await world.read("owner", { path: "/api/v1/audit" });
    expect((items as Record<string, unknown>[])[0]).toMatchObject({
      action: "log.export",
      subject: log.id,
      userId: "usr_larkspuragro",
      detail: { format: "geojson", level: "swaths", version: log.version },
    });
  });
});

describe("what cannot be exported", () => {
  it.each([
    ["format=pdf", "format"],
    ["level=rows", "level"],
    ["level=zones&breaks=1", "channel"],
    ["level=zones&channel=margin", "breaks"],
    ["level=swaths&shape=wide", "shape"],
    ["format=geojson&shape=wide", "shape"],
    ["format=geojson&bundle=zip", "bundle"],
  ])("%s is refused, naming %s", async (query, name) => {
    const body = await world.read("owner", { path: `/api/v1/logs/${log.id}/export?${query}`, expect: 422 });
    expect((body.errors as { path: string }[]).map((place) => place.path)).toContain(name);
  });

  it("zones of a channel that the log has not are refused in words", async () => {
    const at = `/api/v1/logs/${log.id}/export?level=zones&channel=contact&breaks=0.5&format=geopackage`;
    expect(await world.read("owner", { path: at, expect: 422 })).toMatchObject({ code: "channel_not_available" });
  });

  it("a log that was never read answers 409, and no file is left behind", async () => {
    const failed = await world.uploadAndSettle({ bytes: "\u0000\u0001", name: "b.bin" });
    for (const format of ["csv", "shapefile", "geopackage"]) {
      const at = `/api/v1/logs/${failed.id}/export?format=${format}`;
      expect(await world.read("owner", { path: at, expect: 409 })).toMatchObject({ code: "log_not_ready" });
    }
  });

  it("HEAD is refused instead of making the file for nobody", async () => {
    const response = await world.as("owner", { method: "HEAD", path: `/api/v1/logs/${log.id}/export` });
    expect(response.status).toBe(405);
  });
});

interface Item {
  row: number;
  n: number;
  mean: number | null;
}

/** Statistics of the server for the log, and of our own reader for a file it exported. */
async function expectSameStatistics(name: string, bytes: Uint8Array, mapping: LogMapping): Promise<void> {
  const read = await mustRead(bytesSource(name, bytes), mapping);
  const again = mustBuild(read.log, SeederInput.parse(fixtureMachine()));
  for (const [channel, tolerance] of [
    ["downforce", 0.2],
    ["margin", 0.2],
    ["depth", 1e-5],
    ["resistance", 0.2],
  ] as const) {
    const { items } = (await world.read("owner", {
      path: `/api/v1/logs/${log.id}/rows?channel=${channel}`,
    })) as unknown as RowStatisticsBody;
    const found: Item[] = rowStatistics(again, channel).items;
    expect(items).toHaveLength(8);
    items.forEach((item, index) => {
      expect(found[index]!.n).toBe(item.n);
      expect(Math.abs(found[index]!.mean! - item.mean!)).toBeLessThan(tolerance);
    });
  }
}

describe("readings as CSV", () => {
  it("come as a file with a name, and a link to the zip that has the notes", async () => {
    const response = await ask("format=csv");
    expect(response.headers.get("content-type")).toBe("text/csv; charset=utf-8; header=present");
    expect(response.headers.get("content-disposition")).toBe('attachment; filename="1-1-east-readings.csv"');
    expect(response.headers.get("cache-control")).toBe("private, no-store");
    const link = /^<([^>]+)>; rel="alternate"; type="application\/zip"/.exec(response.headers.get("link") ?? "")?.[1];
    await response.body?.cancel();
    const zip = await world.as("owner", { path: link! });
    expect(zip.headers.get("content-type")).toBe("application/zip");
    expect(Object.keys(unzipSync(new Uint8Array(await zip.arrayBuffer()))).sort()).toEqual([
      "1-1-east-readings.csv",
      "README.txt",
      "metadata.json",
    ]);
  });

  it("hold one line for each record and row", async () => {
    expect(await csvLines("format=csv")).toHaveLength(log.counts.records * 8);
  });

  it("put a row where the reading under that place is found", async () => {
    const lines = (await csvLines("format=csv")).filter((line) => line.pass === "2" && line.flags === "");
    for (const at of [40, 123, 300]) {
      const line = lines[at]!;
      const place = `lon=${line.lonDeg}&lat=${line.latDeg}`;
      const found = await world.read("owner", { path: `/api/v1/logs/${log.id}/at?${place}` });
      expect(found).toMatchObject({ row: Number(line.row), pass: 2 });
    }
  });

  it("are read in again, long and wide, with the same statistics of every row", async () => {
    for (const shape of ["long", "wide"]) {
      const files = unzipSync(await download(`format=csv&shape=${shape}&bundle=zip`));
      const about = JSON.parse(new TextDecoder().decode(files["metadata.json"])) as ExportAbout;
      await expectSameStatistics("export.csv", files["1-1-east-readings.csv"]!, about.readAgain!);
    }
  });

  it("say beside them where they come from", async () => {
    const files = unzipSync(await download("format=csv&bundle=zip"));
    const about = JSON.parse(new TextDecoder().decode(files["metadata.json"])) as ExportAbout;
    expect(about).toMatchObject({
      log: { id: log.id, name: log.name, version: log.version },
      source: { fileName: "=1+1 east.csv", bytes: log.fileBytes, sha256: log.sha256 },
      machine: { rowCount: 8, rowUnitMassKg: 82 },
    });
    expect(about.recipe?.columns).toContainEqual(expect.objectContaining({ channel: "margin", row: 3, unit: "N" }));
    const readme = new TextDecoder().decode(files["README.txt"]);
    expect(readme).toContain(log.sha256);
    expect(readme).toContain("marginN [N]");
    expect(about.recipe).toMatchObject({ name: "Larkspur drill", version: 1 });
    expect(readme).toContain("Recipe “Larkspur drill”, version 1.");
    for (const line of readme.split("\n")) expect(line.length).toBeLessThan(140);
  });
});

describe("readings as GeoJSON", () => {
  it("are RFC 7946: seven decimals, no crs, notes as a foreign member; GDAL reads the same", async () => {
    const file = await save("format=geojson", "readings.geojson");
    const whole = JSON.parse(await text("format=geojson")) as {
      about: ExportAbout;
      crs?: unknown;
      features: { geometry: { type: string; coordinates: number[] }; properties: Record<string, unknown> }[];
    };
    expect(whole.crs).toBeUndefined();
    expect(whole.about.source.sha256).toBe(log.sha256);
    expect(whole.features).toHaveLength(log.counts.records * 8);
    for (const { geometry } of whole.features) {
      for (const degrees of geometry.coordinates) expect(Number(degrees.toFixed(7))).toBe(degrees);
    }
    const gdal = readWithGdal(file);
    expect(gdal).toHaveLength(whole.features.length);
    whole.features.forEach(({ geometry, properties }, at) => {
      expect(gdal[at]!.geometry).toEqual(geometry);
      expect(gdal[at]!.properties.marginN).toBe(properties.marginN);
      expect(gdal[at]!.properties.depthM).toBe(properties.depthM);
    });
  });

  it("are read in again with the same statistics of every row", async () => {
    const bytes = await download("format=geojson");
    const { about } = JSON.parse(new TextDecoder().decode(bytes)) as { about: ExportAbout };
    await expectSameStatistics("export.geojson", bytes, about.readAgain!);
  });
});

describe("readings as a shapefile", () => {
  it("hold for GDAL and for shpjs what the CSV holds", async () => {
    const file = await save("format=shapefile", "readings.zip");
    const lines = await csvLines("format=csv");
    const gdal = readWithGdal(`/vsizip/${file}`);
    const second = (await parseZip(await download("format=shapefile"))) as { features: (typeof gdal)[number][] };
    expect(describeWithGdal(`/vsizip/${file}`)).toContain("WGS 84");
    expect(gdal).toHaveLength(lines.length);
    expect(second.features).toHaveLength(lines.length);
    lines.forEach((line, at) => {
      for (const { geometry, properties } of [gdal[at]!, second.features[at]!]) {
        const [lon, lat] = geometry!.coordinates as number[];
        expect(Math.abs(lon! - Number(line.lonDeg))).toBeLessThan(1e-8);
        expect(Math.abs(lat! - Number(line.latDeg))).toBeLessThan(1e-8);
        expect(properties.ROW).toBe(Number(line.row));
        expect((properties.FLAGS ?? "") as string).toBe(line.flags);
        expect(properties.TIME_UTC).toBe(line.time);
        // A blank number is null to the one and NaN to the other.
        if (line.marginN === "") expect(properties.MARGIN_N ?? NaN).toBeNaN();
        else expect(Math.abs((properties.MARGIN_N as number) - Number(line.marginN))).toBeLessThanOrEqual(0.005001);
      }
    });
  });

  it("are read in again with the same statistics of every row", async () => {
    const bytes = await download("format=shapefile");
    const files = unzipSync(bytes);
    expect(Object.keys(files).sort()).toEqual([
      ...["1-1-east-readings.cpg", "1-1-east-readings.dbf", "1-1-east-readings.prj"],
      ...["1-1-east-readings.shp", "1-1-east-readings.shx", "README.txt", "metadata.txt"],
    ]);
    const about = JSON.parse(new TextDecoder().decode(files["metadata.txt"])) as ExportAbout;
    await expectSameStatistics("export.zip", bytes, about.readAgain!);
  });
});

describe("readings as a GeoPackage", () => {
  it("hold for GDAL what the CSV holds, and the notes as a table", async () => {
    const file = await save("format=geopackage", "readings.gpkg");
    const said = describeWithGdal(file);
    expect(said).toContain("Layer name: readings");
    expect(said).toContain("Geometry: Point");
    expect(said).toContain("marginN: Real");
    const lines = await csvLines("format=csv");
    const gdal = readWithGdal(file, "readings");
    expect(gdal).toHaveLength(lines.length);
    lines.forEach((line, at) => {
      const { geometry, properties } = gdal[at]!;
      const [lon, lat] = geometry!.coordinates as number[];
      expect(Math.abs(lon! - Number(line.lonDeg))).toBeLessThan(1e-8);
      expect(Math.abs(lat! - Number(line.latDeg))).toBeLessThan(1e-8);
      for (const name of ["marginN", "downforceN", "depthM", "resistanceN", "headingDeg"]) {
        expect(properties[name]).toBe(line[name] === "" ? null : Number(line[name]));
      }
    });
    const about = new Map(readWithGdal(file, "about").map(({ properties }) => [properties.name, properties.value]));
    expect(about.get("source")).toMatchObject({ sha256: log.sha256 });
    expect(about.get("columns")).toContainEqual(expect.objectContaining({ name: "marginN", unit: "N" }));
  });

  it("tell their length beforehand, and leave nothing on disk", async () => {
    const response = await ask("format=geopackage");
    const bytes = await response.arrayBuffer();
    expect(Number(response.headers.get("content-length"))).toBe(bytes.byteLength);
    const broken = await ask("format=geopackage");
    await broken.body?.cancel();
    expect(readdirSync(path.join(world.container.env.DATA_DIR, "exports"))).toEqual([]);
  });
});

describe("readings as Arrow", () => {
  it("hold what the CSV holds, units beside each field, notes beside the whole", async () => {
    const table = tableFromIPC(await download("format=arrow"));
    const lines = await csvLines("format=csv");
    expect(table.numRows).toBe(lines.length);
    const about = JSON.parse(table.schema.metadata.get("about")!) as ExportAbout;
    expect(about.source.sha256).toBe(log.sha256);
    expect(table.schema.fields.find((field) => field.name === "depthM")?.metadata.get("unit")).toBe("m");
    const column = (name: string) => table.getChild(name)!;
    lines.forEach((line, at) => {
      expect(column("row").get(at)).toBe(Number(line.row));
      expect(column("flags").get(at) ?? "").toBe(line.flags);
      expect(Number(column("time").get(at))).toBe(Date.parse(line.time!));
      for (const name of ["marginN", "depthM"]) {
        expect(column(name).get(at)).toBe(line[name] === "" ? null : Math.fround(Number(line[name])));
      }
    });
  });
});

type Feature = { geometry: Polygon | MultiPolygon; properties: Record<string, number | null> };

/** Twice the signed area of a ring in degrees: above 0 anticlockwise. */
function turn(ring: number[][]): number {
  return ring.slice(1).reduce((sum, [x, y], i) => sum + ring[i]![0]! * y! - x! * ring[i]![1]!, 0);
}

describe("zones and swaths", () => {
  it("zones are those of the zones route, pass by pass, in every format", async () => {
    const route = (await world.read("owner", {
      path: `/api/v1/logs/${log.id}/zones?channel=margin&breaks=200,450&minLengthM=4`,
    })) as unknown as ZoneCollection;
    const own = (JSON.parse(await text(`format=geojson&${ZONES}`)) as { features: Feature[] }).features;
    expect(own).toHaveLength(route.features.length);
    expect(own.length).toBeGreaterThan(50);
    route.features.forEach(({ properties }, at) => {
      const found = own[at]!.properties;
      expect(found).toMatchObject({ row: properties.row, pass: properties.pass, class: properties.class });
      expect(found.readings).toBe(properties.n);
      expect(found.meanN).toBeCloseTo(properties.mean!, 9);
      expect(found.startS).toBeCloseTo(properties.startS!, 3);
      expect(found.endS).toBeCloseTo(properties.endS!, 3);
      expect([found.fromN, found.toN]).toEqual([
        [null, 200, 450][properties.class],
        [200, 450, null][properties.class],
      ]);
    });
    const gpkg = readWithGdal(await save(`format=geopackage&${ZONES}`, "zones.gpkg"), "zones");
    const shapes = readWithGdal(`/vsizip/${await save(`format=shapefile&${ZONES}`, "zones.zip")}`);
    const csv = readWithGdal(await save(`format=csv&${ZONES}`, "zones.csv"));
    const arrow = tableFromIPC(await download(`format=arrow&${ZONES}`));
    for (const count of [gpkg.length, shapes.length, csv.length, arrow.numRows]) expect(count).toBe(own.length);
    own.forEach(({ properties }, at) => {
      expect(gpkg[at]!.properties.meanN).toBeCloseTo(properties.meanN!, 9);
      expect(shapes[at]!.properties.MEAN_N).toBeCloseTo(properties.meanN!, 2);
      expect(Number(csv[at]!.properties.meanN)).toBeCloseTo(properties.meanN!, 9);
      expect(arrow.getChild("meanN")!.get(at)).toBeCloseTo(properties.meanN!, 9);
    });
  });

  it("swaths keep the right-hand rule in GeoJSON, and are the same ground for GDAL in each format", async () => {
    const own = (JSON.parse(await text("format=geojson&level=swaths")) as { features: Feature[] }).features;
    expect(own).toHaveLength(log.counts.passes);
    for (const { geometry } of own) {
      const polygons = geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates;
      for (const [outer, ...holes] of polygons) {
        expect(turn(outer!)).toBeGreaterThan(0);
        for (const hole of holes) expect(turn(hole)).toBeLessThan(0);
      }
    }
    const gpkg = await save("format=geopackage&level=swaths", "swaths.gpkg");
    const shapes = await save("format=shapefile&level=swaths", "swaths.zip");
    expect(describeWithGdal(gpkg)).toContain("Geometry: Multi Polygon");
    for (const found of [readWithGdal(gpkg, "swaths"), readWithGdal(`/vsizip/${shapes}`)]) {
      found.forEach(({ geometry, properties }, at) => {
        const area = Number(properties.areaM2 ?? properties.AREA_M2);
        expect(Math.abs(area - own[at]!.properties.areaM2!)).toBeLessThan(1e-3);
        const rings = (geometry as Polygon | MultiPolygon).coordinates.flat(
          geometry!.type === "MultiPolygon" ? 1 : 0,
        ) as number[][][];
        const shape = own[at]!.geometry;
        const ownRings = (
          shape.type === "MultiPolygon" ? shape.coordinates.flat(1) : shape.coordinates
        ) as number[][][];
        const size = (all: number[][][]) => all.reduce((sum, ring) => sum + Math.abs(turn(ring)), 0);
        // Seven decimals against all of them: a centimetre along the outline.
        expect(Math.abs(size(rings) / size(ownRings) - 1)).toBeLessThan(0.01);
      });
    }
  });
});

describe("a log without a machine", () => {
  it("is exported with guessed rows, and says so", async () => {
    const bare = await readLog("bare.csv", new Uint8Array([...fixtureBytes("csv/wide-newtons/input.csv"), 10]), null);
    expect(bare.machineId).toBeNull();
    const response = await ask("format=geojson", "owner", bare.id);
    const whole = (await response.json()) as { about: ExportAbout; features: Feature[] };
    expect(whole.about.machine).toBeNull();
    expect(whole.about.rows.isGuessed).toBe(true);
    expect(whole.features).toHaveLength(bare.counts.records * 8);
    expect(Object.keys(whole.features[0]!.properties)).not.toContain("resistanceN");
  });
});

describe("the size said beforehand", () => {
  it.each([
    ["csv", "long", false],
    ["csv", "long", true],
    ["csv", "wide", false],
    ["csv", "wide", true],
    ["geojson", "long", false],
    ["shapefile", "long", false],
    ["geopackage", "long", false],
    ["arrow", "long", false],
  ] as const)("%s, %s, zipped %s, is right within a half", async (format, shape, isBundle) => {
    const said = estimateReadingsBytes({ ...log.counts, channels: log.channels, format, shape, isBundle });
    const made = await download(`format=${format}&shape=${shape}${isBundle ? "&bundle=zip" : ""}`);
    expect(said / made.length).toBeGreaterThan(1 / 1.5);
    expect(said / made.length).toBeLessThan(1.5);
  });
});
