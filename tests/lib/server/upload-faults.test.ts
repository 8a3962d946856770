import { gzipSync } from "node:zlib";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

const LIMIT = 200_000;
let world: LogWorld;
beforeAll(async () => {
  world = await makeLogWorld({ MAX_UPLOAD_BYTES: String(LIMIT) });
});
afterAll(async () => world.close());

async function countLogs(): Promise<number> {
  const { rows } = await adminDb().$client.query<{ n: string }>("select count(*) as n from logs");
  return Number(rows[0]?.n);
}

function send(body: BodyInit, type: string): Promise<Response> {
  const headers = { "content-type": type };
  return world.as("operator", {
    method: "POST",
    path: `/api/v1/fields/${world.fieldId}/logs`,
    headers,
    body: body as FormData,
  });
}

const BOUNDARY = "----seam";
const HEAD = `--${BOUNDARY}\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\nContent-Type: text/csv\r\n\r\n`;

describe("an upload that goes wrong", () => {
  it("over the limit is refused with 413, whether its length was told or not, and leaves nothing", async () => {
    const line = `${"1,".repeat(40)}2\n`;
    const bytes = line.repeat(Math.ceil((LIMIT * 30) / line.length));
    for (const size of [LIMIT + 1_000, LIMIT * 30]) {
      const response = await world.upload({ bytes: bytes.slice(0, size), name: "long.csv" });
      expect(response.status).toBe(413);
      expect(await response.json()).toMatchObject({ code: "too_large", maxBytes: LIMIT });
    }
    expect(await countLogs()).toBe(0);
    expect(await world.storedKeys()).toEqual([]);
  });

  it("cut off in the middle leaves no log and no bytes", async () => {
    const whole = Buffer.concat([Buffer.from(HEAD), fixtureBytes("csv/wide-newtons/input.csv").subarray(0, 20_000)]);
    const cut = await send(whole.toString("latin1"), `multipart/form-data; boundary=${BOUNDARY}`);
    expect(cut.status).toBe(400);
    expect(await cut.json()).toMatchObject({ code: "upload_broken" });
    expect(await countLogs()).toBe(0);
    expect(await world.storedKeys()).toEqual([]);
  });

  it("of something that is no form says what is wanted", async () => {
    expect((await send("a,b\n1,2\n", "text/csv")).status).toBe(415);
    expect((await send("no form at all", `multipart/form-data; boundary=${BOUNDARY}`)).status).toBe(400);
    expect((await send("x", "multipart/form-data")).status).toBe(400);
  });

  it("onto an absent field is refused before a byte is kept", async () => {
    const response = await world.upload({ bytes: "a,b\n1,2\n", name: "a.csv", fieldId: "fld_nosuchfield" });
    expect(response.status).toBe(404);
    expect(await world.storedKeys()).toEqual([]);
  });
});

describe("a packed upload", () => {
  it("is taken as it is and read like the plain one", async () => {
    const worker = await world.startWorker();
    const bytes = gzipSync(fixtureBytes("csv/wide-newtons/input.csv"));
    const log = await world.uploadAndSettle({ bytes, name: "drill.csv.gz" });
    expect(log).toMatchObject({ status: "needs-mapping", name: "drill", fileBytes: bytes.length });
    await worker.stop();
  });
});
