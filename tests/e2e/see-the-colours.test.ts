import { readFileSync } from "node:fs";
import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import path from "node:path";
import type { Map as MapLibreMap } from "maplibre-gl";
import type { Browser, Page } from "playwright-core";
import sharp from "sharp";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { colourExpression, showValues } from "@/components/map/value-layer";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { classOf } from "@/lib/legend/class-edges";
import { classColours } from "@/lib/legend/ramps";
import { cellRing } from "@/lib/map-state/pass-cells";
import { createPassTrack, type PassTrack } from "@/lib/map-state/pass-track";
import { PassReadings, TileJson, type Log } from "@/lib/schemas/logs";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { fromWorld, tileAt, toWorld } from "@/lib/tiles/tile-address";
import { openBrowser } from "@/tests/e2e/open-browser";
import { makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

const ROWS = 12;
const SPACING_M = 0.5;
const PASSES = 20;
const RECORDS = 120;
const STEP_M = 2;
/** Passes end this far below the corner of four tiles. */
const BEFORE_CORNER_M = 4;
const SIZE = { width: 900, height: 600 };

/** From where on cells are wide enough on the screen to hold a noise of their own each. */
const NOISE_FROM_ZOOM = 19;
const ZOOMS = [13, 14, 15, 16, 17, 18, 19, 20, 21];
const CELLS_A_VIEW = 20;

const random = createSeededRandom(8, "colours");
const CLASSES = {
  /** Noise reading by reading. */
  margin: { edges: [200, 400, 600, 800], colours: classColours("viridis", 5) },
  /** Thirds of each pass. */
  depth: { edges: [0.03, 0.05], colours: classColours("YlOrBr", 3) },
};
type Channel = keyof typeof CLASSES;

const third = (alongM: number) => [0.02, 0.04, 0.06][Math.min(2, Math.max(0, Math.floor(alongM / 80)))]!;

/** A corner of four z13 tiles, and so of every finer zoom's: its tile column and row. */
const PLACES = {
  "the northern hemisphere": tileAt(-98.6, 38.4, 13),
  "the southern hemisphere": tileAt(146.5, -34.2, 13),
  "the antimeridian": { z: 13, x: 0, y: tileAt(179, -16.8, 13).y },
};
type Place = keyof typeof PLACES;

function cornerOf(place: Place): [longitude: number, latitude: number] {
  const { x, y } = PLACES[place];
  return fromWorld(x / 2 ** 13, y / 2 ** 13);
}

/** Twenty passes up and down over the corner, half of them on either side of it. */
function writeLog(place: Place): { csv: string; columns: Record<string, unknown>[] } {
  const plane = createLocalPlane(...cornerOf(place));
  const rows = Array.from({ length: ROWS }, (_, row) => row + 1);
  const lines = [
    ["t", "pass", "lon", "lat", ...rows.map((row) => `m${row}`), ...rows.map((row) => `d${row}`)].join(","),
  ];
  let timeS = 0;
  for (let pass = 1; pass <= PASSES; pass += 1) {
    timeS += 60;
    for (let step = 0; step < RECORDS; step += 1, timeS += 1) {
      const isUp = pass % 2 === 1;
      const alongM = isUp ? step * STEP_M : (RECORDS - 1 - step) * STEP_M;
      const [lon, lat] = plane.toDegrees((pass - PASSES / 2 - 0.5) * ROWS * SPACING_M, alongM - BEFORE_CORNER_M);
      const wrapped = ((((lon + 180) % 360) + 360) % 360) - 180;
      const noise = rows.map(() => 5 + 10 * Math.floor(random.uniform() * 100));
      // A cell lies behind its record.
      const depths = rows.map(() => third(alongM + (isUp ? -STEP_M / 2 : STEP_M / 2)));
      lines.push([timeS, pass, wrapped.toFixed(9), lat.toFixed(9), ...noise, ...depths].join(","));
    }
  }
  const columns = [
    { name: "t", channel: "time", unit: "s" },
    { name: "pass", channel: "pass", unit: "1" },
    { name: "lon", channel: "longitude", unit: "deg" },
    { name: "lat", channel: "latitude", unit: "deg" },
    ...rows.map((row) => ({ name: `m${row}`, channel: "margin", row, unit: "N" })),
    ...rows.map((row) => ({ name: `d${row}`, channel: "depth", row, unit: "m" })),
  ];
  return { csv: `${lines.join("\n")}\n`, columns };
}

/** Where the page keeps the map library. */
interface MapWindow {
  library?: typeof import("maplibre-gl");
}

const PAGE = `<!doctype html><link rel="stylesheet" href="/maplibre-gl.css"><div id="map"></div>
<script type="module">import * as library from "/maplibre-gl.mjs"; window.library = library;</script>`;

let world: LogWorld;
let browser: Browser;
let page: Page;
let server: Server;
let baseUrl: string;
const logs = new Map<Place, Log>();

/** The map library's own files, an empty page, and behind /api the routes of the application. */
function serve(): Promise<Server> {
  const types: Record<string, string> = { mjs: "text/javascript", css: "text/css" };
  const made = createServer((request, response) => {
    void (async () => {
      const address = request.url ?? "/";
      if (address.startsWith("/api/")) {
        const reply = await world.as("owner", { path: address });
        response.writeHead(reply.status, { "content-type": reply.headers.get("content-type") ?? "" });
        return response.end(Buffer.from(await reply.arrayBuffer()));
      }
      const file = /^\/(maplibre-gl[\w-]*\.(mjs|css))$/.exec(address);
      if (file) {
        response.writeHead(200, { "content-type": types[file[2]!] });
        return response.end(readFileSync(path.join("node_modules/maplibre-gl/dist", file[1]!)));
      }
      response.writeHead(200, { "content-type": "text/html" });
      response.end(PAGE);
    })();
  });
  return new Promise((resolve) => made.listen(0, "127.0.0.1", () => resolve(made)));
}

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  const machine = await world.read("owner", {
    method: "POST",
    path: "/api/v1/machines",
    body: {
      kind: "seeder",
      name: "Twelve rows",
      rowCount: ROWS,
      rowSpacingM: SPACING_M,
      antennaToRowsM: 0,
      antennaRightM: 0,
      hitch: "rigid",
      rowUnitMassKg: 82,
    },
    expect: 201,
  });
  for (const place of Object.keys(PLACES) as Place[]) {
    const { csv, columns } = writeLog(place);
    const mapping = { columns, shape: "wide" };
    const log = await world.uploadAndSettle({ bytes: csv, name: "a.csv", mapping, machineId: String(machine.id) });
    expect(log).toMatchObject({ status: "ready", counts: { passes: PASSES } });
    logs.set(place, log);
  }
  server = await serve();
  baseUrl = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  browser = await openBrowser();
  page = await browser.newPage({ viewport: SIZE });
});
afterAll(async () => {
  await browser?.close();
  server?.close();
  await world?.close();
});

/** What the application's own layer code asks of the map, to be asked of the one in the browser. */
function layerOf(tileJson: TileJson, channel: Channel): { source: unknown; layer: unknown } {
  vi.stubGlobal("window", { location: { origin: baseUrl } });
  const { edges, colours } = CLASSES[channel];
  const asked: { source: unknown; layer: unknown } = { source: null, layer: null };
  const map = {
    getLayer: () => undefined,
    getSource: () => undefined,
    addSource: (_: string, source: unknown) => (asked.source = source),
    addLayer: (layer: unknown) => (asked.layer = layer),
    on: () => undefined,
  } as unknown as MapLibreMap;
  showValues(map, { tileJson, colour: colourExpression(edges, colours, tileJson.encoding), beforeLayer: "none" });
  vi.unstubAllGlobals();
  return asked;
}

interface View {
  place: Place;
  channel: Channel;
  zoom: number;
}

/** A picture of the map over the corner, once every tile is drawn. */
async function pictureOf({ place, channel, zoom }: View): Promise<Buffer> {
  const log = logs.get(place)!;
  const answer = await world.read("owner", { path: `/api/v1/logs/${log.id}/tiles/${channel}/tiles.json` });
  const shown = { ...layerOf(TileJson.parse(answer), channel), center: cornerOf(place), zoom, size: SIZE };
  await page.goto(baseUrl);
  await page.evaluate(async ({ source, layer, center, zoom: z, size }) => {
    const box = document.querySelector<HTMLElement>("#map")!;
    Object.assign(document.body.style, { margin: "0" });
    Object.assign(box.style, { width: `${size.width}px`, height: `${size.height}px` });
    const maplibre = (window as MapWindow).library!;
    maplibre.setWorkerUrl("/maplibre-gl-worker.mjs");
    const style = { version: 8 as const, sources: {}, layers: [] };
    const map = new maplibre.Map({
      container: box,
      style,
      center,
      zoom: z,
      maxZoom: 22,
      attributionControl: false,
      fadeDuration: 0,
    });
    await new Promise((resolve) => map.once("load", resolve));
    map.addSource("values", source as Parameters<MapLibreMap["addSource"]>[1]);
    map.addLayer(layer as Parameters<MapLibreMap["addLayer"]>[0]);
    await new Promise((resolve) => map.once("idle", resolve));
  }, shown);
  const { data } = await sharp(await page.screenshot())
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return data;
}

const tracks = new Map<string, PassTrack[]>();

async function tracksOf(place: Place, channel: Channel): Promise<PassTrack[]> {
  const key = `${place} ${channel}`;
  if (!tracks.has(key)) {
    const log = logs.get(place)!;
    // The passes about the corner; those farther out look alike.
    const asked = [6, 8, 9, 10, 11, 12, 13, 15].map((pass) =>
      world.read("owner", { path: `/api/v1/logs/${log.id}/passes/${pass}/readings?channel=${channel}` }),
    );
    tracks.set(
      key,
      (await Promise.all(asked)).map((reply) => createPassTrack(PassReadings.parse(reply))),
    );
  }
  return tracks.get(key)!;
}

interface Cell {
  /** Of its middle on the screen. */
  x: number;
  y: number;
  value: number;
  isNearSeam: boolean;
  isNearEnd: boolean;
}

/** A field of one class must reach this far about a cell, in pixels, where many cells make one. */
const CLEAR_PX = 2.5;

/** Every cell on the screen that is known to show its own class: close up all of them, far out those well within a third. */
async function cellsOnScreen({ place, channel, zoom }: View): Promise<Cell[]> {
  const scale = 512 * 2 ** zoom;
  const [cornerX, cornerY] = toWorld(...cornerOf(place));
  const metrePx = scale / (40_075_016.7 * Math.cos((cornerOf(place)[1] * Math.PI) / 180));
  const cells: Cell[] = [];
  for (const track of await tracksOf(place, channel)) {
    for (let record = 0; record < track.records; record += 1) {
      for (let row = 1; row <= ROWS; row += 1) {
        const ring = cellRing(track, record, row).slice(0, 4);
        const middle = [0, 1].map((axis) => ring.reduce((sum, corner) => sum + corner[axis]!, 0) / 4);
        const [worldX, worldY] = toWorld(middle[0]!, middle[1]!);
        // Across the antimeridian the nearer of the map's copies.
        const [dx, dy] = [(worldX - cornerX - Math.round(worldX - cornerX)) * scale, (worldY - cornerY) * scale];
        const [x, y] = [SIZE.width / 2 + dx, SIZE.height / 2 + dy];
        if (x < 1 || y < 1 || x >= SIZE.width - 1 || y >= SIZE.height - 1) continue;
        const alongM = BEFORE_CORNER_M - dy / metrePx;
        const clearM = CLEAR_PX / metrePx;
        const sideM = Math.abs(dx) / metrePx;
        const isWithin = alongM % 80 > clearM && alongM % 80 < 80 - clearM && sideM < 60 - clearM;
        if (channel === "depth" && !isWithin) continue;
        cells.push({
          x,
          y,
          value: track.values[record * ROWS + row - 1]!,
          isNearSeam: Math.min(Math.abs(dx), Math.abs(dy)) < 12,
          isNearEnd: record < 2 || record > RECORDS - 3,
        });
      }
    }
  }
  return cells;
}

/** Some near seams, some at the ends of passes, the rest anywhere. */
function chooseCells(cells: readonly Cell[]): Cell[] {
  const pick = (from: readonly Cell[], count: number) =>
    Array.from({ length: Math.min(count, from.length) }, () => from[Math.floor(random.uniform() * from.length)]!);
  const seam = pick(
    cells.filter((cell) => cell.isNearSeam),
    8,
  );
  const ends = pick(
    cells.filter((cell) => cell.isNearEnd),
    4,
  );
  return [...seam, ...ends, ...pick(cells, CELLS_A_VIEW - seam.length - ends.length)];
}

describe("colours on the map", () => {
  const seen = { cells: 0, nearSeam: 0, nearEnd: 0 };

  it.each(Object.keys(PLACES) as Place[])(
    "at %s are the legend's at every known cell, from far to close",
    async (place) => {
      for (const zoom of ZOOMS) {
        const channel: Channel = zoom < NOISE_FROM_ZOOM ? "depth" : "margin";
        const view = { place, channel, zoom };
        const data = await pictureOf(view);
        const { edges, colours } = CLASSES[channel];
        const found = chooseCells(await cellsOnScreen(view));
        expect(found).toHaveLength(CELLS_A_VIEW);
        const drawn = found.map(({ x, y }) => {
          const at = (Math.floor(y) * SIZE.width + Math.floor(x)) * 3;
          return `#${data.subarray(at, at + 3).toString("hex")}`;
        });
        const wanted = found.map(({ value }) => colours[classOf(value, edges)]!);
        expect({ zoom, drawn }).toEqual({ zoom, drawn: wanted });
        // A map of one colour would agree with anything.
        expect(new Set(wanted).size).toBeGreaterThan(zoom < 19 && zoom > 16 ? 0 : 1);
        seen.cells += found.length;
        seen.nearSeam += found.filter((cell) => cell.isNearSeam).length;
        seen.nearEnd += found.filter((cell) => cell.isNearEnd).length;
      }
    },
  );

  it("were read at 500 cells and more, among them some near seams of tiles and ends of passes", () => {
    expect(seen.cells).toBeGreaterThanOrEqual(500);
    expect(seen.nearSeam).toBeGreaterThanOrEqual(150);
    expect(seen.nearEnd).toBeGreaterThanOrEqual(50);
  });
});
