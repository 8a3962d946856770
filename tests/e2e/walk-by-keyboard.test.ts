import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import { writeLarkspurNextDay } from "@/lib/simulator/scenario/write-larkspur-logs";
import { beginVisit, openBrowser } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const OPERATOR = { email: "operator@larkspur.example", password: DEMO_PASSWORD };
/** More stops than any page has before its last control. */
const MOST_STOPS = 250;

let server: TestServer;
let browser: Browser;
let folder: string;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), "coulterbook-keys-"));
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
  rmSync(folder, { recursive: true, force: true });
});

interface Stop {
  role: string;
  name: string;
  /** Whether something on or around it shows that it has the focus. */
  isShown: boolean;
}

/** What has the focus: its role, its name, and whether that can be seen. */
function readStop(page: Page): Promise<Stop> {
  return page.evaluate(() => {
    const here = document.activeElement as HTMLElement | null;
    if (!here || here === document.body) return { role: "body", name: "", isShown: true };
    const labels = (here as HTMLInputElement).labels;
    const name = here.getAttribute("aria-label") ?? labels?.[0]?.textContent ?? here.textContent ?? "";
    const style = getComputedStyle(here);
    const isShown = style.outlineStyle !== "none" && Number.parseFloat(style.outlineWidth) >= 2;
    return { role: here.getAttribute("role") ?? here.tagName.toLowerCase(), name: name.trim(), isShown };
  });
}

/** Presses Tab until something of this name has the focus; every stop on the way must be seen to have it. */
async function tabTo(page: Page, wanted: RegExp): Promise<Stop> {
  const passed: Stop[] = [];
  for (let stop = 0; stop < MOST_STOPS; stop += 1) {
    await page.keyboard.press("Tab");
    const here = await readStop(page);
    passed.push(here);
    if (wanted.test(here.name)) {
      expect(passed.filter(({ isShown }) => !isShown).map(({ role, name }) => `${role} ${name}`)).toEqual([]);
      return here;
    }
  }
  throw new Error(`No ${wanted} among: ${passed.map(({ role, name }) => `${role} “${name.slice(0, 40)}”`).join(", ")}`);
}

it("walks from sign-in to a row of a pass with the keyboard alone", async () => {
  const { page, context, complaints } = await beginVisit(browser, "wide");
  // Addresses that a person would type or have kept; everything else is pressed.
  await page.goto(`${server.baseUrl}/sign-in`);
  await tabTo(page, /^Email$/);
  await page.keyboard.type(OPERATOR.email);
  await tabTo(page, /^Password$/);
  await page.keyboard.type(OPERATOR.password);
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/fields$/);
  await page.getByRole("link", { name: "East quarter" }).first().waitFor();

  // Past the chapters to the page itself: the first stop offers that.
  await tabTo(page, /^Skip to the page$/);
  await page.keyboard.press("Enter");
  await tabTo(page, /^East quarter$/);
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/rows/);
  await page.getByRole("heading", { name: "Verdict" }).waitFor();
  await tabTo(page, /^Logs$/);
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/logs$/);

  const file = path.join(folder, `keys-${LARKSPUR_NEXT_DAY.fileName}`);
  writeFileSync(file, writeLarkspurNextDay().text);
  // The system's own window, which no page has keys for.
  page.on("filechooser", (chooser) => void chooser.setFiles(file));
  await page.getByRole("button", { name: /^Choose a log file/ }).waitFor();
  await tabTo(page, /^Choose a log file/);
  await page.keyboard.press("Enter");
  await page.getByRole("button", { name: "Take it in", exact: true }).waitFor();
  await tabTo(page, /^Machine that made the log$/);
  await page.keyboard.type(writeLarkspurNextDay().machineName);
  await tabTo(page, /^Take it in$/);
  await page.keyboard.press("Enter");

  await page.waitForURL(/\/columns$/);
  await page.getByRole("button", { name: "Read the log" }).waitFor();
  await tabTo(page, /^Leave out$/);
  await page.keyboard.press("Enter");
  await page.getByText("The whole file is read with these meanings").waitFor();
  await tabTo(page, /^Read the log$/);
  await page.keyboard.press("Enter");

  const verdict = page.getByRole("link", { name: "See the verdict" });
  await verdict.waitFor({ timeout: 120_000 });
  await tabTo(page, /^See the verdict$/);
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/rows\?log=log_/);
  await page.getByRole("heading", { name: "Verdict" }).waitFor();
  await page.getByRole("option", { name: /^Row 3\b/ }).waitFor();

  await tabTo(page, /^Rows from left to right looking forward/);
  for (let row = 0; row < 3; row += 1) await page.keyboard.press("ArrowRight");
  await expect.poll(() => page.getByRole("option", { name: /^Row 3\b/ }).getAttribute("aria-selected")).toBe("true");
  await page.getByTestId("unrolled-plot").waitFor();
  // The pass may stand before the line-up: Tab goes round.
  await tabTo(page, /^Unrolled pass/);
  await page.keyboard.press("]");
  await page.keyboard.press("ArrowRight");
  await page.getByTestId("readout").getByText("Row 3", { exact: true }).waitFor();
  await expect.poll(() => new URL(page.url()).searchParams.get("pass"), { timeout: 30_000 }).toMatch(/^\d+$/);
  await expect.poll(() => new URL(page.url()).searchParams.get("row"), { timeout: 30_000 }).toBe("3");
  expect(complaints).toEqual([]);
  await context.close();
});
