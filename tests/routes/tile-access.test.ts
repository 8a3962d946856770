import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { adminDb } from "@/db/client";
import type { Log, TileJson } from "@/lib/schemas/logs";
import { tileAt } from "@/lib/tiles/tile-address";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";
import { sessionCookieOf } from "@/tests/support/make-world";
import { confirmedMapping } from "@/tests/support/log-mapping";
import type { LogColumns } from "@/lib/schemas/logs";

let world: LogWorld;
let log: Log;
let tile: string;
let serial = 0;

async function readLog(): Promise<Log> {
  const bytes = fixtureBytes("csv/wide-newtons/input.csv");
  const waiting = await world.uploadAndSettle({ bytes, name: `${serial++}.csv`, query: "?again=1" });
  const columns = (await world.read("owner", { path: `/api/v1/logs/${waiting.id}/columns` })) as unknown as LogColumns;
  const body = confirmedMapping(columns);
  const path = `/api/v1/logs/${waiting.id}`;
  if (waiting.status === "needs-mapping")
    await world.read("operator", { method: "PUT", path: `${path}/mapping`, body });
  return world.settle(waiting.id);
}

async function tileOf(one: Log): Promise<string> {
  const path = `/api/v1/logs/${one.id}/tiles/margin`;
  const { bounds } = (await world.read("owner", { path: `${path}/tiles.json` })) as unknown as TileJson;
  const { z, x, y } = tileAt((bounds[0]! + bounds[2]!) / 2, (bounds[1]! + bounds[3]!) / 2, 15);
  return `${path}/${z}/${x}/${y}.png?v=${one.version}`;
}

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  log = await readLog();
  tile = await tileOf(log);
});
afterAll(async () => world.close());

/** A viewer who may see the field of the log. */
async function addViewer(): Promise<{ id: string; cookie: string }> {
  const email = `viewer${serial++}@larkspur.example`;
  const body = { email, name: "Viewer", role: "viewer", password: "sorghum-stubble" };
  const { id } = await world.read("owner", { method: "POST", path: "/api/v1/members", body, expect: 201 });
  const path = `/api/v1/members/${String(id)}`;
  await world.read("owner", { method: "PATCH", path, body: { fieldIds: [world.fieldId] } });
  return { id: String(id), cookie: await sessionCookieOf(email, world.container) };
}

const statusFor = async (cookie: string, path = tile) => (await world.as("owner", { path, cookie })).status;

describe("tiles of a log that somebody may see", () => {
  it("end at the next request when the person is removed, loses the field, or the log goes", async () => {
    const removed = await addViewer();
    expect(await statusFor(removed.cookie)).toBe(200);
    await world.read("owner", { method: "DELETE", path: `/api/v1/members/${removed.id}`, expect: 204 });
    expect(await statusFor(removed.cookie)).toBe(403);

    const limited = await addViewer();
    expect(await statusFor(limited.cookie)).toBe(200);
    const path = `/api/v1/members/${limited.id}`;
    await world.read("owner", { method: "PATCH", path, body: { fieldIds: [] } });
    expect(await statusFor(limited.cookie)).toBe(404);

    const owner = await sessionCookieOf("owner@larkspur.example", world.container);
    const gone = await readLog();
    const goneTile = await tileOf(gone);
    expect(await statusFor(owner, goneTile)).toBe(200);
    await world.read("owner", { method: "DELETE", path: `/api/v1/logs/${gone.id}`, expect: 204 });
    expect(await statusFor(owner, goneTile)).toBe(404);
  });

  it("end by themselves soon after another process took the leave back", async () => {
    const { id, cookie } = await addViewer();
    expect(await statusFor(cookie)).toBe(200);
    await adminDb().$client.query("delete from memberships where id = $1", [id]);
    // No change through this process: only time ends it. The wait is a limit, not a measure.
    await vi.waitFor(async () => expect(await statusFor(cookie)).toBe(403), { timeout: 10_000, interval: 100 });
  });

  it("are nobody else's: each credential is looked up for itself", async () => {
    const { cookie } = await addViewer();
    expect(await statusFor(cookie)).toBe(200);
    const stranger = await sessionCookieOf("owner@otherfarm.example", world.container);
    expect(await statusFor(stranger)).toBe(404);
    expect((await world.as("owner", { path: tile, cookie: "" })).status).toBe(401);
  });

  it("of a newer version are served as soon as a map asks for them", async () => {
    const owner = await sessionCookieOf("owner@larkspur.example", world.container);
    const one = await readLog();
    const old = await tileOf(one);
    expect(await statusFor(owner, old)).toBe(200);
    await adminDb().$client.query("update logs set version = version + 1 where id = $1", [one.id]);
    const newer = old.replace(/v=\d+$/, `v=${one.version + 1}`);
    const answered = await world.as("owner", { path: newer, cookie: owner });
    // The rows of that version are not there: what matters is that the old one is not shown in its place.
    expect(answered.headers.get("etag") ?? "").not.toContain(`"${one.version}.`);
  });
});
