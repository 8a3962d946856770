import { eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { logs } from "@/db/schema";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";
import type { Actor } from "@/tests/support/make-world";

let world: LogWorld;
beforeAll(async () => (world = await makeLogWorld()));
afterAll(async () => world.close());

/** An upload as the database has it after some work; no worker runs. */
async function upload(actor: Actor, change: Partial<typeof logs.$inferInsert> = {}): Promise<string> {
  const bytes = fixtureBytes("csv/wide-newtons/input.csv");
  const response = await world.upload({ bytes, name: "pass.csv", actor, query: "?again=1" });
  const { id } = (await response.json()) as { id: string };
  await adminDb().update(logs).set({ status: "failed", ...change }).where(eq(logs.id, id)); // prettier-ignore
  return id;
}

async function remove(actor: Actor, id: string): Promise<number> {
  const path = `/api/v1/logs/${id}`;
  const { removable } = await world.read("owner", { path });
  expect(removable).toBe(true);
  return (await world.as(actor, { method: "DELETE", path })).status;
}

describe("an operator removes", () => {
  it.each(["queued", "needs-mapping", "failed"] as const)("their own upload that is %s", async (status) => {
    const id = await upload("operator", { status });
    expect(await world.read("operator", { path: `/api/v1/logs/${id}` })).toMatchObject({ removable: true });
    expect(await remove("operator", id)).toBe(204);
    expect((await world.as("owner", { path: `/api/v1/logs/${id}` })).status).toBe(404);
  });

  it.each([
    ["that is ready", { status: "ready", version: 1 }],
    ["that failed after it had been read", { status: "failed", version: 1 }],
  ] as const)("no log %s, though they uploaded it", async (_, change) => {
    const id = await upload("operator", change);
    expect(await world.read("operator", { path: `/api/v1/logs/${id}` })).toMatchObject({ removable: false });
    expect(await remove("operator", id)).toBe(409);
    expect((await world.getLog(id)).id).toBe(id);
    expect(await remove("agronomist", id)).toBe(204);
  });

  it("no upload of somebody else", async () => {
    const id = await upload("agronomist");
    expect(await remove("operator", id)).toBe(409);
    expect(await remove("researcher", id)).toBe(403);
    expect(await remove("owner", id)).toBe(204);
  });
});
