import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Cleaning, CleaningPreview } from "@/lib/schemas/cleaning";
import type { Log, LogColumns, PassReadings, ReadingAt, RowStatisticsBody, TileJson } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";
import type { Actor } from "@/tests/support/make-world";

let world: LogWorld;
let log: Log;
const path = (ending: string) => `/api/v1/logs/${log.id}/${ending}`;

async function ask<Body>(ending: string, actor: Actor = "researcher"): Promise<Body> {
  return (await world.read(actor, { path: path(ending) })) as Body;
}
async function send<Body>(ending: string, body: unknown, actor: Actor = "agronomist"): Promise<Body> {
  return (await world.read(actor, { method: "POST", path: path(ending), body })) as Body;
}
async function text(ending: string): Promise<string> {
  const response = await world.as("researcher", { path: path(ending) });
  expect(response.status).toBe(200);
  return response.text();
}
const item = ({ items }: CleaningPreview, code: string) => items.find((one) => one.code === code)!;
const RAMPS = { "start-ramp": { on: true, distanceM: 12, timeS: 0 } };

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  const waiting = await world.uploadAndSettle({ bytes: fixtureBytes("csv/wide-newtons/input.csv"), name: "a.csv" });
  const columns = (await world.read("owner", { path: `/api/v1/logs/${waiting.id}/columns` })) as unknown as LogColumns;
  const body = confirmedMapping(columns);
  await world.read("operator", { method: "PUT", path: `/api/v1/logs/${waiting.id}/mapping`, body });
  log = await world.settle(waiting.id);
});
afterAll(async () => world.close());

/** Everything that readers are told, as text, to be compared byte for byte. */
async function everything(query = ""): Promise<string[]> {
  const endings = [
    `rows?channel=margin${query}`,
    `rows?channel=resistance${query}`,
    `rows?channel=deviation:margin${query}`,
    `verdict?${query}`,
    `overview?channel=downforce${query}`,
    `zones?channel=margin&breaks=300,600${query}`,
    `passes/1/readings?channel=margin${query}`,
    `export?format=csv${query}`,
  ];
  return Promise.all(endings.map(text));
}

describe("a log nobody cleaned", () => {
  it("stands as read, with what every rule would do", async () => {
    const cleaning = await ask<Cleaning>("cleaning");
    expect(cleaning).toMatchObject({ revision: 0, history: [], delaysS: {} });
    expect(cleaning.items.map(({ code, on }) => [code, on])).toEqual([
      ["no-position", true],
      ["duplicate-time", false],
      ["impossible-step", true],
      ["not-working", true],
      ["start-ramp", false],
      ["end-ramp", false],
      ["turning", false],
      ["speed", false],
      ["sensor-stuck", false],
      ["physical-range", false],
      ["local-outlier", false],
      ["short-pass", false],
      ["overlap", false],
    ]);
    expect(item(cleaning, "start-ramp").readings).toBeGreaterThan(0);
    expect(cleaning.total.after).toBe(cleaning.total.before);
    expect(cleaning.total.logged).toBe(log.counts.readings);
    for (const { asLogged, cleaned } of cleaning.effect) expect(cleaned).toEqual(asLogged);
    expect(log.revision).toBe(0);
  });

  it("has the same answers with and without its (empty) adjustments", async () => {
    expect(await everything("&cleaned=true")).toEqual(await everything("&cleaned=false"));
  });
});

describe("changing rules", () => {
  it("previews without keeping, keeps, and undoes to the very same answers", async () => {
    const asRead = await everything();
    const preview = await send<CleaningPreview>("cleaning/preview", { rules: RAMPS }, "researcher");
    expect(await everything()).toEqual(asRead);
    expect((await ask<Cleaning>("cleaning")).revision).toBe(0);

    const kept = await send<Cleaning>("cleaning", { rules: RAMPS, note: "drill still settling" });
    expect(kept.revision).toBe(1);
    expect(kept.items).toEqual(preview.items);
    expect(kept.effect).toEqual(preview.effect);
    expect(kept.history).toMatchObject([{ revision: 1, note: "drill still settling", revertedTo: null }]);
    expect(kept.history[0]!.by).toBeTruthy();
    const ramp = item(kept, "start-ramp");
    expect(ramp).toMatchObject({ on: true, number: 5 });
    expect(kept.total.after).toBe(kept.total.before - ramp.takenOutFirst);
    const { before, after } = kept.total;
    expect(await ask("verdict")).toMatchObject({ leftOutShare: (before - after) / before });
    expect(await ask("verdict?cleaned=false")).toMatchObject({ leftOutShare: 0 });
    expect(ramp.after.readings).toBe(ramp.before.readings - ramp.takenOutFirst);

    const cleaned = await everything();
    cleaned.forEach((answer, k) => expect(answer).not.toBe(asRead[k]));
    expect(await everything("&cleaned=false")).toEqual(asRead);
    expect(await everything()).toEqual(cleaned);

    const undone = await send<Cleaning>("cleaning/undo", {});
    expect(undone).toMatchObject({ revision: 2, history: [{ revision: 2, revertedTo: 0 }, { revision: 1 }] });
    expect(await everything()).toEqual(asRead);
    const again = await send<Cleaning>("cleaning/undo", { revert: 1 });
    expect(again).toMatchObject({ revision: 3, rules: kept.rules });
    expect(await everything()).toEqual(cleaned);
    await send("cleaning/undo", { revert: 0 });
  });

  it("makes no revision of a change that changes nothing", async () => {
    const { revision } = await ask<Cleaning>("cleaning");
    expect((await send<Cleaning>("cleaning", { rules: {} })).revision).toBe(revision);
    expect((await send<Cleaning>("cleaning", { rules: { turning: { on: false } } })).revision).toBe(revision);
  });

  it("leaves readings out of passes, rows, points and exports, and says why", async () => {
    const before = await ask<PassReadings>("passes/1/readings?channel=margin");
    const rows = await ask<RowStatisticsBody>("rows?channel=margin");
    await send("cleaning", { rules: RAMPS });
    const after = await ask<PassReadings>("passes/1/readings?channel=margin");
    const out = before.distancesM.map((metres) => metres < 12);
    expect(out.filter(Boolean).length).toBeGreaterThan(2);
    after.values.forEach((row, r) =>
      row.forEach((value, i) => expect(value).toBe(out[i] ? null : before.values[r]![i])),
    );
    expect(after.distancesM).toEqual(before.distancesM);

    const flags = await ask<PassReadings>("passes/1/readings?channel=flags");
    flags.values.forEach((row) => row.forEach((value, i) => expect(value).toBe(out[i] ? 5 : null)));

    const then = await ask<RowStatisticsBody>("rows?channel=margin");
    then.items.forEach((row, r) => expect(row.n).toBeLessThan(rows.items[r]!.n));

    const csv = (await text("export?format=csv")).trim().split("\r\n");
    const header = csv[0]!.split(",");
    const column = header.indexOf("leftOut");
    expect(column).toBeGreaterThan(0);
    const lines = csv.slice(1).map((line) => line.split(","));
    const taken = lines.filter((line) => line[column] !== "" && line[header.indexOf("pass")] !== "0");
    expect(new Set(taken.map((line) => line[column]))).toEqual(new Set(["start-ramp"]));
    for (const line of taken) expect(line[header.indexOf("marginN")]).toBe("");
    const outside = lines.filter((line) => line[header.indexOf("flags")]!.includes("not-working"));
    expect(outside.length).toBeGreaterThan(2);
    for (const line of outside) expect(line[column]).toBe("not-working");
    expect((await text("export?format=csv&cleaned=false")).split("\r\n")[0]).not.toContain("leftOut");
    const about = JSON.parse(await text("export?format=geojson&level=readings")) as { about: Record<string, unknown> };
    expect(about.about.adjustments).toMatchObject({ cleaning: { "start-ramp": { on: true, distanceM: 12 } } });
    await send("cleaning/undo", { revert: 0 });
  });

  it("gives tiles of the revision under an address of their own", async () => {
    const plain = await ask<TileJson>("tiles/margin/tiles.json");
    expect(plain.tiles[0]).toMatch(/\?v=1\.0$/);
    const { revision } = await send<Cleaning>("cleaning", { rules: RAMPS });
    const cleaned = await ask<TileJson>("tiles/margin/tiles.json");
    expect(cleaned.tiles[0]).toMatch(new RegExp(`\\?v=1\\.${revision}$`));
    expect((await ask<TileJson>("tiles/margin/tiles.json?cleaned=false")).tiles[0]).toMatch(/\?v=1\.0&cleaned=false$/);
    expect((await ask<Log>("")).revision).toBe(revision);
    const flags = await ask<TileJson>("tiles/flags/tiles.json");
    expect(flags.encoding).toMatchObject({ channel: "flags", unit: "1", minimum: 5, maximum: 5 });
    await send("cleaning/undo", { revert: 0 });
  });

  it("names the reason under a point", async () => {
    const pass = await ask<PassReadings>("passes/1/readings?channel=margin");
    await send("cleaning", { rules: RAMPS });
    const i = pass.distancesM.findIndex((metres) => metres > 3);
    const [lon, lat] = pass.positions[i]!;
    const at = await ask<ReadingAt>(`at?lon=${lon}&lat=${lat}`);
    expect(at.values.margin).toBeNull();
    expect(at.leftOut).toMatchObject([{ code: "start-ramp", words: "Start of a pass" }]);
    expect(at.leftOut![0]!.channels).toContain("margin");
    const asLogged = await ask<ReadingAt>(`at?lon=${lon}&lat=${lat}&cleaned=false`);
    expect(asLogged.values.margin).not.toBeNull();
    expect(asLogged.leftOut).toEqual([]);
    await send("cleaning/undo", { revert: 0 });
  });

  it("refuses what makes no sense, naming it", async () => {
    const refuse = async (rules: unknown) => {
      const response = await world.as("owner", { method: "POST", path: path("cleaning"), body: { rules } });
      return { status: response.status, body: (await response.json()) as { errors?: { path: string }[] } };
    };
    const off = await refuse({ "no-position": { on: false } });
    expect(off).toMatchObject({ status: 422, body: { errors: [{ path: "rules.no-position.on" }] } });
    expect(await refuse({ speed: { minMps: 9 } })).toMatchObject({ status: 422 });
    expect(await refuse({ "start-ramp": { distanceM: -1 } })).toMatchObject({ status: 422 });
    expect(await refuse({ "start-ramp": { lengthM: 1 } })).toMatchObject({ status: 422 });
    expect(await refuse({ "no-such-rule": { on: true } })).toMatchObject({ status: 422 });
    const undo = await world.as("owner", { method: "POST", path: path("cleaning/undo"), body: { revert: 999 } });
    const beyond = { method: "POST", path: path("cleaning/undo"), body: { revert: 2_147_483_648 } };
    expect((await world.as("owner", beyond)).status).toBe(422);
    expect(undo.status).toBe(422);
  });
});

describe("who may", () => {
  it("is everybody who reads the log for looking and trying, owner and agronomist for changing", async () => {
    const { revision } = await ask<Cleaning>("cleaning");
    const status = async (actor: Actor, method: string, ending: string, body?: unknown) =>
      (await world.as(actor, { method, path: path(ending), body })).status;
    for (const actor of ["researcher", "operator"] as const) {
      expect(await status(actor, "GET", "cleaning")).toBe(200);
      expect(await status(actor, "POST", "cleaning/preview", { rules: RAMPS })).toBe(200);
      expect(await status(actor, "POST", "cleaning", { rules: RAMPS })).toBe(403);
      expect(await status(actor, "POST", "cleaning/undo", {})).toBe(403);
    }
    expect(await status("other-owner", "GET", "cleaning")).toBe(404);
    expect(await status("other-owner", "POST", "cleaning", { rules: RAMPS })).toBe(404);
    expect(await status("other-owner", "POST", "cleaning/undo", { revert: 0 })).toBe(404);
    expect(await status("viewer", "GET", "cleaning")).toBe(404);
    expect(await status("stranger", "GET", "cleaning")).toBe(401);
    expect((await ask<Cleaning>("cleaning")).revision).toBe(revision);
  });

  it("is written down with what was changed", async () => {
    await send("cleaning", { rules: { turning: { on: true } } });
    const { items } = (await world.read("owner", { path: "/api/v1/audit" })) as {
      items: { action: string; subject: string; detail: Record<string, unknown> }[];
    };
    expect(items[0]).toMatchObject({
      action: "log.adjust",
      subject: log.id,
      detail: { changes: { turning: { before: { on: false }, after: { on: true } } } },
    });
    await send("cleaning/undo", { revert: 0 });
  });
});

describe("a log that is read again", () => {
  it("keeps its adjustments, and goes with them when deleted", async () => {
    const kept = await send<Cleaning>("cleaning", { rules: RAMPS });
    await world.read("owner", { method: "POST", path: path("retry") });
    const again = await world.settle(log.id);
    expect(again).toMatchObject({ version: log.version + 1, revision: kept.revision });
    const { revision, total, rules } = await ask<Cleaning>("cleaning");
    expect({ revision, total, rules }).toEqual({ revision: kept.revision, total: kept.total, rules: kept.rules });
    expect((await world.as("owner", { method: "DELETE", path: path("") })).status).toBe(204);
    expect((await world.as("owner", { path: path("cleaning") })).status).toBe(404);
  });
});
