import { existsSync, readdirSync } from "node:fs";
import { request } from "node:http";
import { connect } from "node:net";
import { Client } from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { startTestServer, type TestServer } from "@/tests/support/server";

/** More than the store takes in one piece, so that giving up what it has begun takes it some time. */
const LIMIT = 20_000_000;
const GIBIBYTE = 2 ** 30;
const BOUNDARY = "----seam";
const HEAD = `--${BOUNDARY}\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\nContent-Type: text/csv\r\n\r\n`;
const LINE = Buffer.from(`${"12.5,".repeat(200)}1\n`.repeat(64));

let server: TestServer;
let cookie: string;
let path: string;
beforeAll(async () => {
  server = await startTestServer({ seed: false, environment: { MAX_UPLOAD_BYTES: String(LIMIT) } });
  cookie = await server.signIn("owner@larkspur.example");
  const made = await fetch(`${server.baseUrl}/api/v1/fields`, {
    method: "POST",
    headers: { cookie, origin: server.baseUrl, "content-type": "application/json" },
    body: JSON.stringify({ name: "East quarter" }),
  });
  path = `/api/v1/fields/${((await made.json()) as { id: string }).id}/logs`;
});
afterAll(async () => server.close());

async function countLogs(): Promise<number> {
  const client = new Client({ connectionString: server.databaseAdminUrl });
  await client.connect();
  try {
    return Number((await client.query<{ n: string }>("select count(*) as n from logs")).rows[0]?.n);
  } finally {
    await client.end();
  }
}

/** Files of uploads that the object store keeps on its folder. */
function storedFiles(): string[] {
  const folder = `${server.environment.DATA_DIR}/objects`;
  if (!existsSync(folder)) return [];
  const names = readdirSync(folder, { recursive: true, encoding: "utf8" });
  return names.filter((name) => /(incoming|uploads)\/[^/]+_object$/.test(name));
}

async function waitUntil(isDone: () => Promise<boolean> | boolean): Promise<boolean> {
  for (let tries = 0; tries < 100; tries++) {
    if (await isDone()) return true;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  return false;
}

const uploadHeaders = () => ({
  cookie,
  origin: server.baseUrl,
  "content-type": `multipart/form-data; boundary=${BOUNDARY}`,
});

/** Sends until the server answers; does not know beforehand how much that will be. */
function sendUntilAnswered(headers: Record<string, string | number>, totalBytes: number) {
  return new Promise<{ status: number; body: string; sent: number }>((resolve, reject) => {
    let sent = 0;
    let isAnswered = false;
    const outgoing = request(`${server.baseUrl}${path}`, { method: "POST", headers }, (response) => {
      isAnswered = true;
      const chunks: Buffer[] = [];
      response.on("data", (chunk: Buffer) => chunks.push(chunk));
      response.on("end", () => {
        outgoing.destroy();
        resolve({ status: response.statusCode ?? 0, body: Buffer.concat(chunks).toString("utf8"), sent });
      });
    });
    outgoing.on("error", (error) => (isAnswered ? undefined : reject(error)));
    const pump = () => {
      while (!isAnswered && sent < totalBytes) {
        sent += LINE.length;
        if (!outgoing.write(LINE)) return void outgoing.once("drain", pump);
      }
    };
    outgoing.write(HEAD);
    pump();
  });
}

/** Refusing an upload is the day's work: the server has nothing to complain of. */
function expectNoComplaint(): void {
  expect(server.web.errors()).not.toMatch(/uncaughtException|unhandledRejection|Invalid state|TypeError/);
}

/** A form that ends as one should, sent at once. */
function sendWhole(fileName: string, content: Buffer): Promise<{ status: number; body: string }> {
  const body = Buffer.concat([
    Buffer.from(HEAD.replace("a.csv", fileName)),
    content,
    Buffer.from(`\r\n--${BOUNDARY}--\r\n`),
  ]);
  return new Promise((resolve, reject) => {
    const headers = { ...uploadHeaders(), "transfer-encoding": "chunked" };
    const outgoing = request(`${server.baseUrl}${path}`, { method: "POST", headers }, (response) => {
      const chunks: Buffer[] = [];
      response.on("data", (chunk: Buffer) => chunks.push(chunk));
      response.on("end", () => resolve({ status: response.statusCode ?? 0, body: Buffer.concat(chunks).toString() }));
    });
    outgoing.on("error", reject);
    outgoing.end(body);
  });
}

describe("an upload over the wire", () => {
  it("that is refused is answered, and leaves the server without an error of its own", async () => {
    const noise = Buffer.alloc(600_000);
    for (let times = 0; times < 5; times++) {
      const unknown = await sendWhole("picture.bin", noise);
      expect(unknown.status).toBe(415);
      const large = await sendWhole("large.csv", Buffer.concat(Array.from({ length: 320 }, () => LINE)));
      expect(large.status).toBe(413);
    }
    expectNoComplaint();
  });

  it("of 1 GiB against a smaller limit is answered 413 long before its end", async () => {
    const told = await sendUntilAnswered({ ...uploadHeaders(), "content-length": GIBIBYTE }, GIBIBYTE);
    expect(told.status).toBe(413);
    expect(JSON.parse(told.body)).toMatchObject({ code: "too_large", maxBytes: LIMIT });
    const untold = await sendUntilAnswered({ ...uploadHeaders(), "transfer-encoding": "chunked" }, GIBIBYTE);
    expect(untold.status).toBe(413);
    expect(untold.sent).toBeLessThan(GIBIBYTE / 4);
    expect(await countLogs()).toBe(0);
    expect(storedFiles()).toEqual([]);
    expect((await fetch(`${server.baseUrl}/api/health`)).status).toBe(200);
    expectNoComplaint();
  });

  it("whose connection is lost leaves no log and no bytes", async () => {
    const url = new URL(server.baseUrl);
    const socket = connect(Number(url.port), url.hostname);
    const headers = { host: url.host, ...uploadHeaders(), "content-length": 900_000 };
    const lines = Object.entries(headers).map(([name, value]) => `${name}: ${value}`);
    socket.write(`POST ${path} HTTP/1.1\r\n${lines.join("\r\n")}\r\n\r\n${HEAD}`);
    for (let sent = 0; sent < 300_000; sent += LINE.length) socket.write(LINE);
    await new Promise((resolve) => setTimeout(resolve, 500));
    socket.destroy();
    expect(await waitUntil(() => storedFiles().length === 0)).toBe(true);
    expect(await countLogs()).toBe(0);
    // The server still takes uploads.
    const form = new FormData();
    form.set("file", new File(["time,lon,lat,depth\n1,-98,38,40\n"], "small.csv"));
    const headersOfForm = { cookie, origin: server.baseUrl };
    const next = await fetch(`${server.baseUrl}${path}`, { method: "POST", headers: headersOfForm, body: form });
    expect(next.status).toBe(202);
    expect(storedFiles()).toHaveLength(1);
    expectNoComplaint();
  });
});
