import path from "node:path";
import { tmpdir } from "node:os";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { writeLarkspurNextDay } from "@/lib/simulator/scenario/write-larkspur-logs";
import { beginVisit, openBrowser, signInAs, type SizeName } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const OPERATOR = { email: "operator@larkspur.example", password: DEMO_PASSWORD };

let server: TestServer;
let browser: Browser;
let folder: string;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), "coulterbook-parts-"));
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
  rmSync(folder, { recursive: true, force: true });
});

/** The tour's file in three parts; other places for the cuts make other bytes for each size. */
function writeParts(size: SizeName): string[] {
  const [header = "", ...lines] = writeLarkspurNextDay().text.trimEnd().split("\n");
  const first = Math.floor(lines.length * (size === "phone" ? 0.3 : 0.4));
  const cuts: [number, number][] = [
    [first, first * 2],
    [0, first],
    [first * 2, lines.length],
  ];
  return cuts.map(([from, to], index) => {
    const file = path.join(folder, `${size}-part-${index + 1}.csv`);
    writeFileSync(file, `${[header, ...lines.slice(from, to)].join("\n")}\n`);
    return file;
  });
}

describe.each(["wide", "phone"] as const)("a card full of parts, %s", (size) => {
  it("is proposed as one log, taken in whole, and each part can be had back", async () => {
    const { page, context, complaints, picture } = await beginVisit(browser, size);
    await signInAs(page, server.baseUrl, OPERATOR);
    const field = page.getByRole("link", { name: "East quarter" }).first();
    await field.waitFor();
    const rows = (await field.getAttribute("href")) ?? "";
    await page.goto(server.baseUrl + rows.replace(/\/(rows|logs).*$/, "/logs"));
    const parts = writeParts(size);
    await page.locator("input[type=file]").setInputFiles(parts);
    await page.getByText(/They have the same columns and follow each other/).waitFor();
    expect(await page.getByRole("radio", { name: "One log in parts" }).isChecked()).toBe(true);
    expect(await picture("parts-chosen")).toBeLessThanOrEqual(0);
    await page.getByRole("button", { name: "Take it in", exact: true }).click();
    await page.waitForURL(/\/columns$/);
    const logPage = page.url().replace(/\/columns$/, "");
    const id = logPage.split("/").at(-1) ?? "";
    const answer = await context.request.get(`${server.baseUrl}/api/v1/logs/${id}`);
    const log = (await answer.json()) as { files: { name: string; sha256: string }[]; notes: { code: string }[] };
    // In the order they were logged, whatever the order they were chosen in.
    expect(log.files.map(({ name }) => name)).toEqual([2, 1, 3].map((part) => `${size}-part-${part}.csv`));
    expect(log.notes.map(({ code }) => code)).toContain("parts-joined");
    const original = `${server.baseUrl}/api/v1/logs/${id}/original?sha256=${log.files[1]?.sha256 ?? ""}`;
    expect(await (await context.request.get(original)).text()).toBe(readFileSync(parts[0] ?? "", "utf8"));
    expect(complaints).toEqual([]);
    await context.close();
  });
});
