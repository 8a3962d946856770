import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { beginVisit, openBrowser, signInAs } from "@/tests/e2e/open-browser";
import { listScreens, OWNER, type Screen } from "@/tests/e2e/screens";
import { startTestServer, type TestServer } from "@/tests/support/server";

/** Web Vitals call 0.1 good; ours hold still. */
const MOST_SHIFT = 0.02;
const BUSY = ["fields", "logs", "rows", "log", "columns", "machines", "links"];

let server: TestServer;
let browser: Browser;
let screens: Screen[];

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
  screens = (await listScreens(server)).filter(({ name }) => BUSY.includes(name));
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
});

interface Shift {
  score: number;
  /** What moved. */
  nodes: string[];
}

/** Notes every shift of the layout that nobody's press has caused, from the page's first moment on. */
async function watchShifts(page: Page): Promise<() => Promise<Shift[]>> {
  await page.addInitScript(() => {
    const shifts: Shift[] = [];
    Object.assign(window, { noticedShifts: shifts });
    new PerformanceObserver((list) => {
      for (const entry of list.getEntries() as LayoutShift[]) {
        if (entry.hadRecentInput) continue;
        const nodes = entry.sources.map(({ node }) => (node instanceof Element ? node.outerHTML.slice(0, 90) : "text"));
        shifts.push({ score: entry.value, nodes });
      }
    }).observe({ type: "layout-shift", buffered: true });
  });
  return () => page.evaluate(() => (window as unknown as { noticedShifts: Shift[] }).noticedShifts);
}

/** Layout Instability API; not in the DOM types. */
interface LayoutShift extends PerformanceEntry {
  value: number;
  hadRecentInput: boolean;
  sources: { node: Node | null }[];
}

describe.each(["wide", "phone"] as const)("while it is fetched, %s", (size) => {
  it("every busy screen holds still", async () => {
    const { page, context } = await beginVisit(browser, size);
    await signInAs(page, server.baseUrl, OWNER);
    const readShifts = await watchShifts(page);
    const moved: Record<string, Shift[]> = {};
    for (const { name, path } of screens) {
      await page.goto(server.baseUrl + path);
      await page.waitForLoadState("networkidle");
      const shifts = await readShifts();
      const score = shifts.reduce((sum, shift) => sum + shift.score, 0);
      if (process.env.SAY_SHIFTS) console.log(size, name, score.toFixed(4));
      if (score >= MOST_SHIFT) moved[name] = shifts;
    }
    expect(moved).toEqual({});
    await context.close();
  });
});
