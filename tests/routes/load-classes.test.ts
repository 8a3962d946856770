import sharp from "sharp";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { categoriesOf } from "@/lib/legend/categories";
import { parseColour } from "@/lib/legend/parse-colour";
import type {
  Log,
  LogColumns,
  LogOverview,
  PassReadings,
  ReadingAt,
  RowStatisticsBody,
  TileJson,
} from "@/lib/schemas/logs";
import { tileAt } from "@/lib/tiles/tile-address";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

const EDGES = "1.5,2.5,3.5,4.5,5.5";

let world: LogWorld;
let log: Log;
const path = (ending: string) => `/api/v1/logs/${log.id}/${ending}`;
async function ask<Body>(ending: string): Promise<Body> {
  return (await world.read("researcher", { path: path(ending) })) as Body;
}

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  const bytes = fixtureBytes("csv/wide-newtons/input.csv");
  const waiting = await world.uploadAndSettle({ bytes, name: "a.csv", machineId: world.machineId });
  const columns = (await world.read("owner", { path: `/api/v1/logs/${waiting.id}/columns` })) as unknown as LogColumns;
  const body = confirmedMapping(columns);
  await world.read("operator", { method: "PUT", path: `/api/v1/logs/${waiting.id}/mapping`, body });
  log = await world.settle(waiting.id);
});
afterAll(async () => world.close());

const readings = (channel: string) => ask<PassReadings>(`passes/2/readings?channel=${channel}`);

describe("masks and cross classes over the API", () => {
  it("follow from margin, force and what the machine was set to, reading by reading", async () => {
    const overview = await ask<LogOverview>("overview?channel=margin");
    const [target, deadband, limit] = [overview.targetMarginN!, overview.marginDeadbandN!, overview.maxDownforceN!];
    const [margin, force, under, atLimit, both] = await Promise.all(
      ["margin", "downforce", "underTarget", "atLimit", "marginByForce"].map(readings),
    );
    let compared = 0;
    margin!.values.forEach((row, r) =>
      row.forEach((m, i) => {
        const f = force!.values[r]![i];
        if (typeof m !== "number" || typeof f !== "number") return expect(both!.values[r]![i]).toBeNull();
        const isUnder = m < target - deadband;
        // Forces of the fixture are whole newtons, finer than 1 % of the limit.
        const isAtLimit = f >= 0.99 * limit;
        expect(under!.values[r]![i]).toBe(isUnder ? 1 : 0);
        expect(atLimit!.values[r]![i]).toBe(isAtLimit ? 1 : 0);
        expect(both!.values[r]![i] === 1).toBe(isUnder && isAtLimit);
        expect(both!.values[r]![i] === 4).toBe(!isUnder && m <= target + deadband);
        compared += 1;
      }),
    );
    expect(compared).toBeGreaterThan(100);
  });

  it("are told at a place, as zones, by row, and as pictures in the colours of their names", async () => {
    const tiles = await ask<TileJson>("tiles/marginByForce/tiles.json");
    const [west, south, east, north] = tiles.bounds as [number, number, number, number];
    const pass = await readings("marginByForce");
    const [lon, lat] = pass.positions[20]!;
    const at = await ask<ReadingAt>(`at?lon=${lon}&lat=${lat}`);
    expect(Object.keys(at.values)).toEqual(expect.arrayContaining(["underTarget", "atLimit", "marginByForce"]));
    const zones = await ask<{ features: { properties: { class: number; mean: number | null } }[] }>(
      `zones?channel=marginByForce&breaks=${EDGES}`,
    );
    expect(zones.features.length).toBeGreaterThan(8);
    expect(zones.features.every(({ properties }) => properties.mean === null && properties.class <= 5)).toBe(true);
    const { items } = await ask<RowStatisticsBody>("rows?channel=marginByForce");
    for (const item of items) expect(item.classShares!.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 6);
    const tile = tileAt((west + east) / 2, (south + north) / 2, 17);
    const address = path(`tiles/marginByForce/${tile.z}/${tile.x}/${tile.y}.png?breaks=${EDGES}`);
    const png = await (await world.as("owner", { path: address })).arrayBuffer();
    const { data } = await sharp(Buffer.from(png)).ensureAlpha().raw().toBuffer({ resolveWithObject: true });
    const known = new Set(categoriesOf("marginByForce")!.map(({ colour }) => parseColour(colour).join(",")));
    const seen = new Set<string>();
    for (let i = 0; i < data.length; i += 4) if (data[i + 3] === 255) seen.add(data.subarray(i, i + 3).join(","));
    expect(seen.size).toBeGreaterThan(1);
    expect([...seen].every((colour) => known.has(colour))).toBe(true);
  });

  it("are exported as zones with their names", async () => {
    const query = `export?format=csv&level=zones&channel=marginByForce&breaks=${EDGES}`;
    const text = await (await world.as("researcher", { path: path(query) })).text();
    const [header = "", first = ""] = text.trim().split("\n");
    expect(header).toContain("name");
    expect(header).not.toContain("mean");
    expect(categoriesOf("marginByForce")!.some(({ name }) => first.includes(name))).toBe(true);
  });
});
