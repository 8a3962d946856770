import { eq } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { logs } from "@/db/schema";
import type { LogColumns } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, fixtureMachine, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
beforeAll(async () => (world = await makeLogWorld()));
afterAll(async () => world.close());

let uploads = 0;

/** A log of eight rows whose columns have been looked at. The worker has stopped again. */
async function lookedAt() {
  const worker = await world.startWorker();
  const bytes = `${Buffer.from(fixtureBytes("csv/wide-newtons/input.csv"))}${"\n".repeat(++uploads)}`;
  const log = await world.uploadAndSettle({ bytes, name: "pass.csv" });
  await worker.stop();
  const path = `/api/v1/logs/${log.id}`;
  const found = (await world.read("operator", { path: `${path}/columns` })) as unknown as LogColumns;
  const mapping = confirmedMapping(found);
  const put = (body: Record<string, unknown>) => world.as("operator", { method: "PUT", path: `${path}/mapping`, body });
  return { log, path, mapping, put };
}

async function newMachine(name: string): Promise<string> {
  const body = { ...fixtureMachine(), name };
  return String((await world.read("owner", { method: "POST", path: "/api/v1/machines", body, expect: 201 })).id);
}

describe("a mapping with a machine", () => {
  it("changes both in one go, and null takes the machine away", async () => {
    const { log, mapping, put } = await lookedAt();
    const machineId = await newMachine("Second drill");
    const reply = await put({ ...mapping, machineId });
    expect(reply.status).toBe(202);
    expect(await reply.json()).toMatchObject({ status: "queued", machineId });
    const worker = await world.startWorker();
    expect(await world.settle(log.id)).toMatchObject({ status: "ready", version: 1, machineId });
    expect((await put({ ...mapping, machineId: null })).status).toBe(202);
    const without = await world.settle(log.id);
    expect(without).toMatchObject({ status: "ready", version: 2, machineId: null });
    expect(without.notes.map((note) => note.code)).toContain("machine-unknown");
    await worker.stop();
  });

  it("that is a combine leaves no word of an unknown machine, and its header gives the width", async () => {
    const { log, path, mapping, put } = await lookedAt();
    const body = { kind: "combine", name: "Larkspur combine", headerWidthM: 9.6 };
    const combine = await world.read("owner", { method: "POST", path: "/api/v1/machines", body, expect: 201 });
    expect((await put({ ...mapping, machineId: combine.id })).status).toBe(202);
    const worker = await world.startWorker();
    const settled = await world.settle(log.id);
    await worker.stop();
    expect(settled).toMatchObject({ status: "ready", machineId: combine.id });
    expect(settled.notes.map((note) => note.code)).not.toContain("machine-unknown");
    const readings = await world.read("owner", { path: `${path}/passes/1/readings?channel=depth` });
    // Eight rows share 9.6 m.
    for (const widthM of readings.rowWidthsM as number[]) expect(widthM).toBeCloseTo(1.2, 6);
  });

  it("keeps the machine where none is named, and refuses one that is not there", async () => {
    const { log, mapping, put } = await lookedAt();
    const unknown = await put({ ...mapping, machineId: "mac_nosuchmachine" });
    expect(unknown.status).toBe(422);
    expect(await unknown.json()).toMatchObject({ errors: [{ path: "machineId" }] });
    expect((await world.getLog(log.id)).status).toBe("needs-mapping");
    expect(await (await put(mapping)).json()).toMatchObject({ machineId: world.machineId });
  });
});

describe("a mapping with rows counted from the right", () => {
  it("turns the rows round in a new version, and back in the next", async () => {
    const { log, path, mapping, put } = await lookedAt();
    const worker = await world.startWorker();
    const margins = async () => {
      await world.settle(log.id);
      const readings = await world.read("owner", { path: `${path}/passes/1/readings?channel=margin` });
      return readings.values as (number | null)[][];
    };
    await put(mapping);
    const before = await margins();
    expect(before[0]).not.toEqual(before[7]);
    await put({ ...mapping, rowsFromRight: true });
    expect(await margins()).toEqual(before.toReversed());
    expect(await world.getLog(log.id)).toMatchObject({ version: 2 });
    await put(mapping);
    expect(await margins()).toEqual(before);
    await worker.stop();
    expect((await put({ ...mapping, rowsFromRight: "yes" })).status).toBe(422);
  });
});

describe("a mapping for a log on its way", () => {
  it("replaces the one of a log that waits for its turn, which is then read once", async () => {
    const { log, mapping, put } = await lookedAt();
    expect((await put(mapping)).status).toBe(202);
    const columns = mapping.columns.map((column) => (column.unit === "mm" ? { ...column, unit: "cm" } : column));
    expect((await put({ ...mapping, columns })).status).toBe(202);
    const worker = await world.startWorker();
    expect(await world.settle(log.id)).toMatchObject({ status: "ready", version: 1 });
    await worker.stop();
    const [row] = await adminDb().select().from(logs).where(eq(logs.id, log.id));
    expect(row?.mapping?.columns).toEqual(columns);
  });

  it.each(["reading", "building"] as const)("is refused while the log is %s", async (status) => {
    const { log, mapping, put } = await lookedAt();
    await adminDb().update(logs).set({ status }).where(eq(logs.id, log.id));
    const reply = await put(mapping);
    expect(reply.status).toBe(409);
    expect(await reply.json()).toMatchObject({ code: "log_busy" });
  });
});
