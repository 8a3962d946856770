import axe from "axe-core";
import type { Browser, Page } from "playwright-core";
import sharp from "sharp";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { classOf } from "@/lib/legend/class-edges";
import { cellRing } from "@/lib/map-state/pass-cells";
import { createPassTrack, recordSpanM, type PassTrack } from "@/lib/map-state/pass-track";
import { FieldList } from "@/lib/schemas/fields";
import { LogList, PassList, PassReadings } from "@/lib/schemas/logs";
import { toWorld } from "@/lib/tiles/tile-address";
import { UNITS } from "@/lib/units/unit-table";
import { beginVisit, openBrowser, signInAs } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const AGRONOMIST = { email: "agronomist@larkspur.example", password: DEMO_PASSWORD };
const ZOOM = 20;

interface World {
  address: string;
  track: PassTrack;
  view: [longitude: number, latitude: number];
}

let server: TestServer;
let browser: Browser;
let world: World;

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
  world = await findPass();
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
});

/** A long pass of the seeding log of East quarter, and an address that shows its middle close up. */
async function findPass(): Promise<World> {
  const cookie = await server.signIn(AGRONOMIST.email);
  const ask = async (path: string) => (await fetch(`${server.baseUrl}/api/v1${path}`, { headers: { cookie } })).json();
  const field = FieldList.parse(await ask("/fields")).items.find(({ name }) => name === "East quarter")!;
  const log = LogList.parse(await ask(`/fields/${field.id}/logs`)).items.find(({ kind }) => kind === "seeding")!;
  const passes = PassList.parse(await ask(`/logs/${log.id}/passes?limit=500`)).items;
  const longest = passes.toSorted((a, b) => b.lengthM - a.lengthM).find(({ headland }) => !headland)!;
  const path = `/logs/${log.id}/passes/${longest.pass}/readings?channel=margin`;
  const track = createPassTrack(PassReadings.parse(await ask(path)));
  const middle = Math.floor(track.records / 2);
  const view: [number, number] = [track.longitude[middle]!, track.latitude[middle]!];
  const query = `log=${log.id}&channel=margin&pass=${longest.pass}&view=${view.join(",")},${ZOOM}`;
  return { address: `/larkspur-flats/fields/${field.id}/rows?${query}`, track, view };
}

async function openRows(page: Page): Promise<void> {
  await signInAs(page, server.baseUrl, AGRONOMIST);
  await page.goto(server.baseUrl + world.address);
  await page.getByRole("heading", { name: `Pass ${world.track.pass} of` }).waitFor();
  await page.getByTestId("class-swatch").first().waitFor();
  await page.locator("canvas.maplibregl-canvas").waitFor();
  await page.waitForLoadState("networkidle");
}

/** Where a reading's cell has its middle on the screen. */
async function cellOnScreen(page: Page, record: number, row: number): Promise<{ x: number; y: number }> {
  const box = (await page.locator("canvas.maplibregl-canvas").boundingBox())!;
  const ring = cellRing(world.track, record, row).slice(0, 4);
  const [cellX, cellY] = toWorld(mean(ring.map(([x]) => x!)), mean(ring.map(([, y]) => y!)));
  const [middleX, middleY] = toWorld(...world.view);
  const scale = 512 * 2 ** ZOOM;
  return {
    x: box.x + box.width / 2 + (cellX - middleX) * scale,
    y: box.y + box.height / 2 + (cellY - middleY) * scale,
  };
}

function mean(values: number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Edges in newtons and colours, as the legend states them. */
async function readLegend(page: Page): Promise<{ edges: number[]; colours: string[] }> {
  const handles = page.getByTestId("histogram").getByRole("slider");
  const shown = await handles.evaluateAll((found) =>
    found.map((handle) => Number(handle.getAttribute("aria-valuenow"))),
  );
  const words = (await handles.first().getAttribute("aria-valuetext")) ?? "";
  const factor = words.endsWith("lbf") ? UNITS.lbf.factor : 1;
  const colours = await page
    .getByTestId("class-swatch")
    .evaluateAll((found) => found.map((swatch) => swatch.getAttribute("data-colour") ?? ""));
  return { edges: shown.map((edge) => edge * factor), colours };
}

/** Whether the middle of the map shows a class colour, not bare ground. */
async function isFieldColoured(page: Page): Promise<boolean> {
  const { colours } = await readLegend(page);
  const box = (await page.locator("canvas.maplibregl-canvas").boundingBox())!;
  const clip = { x: box.x + box.width / 2 + 40, y: box.y + box.height / 2, width: 20, height: 20 };
  const { data } = await sharp(await page.screenshot({ clip }))
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  const drawn = `#${[...data.subarray(0, 3)].map((byte) => byte.toString(16).padStart(2, "0")).join("")}`;
  return colours.includes(drawn);
}

interface Sample {
  record: number;
  row: number;
  drawn: string;
  wanted: string;
}

/** The colours on the map at many known cells of the pass, beside those the legend demands. */
async function sampleMap(page: Page): Promise<Sample[]> {
  const { edges, colours } = await readLegend(page);
  const { data, info } = await sharp(await page.screenshot())
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  const samples: Sample[] = [];
  const middle = Math.floor(world.track.records / 2);
  for (let record = middle - 4; record <= middle + 4; record += 1) {
    for (const row of [3, 6, 9, 14, 17, 20, 22]) {
      const value = world.track.values[record * world.track.rows + row - 1]!;
      const { x, y } = await cellOnScreen(page, record, row);
      // Values at an edge to the last figure may be rounded to either side; cells under the buttons are hidden.
      if (Number.isNaN(value) || edges.some((edge) => Math.abs(edge - value) < 1e-3)) continue;
      const at = (Math.floor(y) * info.width + Math.floor(x)) * 3;
      const drawn = `#${[...data.subarray(at, at + 3)].map((byte) => byte.toString(16).padStart(2, "0")).join("")}`;
      samples.push({ record, row, drawn, wanted: colours[classOf(value, edges)] ?? "" });
    }
  }
  return samples;
}

describe("the rows of a field, wide", () => {
  it("draws known cells in the colour that the legend gives their class, and recolours without a request", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, "wide");
    await openRows(page);
    await expect
      .poll(async () => (await sampleMap(page)).filter(({ drawn, wanted }) => drawn !== wanted), POLL)
      .toEqual([]);
    const samples = await sampleMap(page);
    expect(samples.length).toBeGreaterThan(40);
    expect(new Set(samples.map(({ wanted }) => wanted)).size).toBeGreaterThan(1);
    expect(await picture("rows-close")).toBeLessThanOrEqual(0);

    const requests: string[] = [];
    page.on("request", (request) => requests.push(request.url()));
    await page.getByRole("button", { name: "Classes" }).click();
    await page.getByRole("menuitem", { name: "As much distance in each" }).click();
    await expect.poll(async () => (await readLegend(page)).colours.length, POLL).toBe(6);
    await expect
      .poll(async () => (await sampleMap(page)).filter(({ drawn, wanted }) => drawn !== wanted), POLL)
      .toEqual([]);
    expect(requests.filter((url) => url.includes("/tiles/"))).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it("names the reading under the pointer, the same on the map and on the unrolled pass", async () => {
    const { page, context } = await beginVisit(browser, "wide");
    await openRows(page);
    const record = Math.floor(world.track.records / 2);
    const readout = page.getByTestId("readout");
    const onMap = await cellOnScreen(page, record, 9);
    await page.mouse.move(onMap.x, onMap.y);
    await readout.getByText("Row 9", { exact: true }).waitFor();
    const fromMap = await readout.textContent();

    const plot = (await page.getByTestId("unrolled-plot").boundingBox())!;
    const [fromM, toM] = recordSpanM(world.track, record);
    await page.mouse.move(10, 10);
    await page.mouse.move(
      plot.x + ((fromM + toM) / 2 / world.track.lengthM) * plot.width,
      plot.y + (8.5 / world.track.rows) * plot.height,
    );
    await expect.poll(() => readout.textContent(), POLL).toBe(fromMap);
    await context.close();
  });

  it("can be worked by keys: reading by reading, row by row, pass by pass", async () => {
    const { page, context } = await beginVisit(browser, "wide");
    await openRows(page);
    await page.getByTestId("unrolled-plot").focus();
    await page.keyboard.press("ArrowDown");
    await page.keyboard.press("ArrowDown");
    await page.getByTestId("readout").getByText("Row 3", { exact: true }).waitFor();
    await page.keyboard.press("Enter");
    expect(await page.getByRole("option", { name: /^Row 3\b/ }).getAttribute("aria-selected")).toBe("true");
    await page.keyboard.press("]");
    await page.getByRole("heading", { name: `Pass ${world.track.pass + 1} of` }).waitFor();
    await page.keyboard.press("[");
    await page.getByRole("heading", { name: `Pass ${world.track.pass} of` }).waitFor();
    await expect.poll(() => new URL(page.url()).searchParams.get("row"), POLL).toBe("3");
    await context.close();
  });

  it("unrolls the pass that is clicked, and moves the map only when asked", async () => {
    const { page, context } = await beginVisit(browser, "wide");
    await openRows(page);
    const box = (await page.locator("canvas.maplibregl-canvas").boundingBox())!;
    await page.mouse.click(box.x + 60, box.y + box.height / 2);
    await expect.poll(() => new URL(page.url()).searchParams.get("pass"), POLL).not.toBe(String(world.track.pass));
    const view = () => new URL(page.url()).searchParams.get("view")!.split(",").map(Number);
    expect(view()[2]).toBe(ZOOM);
    await page
      .getByRole("button", { name: /^See it/ })
      .first()
      .click();
    await expect.poll(() => view()[2], POLL).not.toBe(ZOOM);
    await context.close();
  });

  it("fits the window and breaks no rule of accessibility that can be checked by a program", async () => {
    const { page, context, picture } = await beginVisit(browser, "wide");
    await openRows(page);
    await page.getByRole("button", { name: "Whole field" }).click();
    await page.getByRole("radio", { name: "Opener resistance" }).click();
    await page.getByRole("heading", { name: /^Opener resistance/ }).waitFor();
    await expect.poll(() => isFieldColoured(page), POLL).toBe(true);
    expect(await picture("rows")).toBeLessThanOrEqual(0);
    expect(await page.evaluate(() => document.documentElement.scrollHeight - window.innerHeight)).toBeLessThanOrEqual(
      0,
    );
    expect(await findFaults(page)).toEqual([]);
    await context.close();
  });
});

describe("the rows of a field, phone", () => {
  it("begin with the verdict, readable without scrolling, and end with the pass upright", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, "phone");
    await signInAs(page, server.baseUrl, AGRONOMIST);
    await page.goto(server.baseUrl + world.address);
    await page.getByTestId("class-swatch").first().waitFor();
    await page.waitForLoadState("networkidle");
    const verdict = (await page.getByTestId("verdict").boundingBox())!;
    const bar = (await page.getByRole("navigation", { name: "Chapters of this field" }).boundingBox())!;
    const sentences = page.getByTestId("verdict").getByRole("listitem");
    const third = (await sentences
      .nth(Math.min(2, (await sentences.count()) - 1))
      .locator("p")
      .first()
      .boundingBox())!;
    expect(verdict.y).toBeLessThan(100);
    expect(third.y + third.height).toBeLessThanOrEqual(bar.y);
    const plot = (await page.getByTestId("unrolled-plot").boundingBox())!;
    expect(plot.height).toBeGreaterThan(plot.width);
    expect(await picture("rows")).toBeLessThanOrEqual(0);
    expect(await picture("rows-whole", { fullPage: true })).toBeLessThanOrEqual(0);
    expect(await findFaults(page)).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  });
});

const POLL = { timeout: 30_000, interval: 500 };

/** Faults that axe finds by the rules of WCAG 2.1 A and AA, by name and place. */
async function findFaults(page: Page): Promise<string[]> {
  await page.evaluate(axe.source);
  return page.evaluate(async () => {
    const runner = (window as unknown as { axe: typeof import("axe-core") }).axe;
    const tags = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa"];
    const { violations } = await runner.run(document, { runOnly: { type: "tag", values: tags } });
    return violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(" ")).join(", ")}`);
  });
}
