import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { LogPart } from "@/lib/export/export-table";
import { logParts } from "@/lib/export/log-parts";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import { toByteStream } from "@/lib/server/export/byte-stream";
import { loadLogFrame, readLogParts } from "@/lib/server/export/read-log-parts";
import { loadPlacedLog } from "@/lib/server/logs/load-placed-log";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
let log: Log;
const scope = { organisationId: "org_larkspurflats" };
const version = () => ({ ...scope, id: log.id, version: log.version });

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

async function partsOf(readingsAFetch: number): Promise<LogPart[]> {
  const frame = await loadLogFrame(scope, version(), "all");
  const parts: LogPart[] = [];
  for await (const part of readLogParts(scope, version(), frame, readingsAFetch)) parts.push(part);
  return parts;
}

describe("a log read back part by part", () => {
  it.each([1, 20_000, 1_000_000])("is the whole log cut into passes, %i readings a fetch", async (readingsAFetch) => {
    const whole = [...logParts(await loadPlacedLog(version(), "all"))];
    const parts = await partsOf(readingsAFetch);
    expect(parts.length).toBeGreaterThan(4);
    expect(parts).toHaveLength(whole.length);
    whole.forEach((wanted, index) => {
      const { plane, ...placed } = parts[index]!.placed;
      const { plane: wantedPlane, ...wantedPlaced } = wanted.placed;
      expect(plane.toDegrees(10, 20)).toEqual(wantedPlane.toDegrees(10, 20));
      expect(placed).toEqual(wantedPlaced);
      expect(parts[index]!.firstRecord).toBe(wanted.firstRecord);
      expect(parts[index]!.logStartMs).toBe(wanted.logStartMs);
    });
  });

  it("is not found under another organisation", async () => {
    await expect(loadLogFrame({ organisationId: "org_otherfarm" }, version(), "all")).rejects.toThrow("read again");
  });

  it("breaks off, instead of ending early, when a newer version takes its place", async () => {
    const old = version();
    const frame = await loadLogFrame(scope, old, "all");
    const parts = readLogParts(scope, old, frame, 1);
    expect((await parts.next()).done).toBe(false);
    await world.read("owner", { method: "PATCH", path: `/api/v1/logs/${log.id}`, body: { machineId: null } });
    log = await world.settle(log.id);
    expect(log.version).toBeGreaterThan(old.version);
    let cleanUps = 0;
    const chunks = async function* () {
      for await (const part of parts) yield new Uint8Array(part.placed.log.records);
    };
    const reader = toByteStream(chunks(), async () => void cleanUps++).getReader();
    const drain = async () => {
      for (let part = await reader.read(); !part.done; part = await reader.read()) continue;
    };
    await expect(drain()).rejects.toThrow("read again");
    expect(cleanUps).toBe(1);
  });
});
