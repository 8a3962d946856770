import { gzipSync } from "node:zlib";
import type { BrowserContext, Page } from "playwright-core";

/** A person at a wide window who is signed in, and the address of a log's rows. */
export interface RowsVisit {
  context: BrowserContext;
  url: string;
}

/** Opens the rows and waits until nothing is asked for any more. */
export async function openRows(page: Page, { url }: Pick<RowsVisit, "url">): Promise<void> {
  await page.goto(url);
  await page.getByTestId("class-swatch").first().waitFor();
  await page.locator("canvas.maplibregl-canvas").waitFor();
  await page.waitForLoadState("networkidle");
}

/** Milliseconds from the start of a page to a mark it sets. */
export async function untilMark(page: Page, url: string, mark: string): Promise<number> {
  await page.goto(url, { waitUntil: "commit" });
  const read = (name: string) => performance.getEntriesByName(name)[0]?.startTime ?? 0;
  return (await page.waitForFunction(read, mark, { polling: 100, timeout: 300_000 })).jsonValue();
}

export interface ScriptBytes {
  /** Bytes after gzip, as a server sends them. */
  own: number;
  mapLibrary: number;
  files: { name: string; bytes: number }[];
}

/** Every script that a page asks for until it rests, compressed; the map library's own beside the rest. */
export async function weighScripts(visit: RowsVisit): Promise<ScriptBytes> {
  const page = await visit.context.newPage();
  const bodies: Promise<{ name: string; body: Buffer }>[] = [];
  page.on("response", (response) => {
    const { pathname } = new URL(response.url());
    if (/\.m?js$/.test(pathname)) bodies.push(response.body().then((body) => ({ name: pathname, body })));
  });
  await openRows(page, visit);
  const weight: ScriptBytes = { own: 0, mapLibrary: 0, files: [] };
  for (const { name, body } of await Promise.all(bodies)) {
    const bytes = gzipSync(body).byteLength;
    // A class name that only the library itself writes.
    const isLibrary = name.includes("maplibre-gl") || body.includes("maplibregl-ctrl-attrib");
    weight[isLibrary ? "mapLibrary" : "own"] += bytes;
    weight.files.push({ name, bytes });
  }
  await page.close();
  return weight;
}
