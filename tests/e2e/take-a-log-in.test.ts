import path from "node:path";
import { tmpdir } from "node:os";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import { writeLarkspurNextDay } from "@/lib/simulator/scenario/write-larkspur-logs";
import { beginVisit, openBrowser, signInAs, type SizeName } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const OPERATOR = { email: "operator@larkspur.example", password: DEMO_PASSWORD };

let server: TestServer;
let browser: Browser;
let folder: string;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), "coulterbook-log-"));
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
  rmSync(folder, { recursive: true, force: true });
});

/** The tour's file; a word in its name keeps the two sizes apart. A line end more makes other bytes of the same log. */
function writeLog(size: SizeName): string {
  const file = path.join(folder, `${size}-${LARKSPUR_NEXT_DAY.fileName}`);
  const { text } = writeLarkspurNextDay();
  writeFileSync(file, size === "phone" ? `${text}\n` : text);
  return file;
}

describe.each(["wide", "phone"] as const)("story 1, %s: an operator takes a log in after a pass", (size) => {
  it("chooses the file, confirms the columns in words, watches, and gets to the verdict", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, size);
    await signInAs(page, server.baseUrl, OPERATOR);
    const field = page.getByRole("link", { name: "East quarter" }).first();
    await field.waitFor();
    expect(await picture("story-1-fields")).toBeLessThanOrEqual(0);
    const rows = (await field.getAttribute("href")) ?? "";
    await page.goto(server.baseUrl + rows.replace(/\/(rows|logs).*$/, "/logs"));

    await page.locator("input[type=file]").setInputFiles(writeLog(size));
    // Behind the name stand width and ballast.
    const machine = page.getByLabel("Machine that made the log");
    const named = machine.locator("option").filter({ hasText: `${writeLarkspurNextDay().machineName} (` });
    await machine.selectOption((await named.first().getAttribute("value")) ?? "");
    expect(await picture("story-1-file-chosen")).toBeLessThanOrEqual(0);
    await page.getByRole("button", { name: "Take it in", exact: true }).click();

    await page.waitForURL(/\/columns$/);
    const forces = page.getByText("'DF_01_lbf'").locator("xpath=ancestor::p");
    await forces.waitFor();
    // 1 lbf = 4.4482216152605 N (NIST SP 811): the sentence works one number of the file out in newtons.
    const said = /(\d+(?:\.\d+)?) lbf here is (\d+(?:\.\d+)?) N/.exec((await forces.textContent()) ?? "");
    expect(Number(said?.[2]) / Number(said?.[1])).toBeCloseTo(4.4482216, 1);
    const confirm = page.getByRole("button", { name: "Read the log" });
    expect(await confirm.isDisabled()).toBe(true);
    await page.getByRole("button", { name: "Leave out" }).first().click();
    await page.getByText("The whole file is read with these meanings").waitFor();
    expect(await picture("story-1-columns", { fullPage: true })).toBeLessThanOrEqual(0);
    await confirm.click();

    const verdict = page.getByRole("link", { name: "See the verdict" });
    await verdict.waitFor({ timeout: 120_000 });
    expect(await picture("story-1-read")).toBeLessThanOrEqual(0);
    await verdict.click();
    await page.waitForURL(/\/rows\?log=log_/);
    await page.getByRole("heading", { name: "Verdict" }).waitFor();
    await page.getByText("ran under target").first().waitFor();
    await page.getByRole("button", { name: "Classes" }).waitFor();
    expect(await picture("story-1-verdict")).toBeLessThanOrEqual(0);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it("is told when the same file is there already, and may choose", async () => {
    const { page, context, picture } = await beginVisit(browser, size);
    await signInAs(page, server.baseUrl, OPERATOR);
    const rows = (await page.getByRole("link", { name: "East quarter" }).first().getAttribute("href")) ?? "";
    await page.goto(server.baseUrl + rows.replace(/\/(rows|logs).*$/, "/logs"));
    await page.locator("input[type=file]").setInputFiles(writeLog(size));
    await page.getByRole("button", { name: "Take it in", exact: true }).click();
    await page.getByText("This file is already in this field.").waitFor();
    await picture("story-1-same-file");
    await page.getByRole("link", { name: "Open the first one" }).click();
    await page.waitForURL(/\/logs\/log_[a-z0-9]+$/);
    await context.close();
  });

  it("is told in words when a file is not a log", async () => {
    const { page, context, picture } = await beginVisit(browser, size);
    await signInAs(page, server.baseUrl, OPERATOR);
    const rows = (await page.getByRole("link", { name: "Mill bottom" }).first().getAttribute("href")) ?? "";
    await page.goto(server.baseUrl + rows.replace(/\/(rows|logs).*$/, "/logs"));
    const picturesque = path.join(folder, `${size}-holiday.csv`);
    writeFileSync(picturesque, Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 0]));
    await page.locator("input[type=file]").setInputFiles(picturesque);
    await page.getByRole("button", { name: "Take it in", exact: true }).click();
    const refusal = page.getByRole("alert").filter({ hasText: /The file was not taken in|could not be read/ });
    await refusal.waitFor();
    expect((await refusal.textContent())?.length).toBeGreaterThan(40);
    await picture("story-1-not-a-log");
    await context.close();
  });
});
