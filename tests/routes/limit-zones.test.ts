import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { LimitZonesBody } from "@/lib/schemas/limit-zones";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
let log: Log;
const path = (query: string) => `/api/v1/logs/${log.id}/zones?${query}`;

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

describe("zones past a limit", () => {
  it("come as GeoJSON with totals and patches, under a name of their own", async () => {
    const response = await world.as("viewer", { path: path("kind=under-target") });
    // A viewer without the field.
    expect(response.status).toBe(404);
    const seen = await world.as("operator", { path: path("kind=under-target&minLengthM=2") });
    expect(seen.headers.get("content-type")).toBe("application/geo+json");
    expect(seen.headers.get("content-disposition")).toBe('inline; filename="zones-under-target.geojson"');
    const body = LimitZonesBody.parse(await seen.json());
    expect(body.features.length).toBe(body.totals.zones);
    const zoned = body.features.reduce((sum, { properties }) => sum + properties.areaM2, 0);
    expect(body.patches.reduce((sum, { areaM2 }) => sum + areaM2, 0)).toBeCloseTo(zoned, 6);
    expect(body.totals.areaM2).toBeCloseTo(zoned, 6);
  });

  it("follow the cleaning rules, and are as logged on demand", async () => {
    const ask = async (query: string) => LimitZonesBody.parse(await world.read("owner", { path: path(query) }));
    const before = await ask("kind=at-limit");
    const rules = { "start-ramp": { on: true, distanceM: 12 } };
    await world.read("owner", { method: "POST", path: `/api/v1/logs/${log.id}/cleaning`, body: { rules } });
    expect((await ask("kind=at-limit")).totals.workedM2).toBeLessThan(before.totals.workedM2);
    expect(await ask("kind=at-limit&cleaned=false")).toEqual(before);
  });

  it("are refused where the question makes no sense, and classes still answer", async () => {
    const status = async (query: string) => (await world.as("owner", { path: path(query) })).status;
    expect(await status("kind=too-high")).toBe(422);
    expect(await status("kind=too-shallow&depthM=deep")).toBe(422);
    expect(await status("channel=margin&breaks=300,600")).toBe(200);
    expect(await status("channel=margin")).toBe(422);
  });
});
