import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { findGraveFaults } from "@/tests/e2e/find-faults";
import { beginVisit, openBrowser, signInAs } from "@/tests/e2e/open-browser";
import { listScreens, OWNER, type Screen } from "@/tests/e2e/screens";
import { startTestServer, type TestServer } from "@/tests/support/server";

let server: TestServer;
let browser: Browser;
let screens: Screen[];

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
  screens = await listScreens(server);
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
});

async function open(page: Page, { path }: Screen): Promise<void> {
  await page.goto(server.baseUrl + path);
  await page.waitForLoadState("networkidle");
}

/** Faults of each screen that has any, by its name. */
async function faultsOf(page: Page, looked: Screen[]): Promise<Record<string, string[]>> {
  const faults: Record<string, string[]> = {};
  for (const screen of looked) {
    await open(page, screen);
    const found = await findGraveFaults(page);
    if (found.length > 0) faults[screen.name] = found;
  }
  return faults;
}

/** What is looked at together: few enough for a slow machine. */
const GROUPS = [
  ["front", "sign-in", "api-reference"],
  ["share", "share-passcode", "share-gone"],
  ["fields", "field-new", "not-here"],
  ["rows", "logs", "log"],
  ["columns", "cleaning", "links", "about"],
  ["machines", "machine", "machine-new"],
  ["people", "recipes", "settings", "audit"],
];

it("is looked at: none is forgotten", () => {
  expect(screens.map(({ name }) => name).toSorted()).toEqual(GROUPS.flat().toSorted());
});

describe.each(["wide", "phone"] as const)("every screen, %s", (size) => {
  it.each(GROUPS.map((names) => [names.join(", "), names] as const))(
    "has no serious or critical fault that a program can find: %s",
    async (_, names) => {
      const { page, context, complaints } = await beginVisit(browser, size);
      const looked = screens.filter(({ name }) => names.includes(name));
      if (looked.some(({ isPublic }) => !isPublic)) await signInAs(page, server.baseUrl, OWNER);
      expect(await faultsOf(page, looked)).toEqual({});
      expect(complaints).toEqual([]);
      await context.close();
    },
  );

  it("has none in high contrast, nor where a menu or a dialog is open", async () => {
    const { page, context } = await beginVisit(browser, size);
    await page.emulateMedia({ contrast: "more", reducedMotion: "reduce" });
    await signInAs(page, server.baseUrl, OWNER);
    const busy = screens.filter(({ name }) => ["rows", "logs", "columns", "machines", "settings"].includes(name));
    expect(await faultsOf(page, busy)).toEqual({});
    await page.getByRole("button", { name: /^Signed in as/ }).click();
    await page.getByRole("menuitem", { name: "Sign out" }).waitFor();
    expect(await findGraveFaults(page)).toEqual([]);
    await page.keyboard.press("Escape");
    await open(
      page,
      screens.find(({ name }) => name === "links")!,
    );
    await page.getByRole("button", { name: "Make a link" }).click();
    await page.getByText("This land belongs to").waitFor();
    expect(await findGraveFaults(page)).toEqual([]);
    await context.close();
  });

  it("turns to high contrast where the person asks for it, and back", async () => {
    const { page, context } = await beginVisit(browser, size);
    await signInAs(page, server.baseUrl, OWNER);
    await open(
      page,
      screens.find(({ name }) => name === "settings")!,
    );
    const colours = () =>
      page.evaluate(() => {
        const { color, backgroundColor } = getComputedStyle(document.documentElement);
        return [color, backgroundColor];
      });
    const ordinary = await colours();
    await page.getByLabel("High contrast").check();
    await expect.poll(colours, { timeout: 30_000 }).toEqual(["rgb(0, 0, 0)", "rgb(255, 255, 255)"]);
    await open(
      page,
      screens.find(({ name }) => name === "fields")!,
    );
    expect(await colours()).toEqual(["rgb(0, 0, 0)", "rgb(255, 255, 255)"]);
    await open(
      page,
      screens.find(({ name }) => name === "settings")!,
    );
    await page.getByLabel("High contrast").uncheck();
    await expect.poll(colours, { timeout: 30_000 }).toEqual(ordinary);
    await context.close();
  });
});
