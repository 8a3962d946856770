import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { SIMULATION_DEFAULTS } from "@/lib/simulator/simulation-options";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";
import type { LogColumns } from "@/lib/schemas/logs";
import type { ChannelDelay, DelaysBody } from "@/lib/schemas/alignment";
import { lookCloser } from "@/lib/server/alignment/look-closer";
import { LogInterrupted } from "@/lib/server/logs/log-failure";
import { textured } from "@/tests/lib/alignment/delay-log";
import { makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";
import { confirmedMapping } from "@/tests/support/log-mapping";

const LARKSPUR = "org_larkspurflats";
let world: LogWorld;
let logId: string;
let machineId: string;

async function uploadLate(seed: number): Promise<string> {
  const { log } = simulateSeedingLog(textured(seed, 1.5));
  const { machine } = SIMULATION_DEFAULTS;
  const bytes = writeWideCsv(log, { force: "N" });
  const { id } = await world.uploadAndSettle({ bytes, name: `late-${seed}.csv`, machineId });
  const columns = (await world.read("owner", { path: `/api/v1/logs/${id}/columns` })) as unknown as LogColumns;
  const mapping = { method: "PUT", path: `/api/v1/logs/${id}/mapping`, body: confirmedMapping(columns), expect: 202 };
  await world.read("owner", mapping);
  const ready = await world.settle(id);
  expect(ready, JSON.stringify(ready)).toMatchObject({ status: "ready" });
  expect(ready.counts.rows).toBe(machine.rowCount);
  return ready.id;
}

const delaysOf = async (id: string) =>
  (await world.read("owner", { path: `/api/v1/logs/${id}/delays` })) as unknown as DelaysBody;

async function waitForLook(id: string): Promise<DelaysBody> {
  for (let tries = 0; tries < 1_200; tries++) {
    const delays = await delaysOf(id);
    if (delays.state === "done") return delays;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error(`no look at ${id}: ${JSON.stringify(await delaysOf(id))}`);
}

const lateNotes = async (id: string) => (await world.getLog(id)).notes.filter(({ code }) => code === "channel-late");

beforeAll(async () => {
  world = await makeLogWorld();
  const body = SIMULATION_DEFAULTS.machine;
  machineId = String((await world.read("owner", { method: "POST", path: "/api/v1/machines", body, expect: 201 })).id);
  const worker = await world.startWorker();
  logId = await uploadLate(1);
  await waitForLook(logId);
  await worker.stop();
});
afterAll(async () => world.close());

describe("the second look at a log that is ready", () => {
  it("tells the delay put into the log, and says so in one note", async () => {
    const { items, channels, state, progress } = await delaysOf(logId);
    expect({ state, progress, channels }).toEqual({ state: "done", progress: 1, channels: ["margin"] });
    const [margin] = items as [ChannelDelay];
    expect(margin).toMatchObject({ channel: "margin", unit: "N", state: "estimated", separable: false, applied: null });
    expect(Math.abs(margin.delayS! - 1.5)).toBeLessThan(0.2);
    expect(margin.pairs).toBe(9);
    expect(margin.curve.length).toBeGreaterThan(30);
    const [note, ...more] = await lateNotes(logId);
    expect(more).toEqual([]);
    expect(note!.message).toMatch(/^Margin seems logged 1\.5 s late \(1\.\d to 1\.\d s\)/);
  });

  it("takes the note away when the delay is taken out, brings it back on undo, and never doubles it", async () => {
    const path = `/api/v1/logs/${logId}/delays`;
    const changed = await world.read("agronomist", { method: "PUT", path, body: { delaysS: { margin: 1.5 } } });
    expect((changed as unknown as DelaysBody).items[0]!.applied).toBe(1.5);
    expect(await lateNotes(logId)).toEqual([]);
    await world.read("agronomist", { method: "POST", path: `/api/v1/logs/${logId}/cleaning/undo`, body: {} });
    expect((await delaysOf(logId)).items[0]!.applied).toBeNull();
    expect(await lateNotes(logId)).toHaveLength(1);
    await setLook(logId, { state: "waiting", attempts: 0 });
    await lookCloser({ organisationId: LARKSPUR, logId }, options());
    expect(await lateNotes(logId)).toHaveLength(1);
  });

  it("tells of mirrored rows once, and no longer when they are as logged", async () => {
    const found = (state: string) =>
      adminDb().$client.query("update log_results set body = body || $2 where log_id = $1 and kind = 'mirrored'", [
        logId,
        JSON.stringify({ state, reason: "Rows seem mirrored left to right." }),
      ]);
    const notesAfterLook = async () => {
      await setLook(logId, { state: "waiting", attempts: 0 });
      await lookCloser({ organisationId: LARKSPUR, logId }, options());
      const { notes } = await world.getLog(logId);
      return notes.filter(({ code }) => code === "rows-mirrored" || code === "row-order-unchecked");
    };
    await found("mirrored");
    expect(await notesAfterLook()).toMatchObject([{ message: "Rows seem mirrored left to right." }]);
    expect(await notesAfterLook()).toHaveLength(1);
    await found("as-logged");
    expect(await notesAfterLook()).toEqual([]);
    await found("cannot-tell");
    expect(await notesAfterLook()).toMatchObject([
      {
        code: "row-order-unchecked",
        message: expect.stringMatching(/^Row order \(row 1 left\) could not be checked: /),
      },
    ]);
  });

  it("refuses channels that cannot be late, and delays beyond reason", async () => {
    const path = `/api/v1/logs/${logId}/delays`;
    const refused = { method: "PUT", path, expect: 422 };
    expect(await world.read("owner", { ...refused, body: { delaysS: { longitude: 1 } } })).toMatchObject({
      errors: [{ path: "delaysS" }],
    });
    await world.read("owner", { ...refused, body: { delaysS: { margin: 61 } } });
    await world.read("owner", { ...refused, method: "POST", body: { channel: "resistance" } });
    await world.read("researcher", { method: "PUT", path, body: { delaysS: { margin: 1 } }, expect: 403 });
  });

  it("asked again, answers what it knows without new work", async () => {
    const path = `/api/v1/logs/${logId}/delays`;
    expect(await world.read("owner", { method: "POST", path, body: {}, expect: 202 })).toMatchObject({ state: "done" });
  });
});

interface StoredLook {
  state: string;
  attempts: number;
}

async function storedLook(id: string): Promise<StoredLook> {
  const { rows } = await adminDb().$client.query<{ body: StoredLook }>(
    "select body from log_results where log_id = $1 and kind = 'look'",
    [id],
  );
  return rows[0]!.body;
}

async function setLook(id: string, change: Partial<StoredLook>): Promise<void> {
  const text = JSON.stringify(change);
  await adminDb().$client.query("update log_results set body = body || $2 where log_id = $1 and kind = 'look'", [
    id,
    text,
  ]);
}

async function forgetLook(id: string): Promise<void> {
  const kinds = "(kind = 'look' or kind = 'mirrored' or kind like 'delay:%')";
  await adminDb().$client.query(`delete from log_results where log_id = $1 and ${kinds}`, [id]);
}

function options(signal: AbortSignal = new AbortController().signal) {
  return { env: world.container.env, signal, whenIdle: () => Promise.resolve() };
}

describe("a look that is broken off", () => {
  const payload = () => ({ organisationId: LARKSPUR, logId });

  it("by a shutdown is put back untried, and finished by the next", async () => {
    await forgetLook(logId);
    const stopping = new AbortController();
    const work = lookCloser(payload(), options(stopping.signal));
    setTimeout(() => stopping.abort(new LogInterrupted("shutdown")), 30);
    await work;
    expect(await storedLook(logId)).toMatchObject({ state: "waiting", attempts: 0 });
    await lookCloser(payload(), options());
    expect(await storedLook(logId)).toMatchObject({ state: "done", attempts: 1 });
    expect(await lateNotes(logId)).toHaveLength(1);
  });

  it("by a killed worker is found by the next one, and tried three times at most", async () => {
    await forgetLook(logId);
    await lookCloser(payload(), options());
    await setLook(logId, { state: "working", attempts: 1 });
    // Found by the sweep only a while after the log last moved.
    await adminDb().$client.query("update logs set updated_at = now() - interval '1 minute' where id = $1", [logId]);
    const worker = await world.startWorker();
    await waitForLook(logId);
    await worker.stop();
    expect(await storedLook(logId)).toMatchObject({ state: "done", attempts: 2 });
    await setLook(logId, { state: "working", attempts: 3 });
    await lookCloser(payload(), options());
    expect(await storedLook(logId)).toMatchObject({ state: "failed" });
    const again = { method: "POST", path: `/api/v1/logs/${logId}/delays`, body: {}, expect: 202 };
    expect(await world.read("owner", again)).toMatchObject({ state: "working" });
    await lookCloser(payload(), options());
    expect(await storedLook(logId)).toMatchObject({ state: "done" });
  });

  it("by the log's removal leaves nothing", async () => {
    const worker = await world.startWorker();
    const id = await uploadLate(2);
    await worker.stop();
    await forgetLook(id);
    const work = lookCloser({ organisationId: LARKSPUR, logId: id }, options());
    await new Promise((resolve) => setTimeout(resolve, 30));
    expect((await world.as("owner", { method: "DELETE", path: `/api/v1/logs/${id}` })).status).toBe(204);
    await work;
    const { rows } = await adminDb().$client.query("select kind from log_results where log_id = $1", [id]);
    expect(rows).toEqual([]);
  });
});
