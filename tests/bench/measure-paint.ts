import type { Browser } from "playwright-core";
import { VALUES_PAINTED } from "@/components/map/value-layer";
import { buildLog } from "@/lib/build/build-log";
import { createBenchmarkLog } from "@/lib/simulator/benchmark-log";
import { buildTileIndex } from "@/lib/tiles/build-tile-index";
import type { TileAddress } from "@/lib/tiles/tile-address";
import type { BenchContext } from "@/tests/bench/bench-context";
import { makeVectorTile } from "@/tests/bench/make-vector-tile";
import { measureInteractions } from "@/tests/bench/measure-interactions";
import { openRows, untilMark, weighScripts, type RowsVisit } from "@/tests/bench/open-rows";
import { printGoal, printLimit, type Pair } from "@/tests/bench/ratios";
import { serveVectorPage, type VectorLook } from "@/tests/bench/serve-vector-page";
import { openBrowser, SIZES } from "@/tests/e2e/open-browser";

const CHANNEL = "margin";

/** The field book of the large log in a real browser: first paint, interactions, scripts, requests while pointing. */
export async function measurePaint(bench: BenchContext, logId: string, rounds: number): Promise<void> {
  const browser = await openBrowser();
  try {
    const visit = await beginVisit(browser, bench, logId);
    const weight = await weighScripts(visit);
    const mapKb = (weight.mapLibrary / 1000).toFixed(0);
    const note = `beside ${mapKb} kB of the map library`;
    printLimit("first scripts of the rows, gzipped", weight.own / 1000, { atMost: 450, unit: "kB", note });
    if (process.env.BENCH_SCRIPTS) console.table(weight.files.sort((a, b) => b.bytes - a.bytes));
    await measureFirstPaint(visit, { browser, bench, logId, rounds });
    await measureInteractions(visit);
  } finally {
    await browser.close();
  }
}

async function beginVisit(
  browser: Browser,
  { server, cookie, fieldId }: BenchContext,
  logId: string,
): Promise<RowsVisit> {
  const context = await browser.newContext({ viewport: SIZES.wide });
  context.setDefaultTimeout(120_000);
  const cookies = cookie.split("; ").map((pair) => {
    const at = pair.indexOf("=");
    return { name: pair.slice(0, at), value: pair.slice(at + 1), url: server.baseUrl };
  });
  await context.addCookies(cookies);
  const url = `${server.baseUrl}/larkspur-flats/fields/${fieldId}/rows?log=${logId}&channel=${CHANNEL}`;
  return { context, url };
}

interface PaintInput {
  browser: Browser;
  bench: BenchContext;
  logId: string;
  rounds: number;
}

/** Cells as they are, and the least that a maker of vector tiles would have to send. */
const BASES = [
  { label: "first paint of the large log / fill layer of vector tiles, a polygon a cell", leastPx: 0 },
  { label: "  the same, cells put together to a pixel of the screen", leastPx: 1 },
];

/** Fresh caches for either page in every round; tiles of both lie ready on their servers after the first. */
async function measureFirstPaint(visit: RowsVisit, { browser, bench, logId, rounds }: PaintInput): Promise<void> {
  const look = await readLook(visit);
  const built = buildLog(createBenchmarkLog("large"), null);
  if (!built.ok) throw new Error(built.error.message);
  const { placed } = built.value;
  const index = buildTileIndex(placed);
  const channel = placed.log.channels.find(({ id }) => id === CHANNEL)!;
  for (const { label, leastPx } of BASES) {
    const sizes = { features: 0, bytes: 0 };
    const drawTile = (address: TileAddress) => {
      const tile = makeVectorTile({ index, channel, leastPx }, address);
      sizes.features += tile.features;
      sizes.bytes += tile.bytes.byteLength;
      return tile.bytes;
    };
    const vector = await serveVectorPage({ look, mark: VALUES_PAINTED, drawTile });
    const pairs = await pairVisits(vector.url, { browser, bench, logId, rounds });
    await vector.close();
    const note = `${sizes.features} polygons, ${(sizes.bytes / 1e6).toFixed(1)} MB at z${Math.floor(look.zoom)}`;
    printGoal(label, pairs, { atMost: 0.35, note });
    const seconds = pairs.map(({ ours, base }) => `${(ours / 1000).toFixed(1)}/${(base / 1000).toFixed(1)}`);
    console.log(`  seconds, ours/theirs: ${seconds.join(" ")}`);
  }
}

/** Visits to either page in turn; the first pair, of servers that never drew the log, does not count. */
async function pairVisits(vectorUrl: string, { browser, bench, logId, rounds }: PaintInput): Promise<Pair[]> {
  const pairs: Pair[] = [];
  for (let round = 0; round <= rounds; round++) {
    const ours = await inFreshContext(() => beginVisit(browser, bench, logId));
    const base = await inFreshContext(async () => ({
      context: await browser.newContext({ viewport: SIZES.wide }),
      url: vectorUrl,
    }));
    if (round > 0) pairs.push({ ours, base });
  }
  return pairs;
}

async function inFreshContext(begin: () => Promise<RowsVisit>): Promise<number> {
  const { context, url } = await begin();
  try {
    return await untilMark(await context.newPage(), url, VALUES_PAINTED);
  } finally {
    await context.close();
  }
}

/** Where the field book's map opens, how large it is, and its classes. */
async function readLook(visit: RowsVisit): Promise<VectorLook> {
  const page = await visit.context.newPage();
  await openRows(page, visit);
  const box = (await page.locator("canvas.maplibregl-canvas").boundingBox())!;
  const swatches = page.getByTestId("class-swatch");
  const colours = await swatches.evaluateAll((all) => all.map((swatch) => swatch.getAttribute("data-colour") ?? ""));
  const handles = page.getByTestId("histogram").getByRole("slider");
  const edges = await handles.evaluateAll((all) => all.map((one) => Number(one.getAttribute("aria-valuenow"))));
  // The address names the view once the map was moved: two keys move it there and back.
  await page.locator("canvas.maplibregl-canvas").focus();
  for (const key of ["ArrowRight", "ArrowLeft"]) {
    await page.keyboard.press(key);
    await page.waitForTimeout(2_000);
  }
  const [longitude = NaN, latitude = NaN, zoom = NaN] = (new URL(page.url()).searchParams.get("view") ?? "")
    .split(",")
    .map(Number);
  await page.close();
  return { longitude, latitude, zoom, width: box.width, height: box.height, edges, colours };
}
