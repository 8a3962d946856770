import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { ComparisonBody } from "@/lib/schemas/comparison";
import type { Log, LogColumns, RowStatisticsBody } from "@/lib/schemas/logs";
import { LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import { LARKSPUR_DRILL_BALLASTED } from "@/lib/simulator/scenario/larkspur-machines";
import { writeLarkspurNextDay } from "@/lib/simulator/scenario/write-larkspur-logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
let four: Log;
let pounds: Log;
let day: Log;
const path = (query: string) => `/api/v1/logs/${four.id}/compare?${query}`;
const ask = async (query: string) => ComparisonBody.parse(await world.read("researcher", { path: path(query) }));

async function take(bytes: Uint8Array | string, name: string, machineId?: string): Promise<Log> {
  const waiting = await world.uploadAndSettle({ bytes, name, machineId });
  if (waiting.status === "ready") return waiting;
  const columns = (await world.read("owner", { path: `/api/v1/logs/${waiting.id}/columns` })) as unknown as LogColumns;
  const body = confirmedMapping(columns);
  await world.read("operator", { method: "PUT", path: `/api/v1/logs/${waiting.id}/mapping`, body });
  return world.settle(waiting.id);
}

beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
  const drill = await world.read("owner", { method: "POST", path: "/api/v1/machines", body: LARKSPUR_DRILL_BALLASTED });
  four = await take(fixtureBytes("csv/wide-newtons/input.csv"), "four.csv");
  pounds = await take(fixtureBytes("csv/wide-pounds/input.csv"), "pounds.csv");
  day = await take(writeLarkspurNextDay().text, LARKSPUR_NEXT_DAY.fileName, String(drill.id));
});
afterAll(async () => world.close());

describe("two logs", () => {
  it("are compared as far as they can be, and what cannot be told is said", async () => {
    const body = await ask(`with=${day.id}&channel=margin`);
    expect(body).toMatchObject({ channel: "margin", before: { logId: four.id }, after: { logId: day.id, passes: 11 } });
    // Four passes repeat too seldom, and eight rows are not twenty-four.
    expect(body.rows).toEqual([]);
    expect(body.overall[0]).toMatchObject({ measure: "mean", interval: null, told: "cannot-tell" });
    expect(body.reasons[0]).toMatch(/^An interval of all rows together needs 8 passes on either side; .* has 4\.$/);
  });

  it("say of each the same as its own line-up, and nothing of a log in other units", async () => {
    const body = await ask(`with=${pounds.id}&channel=downforce`);
    const address = `/api/v1/logs/${four.id}/rows?channel=downforce`;
    const rows = (await world.read("owner", { path: address })) as unknown as RowStatisticsBody;
    expect(body.before.headlandPassesLeftOut).toBe(0);
    expect(body.rows.map((row) => row.before.p50)).toEqual(rows.items.map((item) => item.p50));
    // The same readings, rounded to pounds-force.
    for (const row of body.rows) expect(Math.abs(row.difference!)).toBeLessThan(1);
  });

  it("go by the rules of both, and as logged on demand", async () => {
    const before = await ask(`with=${day.id}&channel=margin`);
    const rules = { "start-ramp": { on: true, distanceM: 12 } };
    await world.read("owner", { method: "POST", path: `/api/v1/logs/${day.id}/cleaning`, body: { rules } });
    const cleaned = await ask(`with=${day.id}&channel=margin`);
    expect(cleaned.after.distanceM).toBeLessThan(before.after.distanceM);
    expect(cleaned.before).toEqual(before.before);
    expect(await ask(`with=${day.id}&channel=margin&cleaned=false`)).toEqual(before);
  });

  it("are refused where one is missing, unseen, the same, or has no such channel", async () => {
    const status = async (query: string, actor: "owner" | "viewer" = "owner") =>
      (await world.as(actor, { path: path(query) })).status;
    expect(await status("with=log_nowhere&channel=margin")).toBe(404);
    expect(await status(`with=${day.id}&channel=margin`, "viewer")).toBe(404);
    expect(await status(`with=${four.id}&channel=margin`)).toBe(422);
    expect(await status(`with=${day.id}&channel=moisture`)).toBe(422);
    expect(await status(`with=${day.id}&channel=flags`)).toBe(422);
    expect(await status("channel=margin")).toBe(422);
  });
});
