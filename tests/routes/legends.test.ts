import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { LegendList } from "@/lib/schemas/legends";
import { makeWorld, type Actor, type World } from "@/tests/support/make-world";

const PATH = "/api/v1/legends";
let world: World;

const list = async (actor: Actor = "viewer") => LegendList.parse(await world.read(actor, { path: PATH }));
const put = (actor: Actor, body: unknown) => world.as(actor, { method: "PUT", path: PATH, body });

beforeAll(async () => {
  world = await makeWorld();
  world.container.setNow(new Date("2026-12-01T12:00:00Z"));
});
afterAll(async () => world.close());

describe("legends of the organisation", () => {
  it("are kept by channel, the last one in place of those before, and seen by everyone of it", async () => {
    expect(await list()).toMatchObject({ items: [], changeable: false });
    await put("agronomist", { channel: "margin", unit: "N", edges: [180, 490, 890] });
    await put("agronomist", { channel: "other:Seed hose", unit: "1", edges: [0.5] });
    const reply = await put("researcher", { channel: "margin", unit: "N", edges: [200, 400.5] });
    expect(LegendList.parse(await reply.json()).changeable).toBe(true);
    const { items } = await list();
    expect(items.map(({ channel, edges }) => [channel, edges])).toEqual([
      ["margin", [200, 400.5]],
      ["other:Seed hose", [0.5]],
    ]);
    expect(items[0]).toMatchObject({ unit: "N", savedAt: "2026-12-01T12:00:00.000Z" });
    expect(items[0]!.savedBy?.name).toBeTruthy();
  });

  it("are given up with null, and never reach another organisation", async () => {
    await put("owner", { channel: "depth", unit: "m", edges: [0.03, 0.05] });
    expect((await list("other-owner")).items).toEqual([]);
    expect((await put("other-owner", { channel: "depth", unit: "m", edges: null })).status).toBe(200);
    expect((await list()).items.map(({ channel }) => channel)).toContain("depth");
    await put("owner", { channel: "depth", unit: "m", edges: null });
    expect((await list()).items.map(({ channel }) => channel)).not.toContain("depth");
  });

  it("are changed by those who may, with an entry in the audit", async () => {
    expect((await put("operator", { channel: "margin", unit: "N", edges: [1] })).status).toBe(403);
    const { items } = (await world.read("owner", { path: "/api/v1/audit" })) as { items: { action: string }[] };
    expect(items.map(({ action }) => action)).toEqual(expect.arrayContaining(["legend.save", "legend.delete"]));
  });

  it.each([
    [{ channel: "nothing", unit: "N", edges: [1] }, "channel"],
    [{ channel: "marginByForce", unit: "1", edges: [1] }, "channel"],
    [{ channel: "margin", unit: "N", edges: [] }, "edges"],
    [{ channel: "margin", unit: "N", edges: [5, 5] }, "edges"],
    [{ channel: "margin", unit: "N", edges: Array.from({ length: 25 }, (_, i) => i) }, "edges"],
    [{ channel: "margin", edges: [5] }, "unit"],
  ])("refuse %j, naming where", async (body, where) => {
    const reply = await put("owner", body);
    expect(reply.status).toBe(422);
    expect(((await reply.json()) as { errors: { path: string }[] }).errors[0]!.path).toContain(where);
  });
});
