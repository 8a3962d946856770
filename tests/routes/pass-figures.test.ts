import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Log, LogColumns, PassBody } from "@/lib/schemas/logs";
import { PassStatisticsBody, RampsBody } from "@/lib/schemas/pass-figures";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
let log: Log;
const path = (ending: string) => `/api/v1/logs/${log.id}/${ending}`;

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

describe("statistics of passes", () => {
  it("give one item a pass, in order, and four comparisons", async () => {
    const body = PassStatisticsBody.parse(
      await world.read("researcher", { path: path("pass-statistics?channel=margin") }),
    );
    const { items } = (await world.read("researcher", { path: path("passes") })) as unknown as { items: PassBody[] };
    expect(body.items.map(({ pass, headland, records }) => ({ pass, headland, records }))).toEqual(
      items.map(({ pass, headland, records }) => ({ pass, headland, records })),
    );
    expect(body.comparisons.map(({ by }) => by)).toEqual(["direction", "place", "speed", "turn"]);
    // Four passes repeat too seldom for an interval, and it is said.
    expect(body.comparisons[0]!.difference?.interval ?? null).toBeNull();
    expect(body.comparisons[0]!.reason).not.toBeNull();
  });

  it("take derived channels, and refuse those the log has not or that are names", async () => {
    const derived = await world.read("owner", { path: path("pass-statistics?channel=resistance") });
    expect(PassStatisticsBody.parse(derived)).toMatchObject({ channel: "resistance", unit: "N" });
    for (const channel of ["moisture", "flags", "no channel"]) {
      const address = path(`pass-statistics?channel=${encodeURIComponent(channel)}`);
      expect((await world.as("owner", { path: address })).status).toBe(422);
    }
    expect((await world.as("owner", { path: path("pass-statistics") })).status).toBe(422);
  });

  it("leave out what cleaning rules leave out, and are as logged on demand", async () => {
    const ask = async (query = "") =>
      PassStatisticsBody.parse(await world.read("owner", { path: path(`pass-statistics?channel=margin${query}`) }));
    const before = await ask();
    const rules = { "start-ramp": { on: true, distanceM: 12 } };
    await world.read("owner", { method: "POST", path: path("cleaning"), body: { rules } });
    const cleaned = await ask();
    const n = (body: PassStatisticsBody) => body.items.map((item) => item.n);
    n(cleaned).forEach((count, at) => expect(count).toBeLessThan(n(before)[at]!));
    expect(await ask("&cleaned=false")).toEqual(before);
  });
});

describe("ramps", () => {
  it("go as far in as a third of the middling pass, metre by metre", async () => {
    const body = RampsBody.parse(await world.read("researcher", { path: path("ramps?channel=downforce") }));
    // Passes of about 60 m.
    expect(body.reachM).toBeGreaterThanOrEqual(15);
    expect(body.reachM).toBeLessThanOrEqual(20);
    expect(body.start.metres.map(({ fromM }) => fromM)).toEqual(Array.from({ length: body.reachM }, (_, m) => m));
    expect(body.end.metres).toHaveLength(body.reachM);
    expect(body.passes + body.tooShort).toBe(log.counts.passes);
    expect(body.reason).toMatch(/^An interval needs 8 passes/);
  });

  it("are not told to another organisation", async () => {
    const response = await world.as("other-owner", { path: path("ramps?channel=downforce") });
    expect(response.status).toBe(404);
  });
});
