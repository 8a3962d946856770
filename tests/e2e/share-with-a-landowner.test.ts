import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { beginVisit, openBrowser, signInAs, type SizeName, type Visit } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const AGRONOMIST = { email: "agronomist@larkspur.example", password: DEMO_PASSWORD };

let server: TestServer;
let browser: Browser;

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
});

afterAll(async () => {
  await browser?.close();
  await server?.close();
});

/** An agronomist on the share chapter of East quarter. */
async function openShareChapter(size: SizeName): Promise<Visit> {
  const visit = await beginVisit(browser, size);
  await signInAs(visit.page, server.baseUrl, AGRONOMIST);
  const field = visit.page.getByRole("link", { name: "East quarter" }).first();
  const href = (await field.getAttribute("href")) ?? "";
  await visit.page.goto(server.baseUrl + href.replace(/\/(rows|logs).*$/, "/share"));
  return visit;
}

async function makeLink({ page }: Visit, passcode = ""): Promise<string> {
  await page.getByRole("button", { name: "Make a link" }).click();
  await page.getByText("This land belongs to").waitFor();
  // The seeding log is the one with a verdict.
  const logs = page.getByLabel("Log", { exact: true });
  const seeding = await logs
    .getByRole("option", { name: /^east-quarter-seeding · \d+ \w+ \d+$/ })
    .getAttribute("value");
  await logs.selectOption(seeding);
  await page.getByLabel("Passcode (optional)").fill(passcode);
  await page.getByRole("button", { name: "Make the link" }).click();
  await page.getByText("The link is ready").waitFor();
  return page.getByLabel("Address of the share").inputValue();
}

describe.each(["wide", "phone"] as const)("story 4, %s: a landowner opens a link", (size) => {
  it("reads it without an account, prints it on one sheet, and is told when it was withdrawn", async () => {
    const maker = await openShareChapter(size);
    const address = await makeLink(maker);
    expect(await maker.picture("story-4-link-made", { fullPage: true })).toBeLessThanOrEqual(0);

    const guest = await beginVisit(browser, size);
    await guest.page.goto(address);
    await guest.page.getByRole("heading", { name: "East quarter" }).waitFor();
    await guest.page.getByText("Who to ask").waitFor();
    expect(await guest.page.getByRole("navigation").count()).toBe(0);
    expect(await guest.picture("story-4-landowner", { fullPage: true })).toBeLessThanOrEqual(0);
    const sheets = await guest.page.pdf({ format: "Letter" });
    expect(sheets.toString("latin1").match(/\/Type\s*\/Page\b/g)).toHaveLength(1);
    expect(guest.complaints).toEqual([]);

    // Newest first: the first link that can be withdrawn is the one just made.
    await maker.page.reload();
    await maker.page.getByRole("button", { name: "Withdraw" }).first().click();
    const withdrawn = maker.page.waitForResponse((response) => response.request().method() === "DELETE");
    await maker.page.getByRole("alertdialog").getByRole("button", { name: "Withdraw" }).click();
    expect((await withdrawn).status()).toBe(204);
    await maker.page.getByText("Withdrawn").first().waitFor();
    await guest.page.reload();
    await guest.page.getByRole("heading", { name: "This link was withdrawn" }).waitFor();
    expect(await guest.page.getByText("East quarter").count()).toBe(0);
    await guest.picture("story-4-withdrawn");
    await guest.context.close();
    await maker.context.close();
  });

  it("shows nothing before the right passcode", async () => {
    const maker = await openShareChapter(size);
    const address = await makeLink(maker, "stubble-24");
    const guest = await beginVisit(browser, size);
    await guest.page.goto(address);
    await guest.page.getByLabel("Passcode").fill("wheat");
    await guest.page.getByRole("button", { name: "Open" }).click();
    await guest.page.getByText("That passcode is not right").waitFor();
    expect(await guest.page.getByText("East quarter").count()).toBe(0);
    await guest.picture("story-4-passcode");
    await guest.page.getByLabel("Passcode").fill("stubble-24");
    await guest.page.getByRole("button", { name: "Open" }).click();
    await guest.page.getByRole("heading", { name: "East quarter" }).waitFor();
    await guest.context.close();
    await maker.context.close();
  });
});
