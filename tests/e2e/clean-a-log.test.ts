import axe from "axe-core";
import type { Browser, Locator, Page } from "playwright-core";
import sharp from "sharp";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { FieldList } from "@/lib/schemas/fields";
import { LogList } from "@/lib/schemas/logs";
import { beginVisit, openBrowser, signInAs } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const AGRONOMIST = { email: "agronomist@larkspur.example", password: DEMO_PASSWORD };
const POLL = { timeout: 60_000, interval: 500 };

let server: TestServer;
let browser: Browser;
/** Addresses of the seeding log of East quarter. */
let paths: { cleaning: string; rows: string };

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
  const cookie = await server.signIn(AGRONOMIST.email);
  const ask = async (path: string) => (await fetch(`${server.baseUrl}/api/v1${path}`, { headers: { cookie } })).json();
  const field = FieldList.parse(await ask("/fields")).items.find(({ name }) => name === "East quarter")!;
  const log = LogList.parse(await ask(`/fields/${field.id}/logs`)).items.find(({ kind }) => kind === "seeding")!;
  const root = `${server.baseUrl}/larkspur-flats/fields/${field.id}`;
  paths = { cleaning: `${root}/logs/${log.id}/cleaning`, rows: `${root}/rows?log=${log.id}` };
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
});

/** Pixels of a map as dark as ink: boundary and numbers of the grid, and the strokes of left-out readings. */
async function inkOn(map: Locator): Promise<number> {
  await map.scrollIntoViewIfNeeded();
  const { data } = await sharp(await map.screenshot())
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  let ink = 0;
  for (let at = 0; at < data.length; at += 3) {
    if (data[at]! < 0x30 && data[at + 1]! < 0x34 && data[at + 2]! < 0x40) ink += 1;
  }
  return ink;
}

/** Both maps once they have stopped changing. */
async function settledInk(page: Page): Promise<{ asLogged: number; cleaned: number }> {
  await page.waitForLoadState("networkidle");
  const look = async () => ({
    asLogged: await inkOn(page.getByRole("region", { name: "Map, as logged" })),
    cleaned: await inkOn(page.getByRole("region", { name: "Map, with the rules in force" })),
  });
  let before = await look();
  for (let turn = 0; turn < 20; turn += 1) {
    await page.waitForTimeout(700);
    const now = await look();
    if (now.asLogged === before.asLogged && now.cleaned === before.cleaned && now.asLogged > 0) return now;
    before = now;
  }
  return before;
}

/** A line of the table of effects, whether its rules are tried or used. */
async function effectOf(page: Page, measure: string): Promise<string> {
  const table = page.getByRole("table", { name: "Each measure as logged and with the rules" });
  const words = await table.getByRole("row", { name: new RegExp(`^${measure}`) }).textContent();
  return (words ?? "").replace("With these rules", "With the rules");
}

/** Readings of all rows in the line-up's table. */
async function readingsInLineUp(page: Page): Promise<number> {
  const table = page.getByRole("table", { name: /^The rows compared by/ });
  if (!(await table.isVisible())) await page.getByRole("button", { name: "As a table" }).click();
  await table.waitFor();
  const heads = await table.getByRole("columnheader").allTextContents();
  const column = heads.findIndex((head) => head.startsWith("Readings"));
  const cells = await table.locator(`tbody tr td:nth-child(${column + 1})`).allTextContents();
  return cells.reduce((sum, cell) => sum + Number(cell.replaceAll(/\D/g, "")), 0);
}

async function findFaults(page: Page): Promise<string[]> {
  await page.evaluate(axe.source);
  return page.evaluate(async () => {
    const runner = (window as unknown as { axe: typeof import("axe-core") }).axe;
    const tags = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa"];
    const { violations } = await runner.run(document, { runOnly: { type: "tag", values: tags } });
    return violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(" ")).join(", ")}`);
  });
}

describe("the cleaning of a log", () => {
  it("is tried, used, seen in the table, on the map and in the rows, and undone", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, "wide");
    await signInAs(page, server.baseUrl, AGRONOMIST);
    await page.goto(paths.cleaning);
    const starts = page.getByRole("switch", { name: "Start of a pass" });
    await starts.waitFor();
    const before = await settledInk(page);
    const asRead = await effectOf(page, "Readings");

    await starts.check();
    await page.getByText(/Would leave out [\d.]+\s% of the readings in passes; now it is 0\s%/).waitFor();
    await expect.poll(() => effectOf(page, "Readings"), POLL).not.toBe(asRead);
    const tried = await effectOf(page, "Readings");
    // A trial keeps nothing.
    await page.reload();
    await starts.waitFor();
    expect(await starts.isChecked()).toBe(false);

    await starts.check();
    await page.getByRole("button", { name: "Use these rules" }).click();
    await page.getByText("Change 1", { exact: true }).waitFor();
    expect(await effectOf(page, "Readings")).toBe(tried);
    const used = await settledInk(page);
    expect(Math.abs(used.asLogged - before.asLogged)).toBeLessThan(20);
    expect(used.cleaned - before.cleaned).toBeGreaterThan(60);
    expect(await picture("cleaning", { fullPage: true })).toBeLessThanOrEqual(0);
    expect(await findFaults(page)).toEqual([]);

    await page.goto(paths.rows);
    await page.getByTestId("class-swatch").first().waitFor();
    const cleaned = await readingsInLineUp(page);
    await page.getByRole("button", { name: "Close the table" }).click();
    await page.getByRole("radio", { name: "as logged" }).click();
    await expect.poll(() => new URL(page.url()).searchParams.get("cleaned"), POLL).toBe("0");
    await expect.poll(() => readingsInLineUp(page), POLL).toBeGreaterThan(cleaned);

    await page.goto(paths.cleaning);
    await page.getByRole("button", { name: "Undo the last change" }).click();
    await page.getByText("Change 2", { exact: true }).waitFor();
    expect(await starts.isChecked()).toBe(false);
    expect(await effectOf(page, "Readings")).toBe(asRead);
    const undone = await settledInk(page);
    expect(Math.abs(undone.cleaned - before.cleaned)).toBeLessThan(20);
    await page.goto(paths.rows);
    await page.getByTestId("class-swatch").first().waitFor();
    expect(await page.getByRole("radio", { name: "as logged" }).count()).toBe(0);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it("fits a phone, and is to look at only for a researcher", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, "phone");
    await signInAs(page, server.baseUrl, { email: "researcher@larkspur.example", password: DEMO_PASSWORD });
    await page.goto(paths.cleaning);
    await page.getByText("You are here as researcher.", { exact: false }).waitFor();
    expect(await page.getByRole("switch", { name: "Start of a pass" }).isDisabled()).toBe(true);
    expect(await picture("cleaning", { fullPage: true })).toBeLessThanOrEqual(0);
    expect(await findFaults(page)).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  });
});
