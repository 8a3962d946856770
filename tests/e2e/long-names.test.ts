import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { beginVisit, openBrowser, signInAs } from "@/tests/e2e/open-browser";
import { startTestServer, type TestServer } from "@/tests/support/server";

const OWNER = { email: "owner@larkspur.example", password: DEMO_PASSWORD };
/** As long as a name may be, with nowhere to break it. */
const NAME = "Larkspurflatsnorthquarterbelowthemill".repeat(4).slice(0, 120);

let server: TestServer;
let browser: Browser;
let cookie = "";

beforeAll(async () => {
  [server, browser] = await Promise.all([startTestServer({ seed: true }), openBrowser()]);
  cookie = await server.signIn(OWNER.email);
});
afterAll(async () => {
  await browser?.close();
  await server?.close();
});

async function call(method: string, path: string, body?: unknown): Promise<Record<string, unknown>> {
  const response = await fetch(`${server.baseUrl}/api/v1${path}`, {
    method,
    headers: { cookie, "content-type": "application/json" },
    body: body === undefined ? undefined : JSON.stringify(body),
  });
  const text = await response.text();
  if (!response.ok) throw new Error(`${method} ${path}: ${response.status} ${text}`);
  return text === "" ? {} : (JSON.parse(text) as Record<string, unknown>);
}

interface Item {
  id: string;
  logCount?: number;
  kind?: string;
}

/** Everything that has a name gets the long one; answers where to look at it. */
async function renameEverything() {
  const fields = (await call("GET", "/fields")).items as Item[];
  const fieldId = fields.find((field) => (field.logCount ?? 0) > 0)!.id;
  await call("PATCH", `/fields/${fieldId}`, { name: NAME, farm: NAME, landowner: NAME });
  const logs = (await call("GET", `/fields/${fieldId}/logs`)).items as Item[];
  for (const { id } of logs) await call("PATCH", `/logs/${id}`, { name: NAME });
  const machines = (await call("GET", "/machines")).items as Item[];
  await call("PATCH", `/machines/${machines[0]!.id}`, { name: NAME });
  const person = {
    email: `${NAME.slice(0, 60)}@larkspur.example`,
    name: NAME,
    role: "viewer",
    password: DEMO_PASSWORD,
  };
  await call("POST", "/members", person);
  await call("PATCH", "/me", { name: NAME });
  await call("POST", "/tokens", { name: NAME, role: "viewer" });
  const logId = logs.find(({ kind }) => kind === "seeding")!.id;
  const expiresAt = new Date(Date.now() + 86_400_000).toISOString();
  const layers = ["boundary", "verdict", "coverage", "margin"];
  const share = await call("POST", `/fields/${fieldId}/shares`, { audience: "landowner", layers, logId, expiresAt });
  return { fieldId, logId, machineId: machines[0]!.id, sharePath: new URL(String(share.url)).pathname };
}

/** By how many pixels the page can be moved sideways once it has come to rest. */
async function sidewaysAt(page: Page, path: string): Promise<number> {
  await page.goto(server.baseUrl + path);
  await page.waitForLoadState("networkidle");
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}

it("keeps every main page within a phone's width, whatever things are called", async () => {
  const { fieldId, logId, machineId, sharePath } = await renameEverything();
  const { page, context } = await beginVisit(browser, "phone");
  await signInAs(page, server.baseUrl, OWNER);
  const root = "/larkspur-flats";
  const field = `${root}/fields/${fieldId}`;
  const paths = [
    `${root}/fields`,
    `${field}/logs`,
    `${field}/logs/${logId}`,
    `${field}/logs/${logId}/columns`,
    `${field}/rows?log=${logId}`,
    `${field}/share`,
    `${field}/settings`,
    `${root}/machines`,
    `${root}/machines/${machineId}`,
    `${root}/people`,
    `${root}/settings`,
    `${root}/settings/audit`,
    sharePath,
  ];
  const sideways: Record<string, number> = {};
  for (const path of paths) sideways[path] = await sidewaysAt(page, path);
  expect(sideways).toEqual(Object.fromEntries(paths.map((path) => [path, 0])));
  await context.close();
});
