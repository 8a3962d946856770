import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { eq } from "drizzle-orm";
import { adminDb } from "@/db/client";
import { findPersonByEmail } from "@/db/queries/system/people";
import { fieldGrants, fields } from "@/db/schema";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
let mapping: unknown;
let west = "";
let east = "";

/** A square about a place, in degrees. */
function boxAbout(longitude: number, latitude: number) {
  const [w, e, s, n] = [longitude - 0.01, longitude + 0.01, latitude - 0.01, latitude + 0.01];
  return { type: "Polygon", coordinates: [[[w, s], [e, s], [e, n], [w, n], [w, s]]] }; // prettier-ignore
}

async function newField(name: string, boundary: unknown): Promise<string> {
  return String((await world.read("owner", { method: "POST", path: "/api/v1/fields", body: { name, boundary } })).id);
}

let uploads = 0;
const bytes = () => `${Buffer.from(fixtureBytes("csv/wide-newtons/input.csv"))}${"\n".repeat(++uploads)}`;
const note = (log: Log) => log.notes.find(({ code }) => code === "outside-field");

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  const first = await world.uploadAndSettle({ bytes: bytes(), name: "first.csv" });
  const path = `/api/v1/logs/${first.id}`;
  mapping = confirmedMapping((await world.read("owner", { path: `${path}/columns` })) as unknown as LogColumns);
  await world.read("operator", { method: "PUT", path: `${path}/mapping`, body: mapping, expect: 202 });
  const placed = await world.settle(first.id);
  // A field without a boundary says nothing of where a log should lie.
  expect(note(placed)).toBeUndefined();
  const [w = 0, s = 0, e = 0, n = 0] = placed.bbox ?? [];
  const [longitude, latitude] = [(w + e) / 2, (s + n) / 2];
  west = await newField("Mill bottom", boxAbout(longitude - 0.1, latitude));
  east = await newField("East quarter", boxAbout(longitude, latitude));
});
afterAll(async () => world.close());

const takeIn = (fieldId: string) => world.uploadAndSettle({ bytes: bytes(), name: "pass.csv", mapping, fieldId });

describe("a log that lies in another field", () => {
  it("says so, names the field, and is moved there", async () => {
    const log = await takeIn(west);
    const outside = note(log);
    expect(outside?.message).toMatch(
      /^None of these records lie in Mill bottom: they lie \d\.\d km away, in East quarter\.$/,
    );
    expect(outside).toMatchObject({ fieldId: east, count: log.counts.records });
    const path = `/api/v1/logs/${log.id}`;
    const moved = await world.read("operator", { method: "PATCH", path, body: { fieldId: east } });
    expect(moved).toMatchObject({ fieldId: east, status: "queued" });
    const settled = await world.settle(log.id);
    expect(settled).toMatchObject({ fieldId: east, status: "ready", version: 2 });
    expect(note(settled)).toBeUndefined();
    const { items } = (await world.read("owner", { path: "/api/v1/audit?limit=20" })) as { items: unknown[] };
    expect(items).toContainEqual(expect.objectContaining({ action: "log.move", subject: log.id }));
  });

  it("does not name a field to somebody who may not see it", async () => {
    const log = await takeIn(west);
    const viewer = await findPersonByEmail("viewer@larkspur.example");
    const [row] = await adminDb().select().from(fields).where(eq(fields.id, west));
    await adminDb()
      .insert(fieldGrants)
      .values({ organisationId: row!.organisationId, userId: viewer!.id, fieldId: west });
    const seen = (await world.read("viewer", { path: `/api/v1/logs/${log.id}` })) as unknown as Log;
    expect(note(seen)?.message).toMatch(/^None of these records lie in Mill bottom: they lie \d\.\d km away\.$/);
    expect(note(seen)).not.toHaveProperty("fieldId");
  });

  it("in its own field says nothing", async () => {
    expect(note(await takeIn(east))).toBeUndefined();
  });

  it("is not moved to a field that is not there, nor by who may only read", async () => {
    const log = await takeIn(west);
    const path = `/api/v1/logs/${log.id}`;
    const move = (fieldId: string) => ({ method: "PATCH", path, body: { fieldId } });
    expect((await world.as("operator", move("fld_nosuchfield"))).status).toBe(422);
    expect((await world.as("researcher", move(east))).status).toBe(403);
    expect((await world.getLog(log.id)).fieldId).toBe(west);
  });

  it("is not moved beside the same file", async () => {
    const same = bytes();
    const kept = await world.uploadAndSettle({ bytes: same, name: "pass.csv", mapping, fieldId: east });
    const log = await world.uploadAndSettle({ bytes: same, name: "pass.csv", mapping, fieldId: west });
    const path = `/api/v1/logs/${log.id}`;
    const reply = await world.as("operator", { method: "PATCH", path, body: { fieldId: east } });
    expect(reply.status).toBe(409);
    expect(await reply.json()).toMatchObject({ code: "same_bytes", logId: kept.id });
  });
});
