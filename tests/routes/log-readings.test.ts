import sharp from "sharp";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { CoverageAreas } from "@/lib/schemas/coverage";
import type {
  CoverageBody,
  Log,
  LogColumns,
  PassBody,
  PassReadings,
  ReadingAt,
  RowStatisticsBody,
  TileJson,
} from "@/lib/schemas/logs";
import { createPassTrack } from "@/lib/map-state/pass-track";
import type { PackablePassReadings } from "@/lib/schemas/packed-readings";
import { tileAt, pixelAt } from "@/lib/tiles/tile-address";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";
import type { Actor } from "@/tests/support/make-world";

let world: LogWorld;
let log: Log;
const path = (ending: string) => `/api/v1/logs/${log.id}/${ending}`;
async function ask<Body>(ending: string, actor: Actor = "researcher"): Promise<Body> {
  return (await world.read(actor, { path: path(ending) })) as Body;
}

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  const waiting = await world.uploadAndSettle({ bytes: fixtureBytes("csv/wide-newtons/input.csv"), name: "a.csv" });
  const columns = (await world.read("owner", { path: `/api/v1/logs/${waiting.id}/columns` })) as unknown as LogColumns;
  const body = confirmedMapping(columns);
  await world.read("operator", { method: "PUT", path: `/api/v1/logs/${waiting.id}/mapping`, body });
  log = await world.settle(waiting.id);
});
afterAll(async () => world.close());

/** The fixture's own lines, to compare with what comes back. */
function sourceCells(): string[][] {
  const text = new TextDecoder().decode(fixtureBytes("csv/wide-newtons/input.csv"));
  return text
    .trim()
    .split("\n")
    .map((line) => line.split(","));
}

describe("readings of a pass", () => {
  it("are those of the file, row by row, with missing ones null", async () => {
    const [header, ...lines] = sourceCells();
    const { items } = await ask<{ items: PassBody[] }>("passes");
    expect(items.length).toBe(log.counts.passes);
    let compared = 0;
    let missing = 0;
    for (const { pass } of items) {
      const readings = await ask<PassReadings>(`passes/${pass}/readings?channel=margin`);
      expect(readings).toMatchObject({ channel: "margin", unit: "N", rows: 8 });
      for (let row = 1; row <= 8; row++) {
        const column = header!.indexOf(`Margin row ${row} (N)`);
        readings.values[row - 1]!.forEach((value, i) => {
          const cell = lines[readings.firstRecord! + i]![column]!;
          expect(value).toBe(cell === "" ? null : Number(cell));
          compared += 1;
          missing += cell === "" ? 1 : 0;
        });
      }
    }
    expect(compared).toBeGreaterThan(1000);
    expect(missing).toBeGreaterThan(0);
  });

  it("come packed as little-endian Float32, record by record", async () => {
    const json = await ask<PassReadings>("passes/1/readings?channel=depth");
    const headers = { accept: "application/octet-stream" };
    const response = await world.as("owner", { path: path("passes/1/readings?channel=depth"), headers });
    expect(response.headers.get("content-type")).toBe("application/octet-stream");
    const packed = new Float32Array(await response.arrayBuffer());
    expect(packed.length).toBe(json.records * json.rows);
    for (let record = 0; record < json.records; record++) {
      for (let row = 0; row < json.rows; row++) {
        const value = packed[record * json.rows + row]!;
        expect(Number.isNaN(value) ? null : value).toBe(json.values[row]![record]);
      }
    }
  });

  it("come packed within the JSON, the very same numbers", async () => {
    const [lists, packed] = await Promise.all(
      ["lists", "packed"].map((values) =>
        ask<PackablePassReadings>(`passes/1/readings?channel=margin&values=${values}`),
      ),
    );
    expect(packed!.values).toEqual([]);
    const [fromLists, fromPacked] = [createPassTrack(lists!), createPassTrack(packed!)];
    expect(fromPacked.values.some(Number.isNaN)).toBe(true);
    expect(fromPacked).toEqual(fromLists);
  });

  it("of an absent pass or channel are refused in words", async () => {
    expect((await world.as("owner", { path: path("passes/99/readings?channel=depth") })).status).toBe(404);
    expect((await world.as("owner", { path: path("passes/x/readings?channel=depth") })).status).toBe(404);
    const absent = await world.as("owner", { path: path("passes/1/readings?channel=moisture") });
    expect(absent.status).toBe(422);
    expect(await absent.json()).toMatchObject({ code: "channel_not_available" });
  });
});

describe("derived channels", () => {
  it("opener resistance is force plus weight less margin, wherever the wheel is on the ground", async () => {
    const of = (channel: string) => ask<PassReadings>(`passes/2/readings?channel=${channel}`);
    const [force, margin, resistance] = await Promise.all([of("downforce"), of("margin"), of("resistance")]);
    // 82 kg of row unit at standard gravity.
    const weightN = 82 * 9.80665;
    let compared = 0;
    resistance.values.forEach((row, r) =>
      row.forEach((value, i) => {
        const [f, m] = [force.values[r]![i], margin.values[r]![i]];
        if (typeof f !== "number" || typeof m !== "number" || m <= 0) return expect(value).toBeNull();
        expect(value).toBeCloseTo(f + weightN - m, 2);
        compared += 1;
      }),
    );
    expect(compared).toBeGreaterThan(100);
  });

  it("have row statistics too, worked out once and the same the second time", async () => {
    const first = await ask<RowStatisticsBody>("rows?channel=deviation:margin");
    expect(first.items).toHaveLength(8);
    expect(await ask<RowStatisticsBody>("rows?channel=deviation:margin")).toEqual(first);
    expect((await world.as("owner", { path: path("rows?channel=deviation:moisture") })).status).toBe(422);
    expect((await world.as("owner", { path: path("rows?channel=../x") })).status).toBe(422);
  });
});

/** The middle of a row's cell that ends at a record: half a step back from the row's place there. */
function rowPlace(readings: PassReadings, i: number, row: number): [number, number] {
  const [a, b] = [readings.positions[i - 1]!, readings.positions[i]!];
  const heading = (readings.headingsDeg![i]! * Math.PI) / 180;
  const offsetM = readings.rowOffsetsM![row - 1]!;
  // Metres a degree at 38.4 degrees north, rough: a few millimetres off over a metre.
  const [eastPerDegree, northPerDegree] = [87_300, 111_000];
  return [
    (a[0] + b[0]) / 2 + (offsetM * Math.cos(heading)) / eastPerDegree,
    (a[1] + b[1]) / 2 - (offsetM * Math.sin(heading)) / northPerDegree,
  ];
}

describe("value tiles", () => {
  it("carry the very reading under a place, in the bytes that TileJSON says", async () => {
    const tiles = await ask<TileJson>("tiles/margin/tiles.json");
    const { encoding } = tiles;
    const readings = await ask<PassReadings>("passes/1/readings?channel=margin");
    let compared = 0;
    for (let i = 5; i < readings.records - 5; i += 7) {
      const place = rowPlace(readings, i, 3);
      const at = await ask<ReadingAt>(`at?lon=${place[0]}&lat=${place[1]}`);
      const tile = tileAt(...place, 21);
      const url = `${path(`tiles/margin/${tile.z}/${tile.x}/${tile.y}.png`)}?v=${log.version}`;
      const response = await world.as("viewer", { path: url });
      expect(response.status).toBe(404);
      const png = Buffer.from(await (await world.as("owner", { path: url })).arrayBuffer());
      const { data, info } = await sharp(png).raw().toBuffer({ resolveWithObject: true });
      expect([info.width, info.height]).toEqual([512, 512]);
      const [column, line] = pixelAt(...place, tile, 512);
      const offset = (line * 512 + column) * info.channels;
      const [red, green] = [data[offset]!, data[offset + 1]!];
      const logged = at.values.margin;
      if (logged === null) {
        expect([red, green]).toEqual([0, 0]);
        continue;
      }
      const value = encoding.offset + red * encoding.redFactor + green * encoding.greenFactor;
      expect(Math.abs(value - logged!)).toBeLessThanOrEqual(encoding.step / 2 + 1e-3);
      expect([at.row, at.record]).toEqual([3, readings.firstRecord! + i]);
      expect(readings.values[at.row - 1]![at.record - readings.firstRecord!]).toBe(logged);
      compared += 1;
    }
    expect(compared).toBeGreaterThan(3);
  });

  it("are kept by the browser: immutable under their version, 304 for a known one, nothing logged is 0, 0, 0", async () => {
    const tiles = await ask<TileJson>("tiles/depth/tiles.json");
    expect(tiles.tiles[0]).toContain(`?v=${log.version}`);
    const { x, y, z } = tileAt(tiles.bounds[0]!, tiles.bounds[1]!, 14);
    const address = path(`tiles/depth/${z}/${x}/${y}.png`);
    const fresh = await world.as("owner", { path: `${address}?v=${log.version}` });
    expect(fresh.headers.get("cache-control")).toContain("immutable");
    const etag = fresh.headers.get("etag") ?? "";
    const known = await world.as("owner", { path: address, headers: { "if-none-match": etag } });
    expect(known.status).toBe(304);
    expect(known.headers.get("cache-control")).not.toContain("immutable");
    const empty = await world.as("owner", { path: path("tiles/depth/14/1/1.png") });
    const stats = await sharp(Buffer.from(await empty.arrayBuffer())).stats();
    expect(stats.channels.map((channel) => channel.max)).toEqual([0, 0, 0]);
  });

  it("with class edges are pictures, transparent where nothing was logged", async () => {
    const tiles = await ask<TileJson>("tiles/margin/tiles.json");
    const { x, y, z } = tileAt(tiles.bounds[0]!, tiles.bounds[1]!, 17);
    const address = path(`tiles/margin/${z}/${x}/${y}.png`);
    const response = await world.as("owner", { path: `${address}?breaks=350,550` });
    const { data, info } = await sharp(Buffer.from(await response.arrayBuffer()))
      .ensureAlpha()
      .raw()
      .toBuffer({ resolveWithObject: true });
    const colours = new Set<string>();
    let clear = 0;
    for (let at = 0; at < data.length; at += info.channels) {
      if (data[at + 3] === 0) clear += 1;
      else colours.add(data.subarray(at, at + 3).join(","));
    }
    expect(clear).toBeGreaterThan(0);
    expect(colours.size).toBeGreaterThan(0);
    expect(colours.size).toBeLessThanOrEqual(3);
    const refused = await world.as("owner", { path: `${address}?breaks=5,1` });
    expect(refused.status).toBe(422);
    expect((await world.as("owner", { path: path("tiles/margin/2/9/0.png") })).status).toBe(404);
    expect((await world.as("owner", { path: path("tiles/margin/2/x/0.png") })).status).toBe(404);
  });
});

describe("places", () => {
  it("zones of one row in one class, swaths of every pass, 404 off the field", async () => {
    const zones = await ask<{ features: { properties: { row: number; class: number } }[] }>(
      "zones?channel=margin&breaks=350,550",
    );
    expect(new Set(zones.features.map((zone) => zone.properties.row)).size).toBe(8);
    expect(zones.features.every((zone) => zone.properties.class >= 0 && zone.properties.class <= 2)).toBe(true);
    const swaths = await ask<{ features: unknown[] }>("swaths");
    expect(swaths.features).toHaveLength(log.counts.passes);
    expect((await world.as("owner", { path: path("zones?channel=margin&breaks=x") })).status).toBe(422);
    expect((await world.as("owner", { path: path("at?lon=10&lat=50") })).status).toBe(404);
    expect((await world.as("owner", { path: path("at?lon=1000&lat=50") })).status).toBe(422);
  });
});

describe("ground covered", () => {
  it("is told by cause, adding up to what was worked twice, and drawn as areas", async () => {
    const coverage = await ask<CoverageBody>("coverage");
    const byCause = (coverage.overlapByCause ?? []).reduce((sum, item) => sum + item.areaM2, 0);
    expect(byCause).toBeCloseTo(coverage.overlapM2, 6);
    const { features } = CoverageAreas.parse(await ask("coverage/areas"));
    const skipped = features.filter((area) => area.properties.kind === "skip");
    expect(skipped.length).toBe(coverage.skips?.count);
    const twiceM2 = features
      .filter((area) => area.properties.kind === "overlap")
      .reduce((sum, area) => sum + area.properties.areaM2, 0);
    expect(twiceM2).toBeLessThanOrEqual(coverage.overlapM2 + 1);
  });
});

describe("who may see a log", () => {
  const ENDINGS = [
    "",
    "events",
    "columns",
    "passes",
    "passes/1/readings?channel=margin",
    "rows?channel=margin",
    "coverage",
    "coverage/areas",
    "zones?channel=margin&breaks=400",
    "swaths",
    "tiles/margin/17/29619/50364.png",
    "tiles/margin/tiles.json",
    "at?lon=-98.6125&lat=38.4170",
    "verdict",
    "original",
    "cleaning",
    "export?format=csv",
    "frames?channel=margin",
  ];

  it.each(ENDINGS)(
    "nobody of another organisation, no viewer without the field: /%s is absent for them",
    async (ending) => {
      const address = `/api/v1/logs/${log.id}${ending ? `/${ending}` : ""}`;
      expect((await world.as("other-owner", { path: address })).status).toBe(404);
      // A viewer may export nothing at all, so there the role is too low whatever the log.
      expect((await world.as("viewer", { path: address })).status).toBe(ending.startsWith("export") ? 403 : 404);
      expect((await world.as("stranger", { path: address })).status).toBe(401);
    },
  );

  it("changes are refused too, and leave the log as it was", async () => {
    const address = `/api/v1/logs/${log.id}`;
    const status = async (actor: Actor, method: string, ending: string, body?: unknown) =>
      (await world.as(actor, { method, path: `${address}${ending}`, body })).status;
    expect(await status("other-owner", "DELETE", "")).toBe(404);
    expect(await status("other-owner", "PATCH", "", { name: "theirs" })).toBe(404);
    expect(await status("other-owner", "PUT", "/mapping", { shape: "wide", columns: [] })).toBeGreaterThanOrEqual(404);
    expect(await status("other-owner", "POST", "/cancel")).toBe(404);
    // An operator may remove uploads of their own that were never read; this log is neither.
    expect(await status("operator", "DELETE", "")).toBe(409);
    expect(await status("researcher", "DELETE", "")).toBe(403);
    expect(await status("researcher", "PUT", "/mapping", {})).toBe(403);
    // The second look at a log may add its notes at any time.
    const plain = ({ notes, ...rest }: Log) => ({
      ...rest,
      notes: notes.filter(({ code }) => code !== "row-order-unchecked"),
    });
    expect(plain(await world.getLog(log.id))).toEqual(plain(log));
    const upload = await world.upload({
      bytes: "a,b\n1,2\n",
      name: "theirs.csv",
      actor: "other-owner",
      machineId: null,
    });
    expect(upload.status).toBe(404);
  });

  it("deletion takes the log, what was derived, and its file", async () => {
    const bytes = Buffer.concat([fixtureBytes("csv/wide-newtons/input.csv"), Buffer.from("\n")]);
    const other = await world.uploadAndSettle({ bytes, name: "gone.csv" });
    const key = `organisations/org_larkspurflats/uploads/${other.sha256}`;
    expect(await world.storedKeys()).toContain(key);
    expect((await world.as("agronomist", { method: "DELETE", path: `/api/v1/logs/${other.id}` })).status).toBe(204);
    expect((await world.as("owner", { path: `/api/v1/logs/${other.id}` })).status).toBe(404);
    expect(await world.storedKeys()).not.toContain(key);
  });
});
