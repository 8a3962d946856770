import { readFileSync } from "node:fs";
import path from "node:path";
import { unzipSync } from "fflate";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { beginVisit, openBrowser, signInAs } from "@/tests/e2e/open-browser";
import { describeWithGdal } from "@/tests/support/read-with-gdal";
import { startTestServer, type TestServer } from "@/tests/support/server";

let server: TestServer;
let browser: Browser;

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
});

async function openLogs(page: Page, role: string): Promise<void> {
  await signInAs(page, server.baseUrl, { email: `${role}@larkspur.example`, password: DEMO_PASSWORD });
  const rows = (await page.getByRole("link", { name: "East quarter" }).first().getAttribute("href")) ?? "";
  await page.goto(server.baseUrl + rows.replace(/\/(rows|logs).*$/, "/logs"));
  await page.getByRole("link", { name: "Rows", exact: true }).first().waitFor();
}

/** Chooses a line of the export menu and gives where the browser put the file, and its name. */
async function takeAway(page: Page, words: string, section = 0): Promise<{ file: string; name: string }> {
  await page
    .getByRole("button", { name: /^Export / })
    .first()
    .click();
  const choice = page.getByRole("menuitem", { name: words }).nth(section);
  await choice.waitFor();
  const [download] = await Promise.all([page.waitForEvent("download"), choice.click()]);
  return { file: await download.path(), name: download.suggestedFilename() };
}

describe.each(["wide", "phone"] as const)("taking a log away as a file, %s", (size) => {
  it("a researcher gets every reading, and the zones as coloured", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, size);
    await openLogs(page, "researcher");
    await page
      .getByRole("button", { name: /^Export / })
      .first()
      .click();
    await page.getByRole("menuitem").first().waitFor();
    expect(await picture("export-menu")).toBeLessThanOrEqual(0);
    await page.keyboard.press("Escape");

    const csv = await takeAway(page, "CSV, one line a record");
    const files = unzipSync(readFileSync(csv.file));
    expect(Object.keys(files).sort()).toEqual([csv.name.replace(".zip", ".csv"), "README.txt", "metadata.json"].sort());
    const geopackage = await takeAway(page, "GeoPackage");
    expect(path.extname(geopackage.name)).toBe(".gpkg");
    expect(describeWithGdal(`GPKG:${geopackage.file}:readings`)).toContain("marginN: Real");

    await page.getByRole("link", { name: "Rows", exact: true }).first().click();
    await page.getByRole("heading", { name: "Verdict" }).waitFor();
    await page.getByRole("region", { name: /^Legend/ }).waitFor();
    const zones = await takeAway(page, "GeoJSON", 1);
    const whole = JSON.parse(readFileSync(zones.file, "utf8")) as { about: { level: string }; features: unknown[] };
    expect(whole.about.level).toBe("zones");
    expect(whole.features.length).toBeGreaterThan(10);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it("an operator is not offered what they may not have", async () => {
    const { page, context } = await beginVisit(browser, size);
    await openLogs(page, "operator");
    expect(await page.getByRole("button", { name: /^Export / }).count()).toBe(0);
    await context.close();
  });
});
