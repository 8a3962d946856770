import { afterAll, afterEach, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import type { Log } from "@/lib/schemas/logs";
import { createBenchmarkLog, keepFirstRecords } from "@/lib/simulator/benchmark-log";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";
import type { RunningWorker } from "@/lib/server/worker/start-worker";
import { startNode, type Child } from "@/scripts/child-process";
import { inspectLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
let text: string;
let mapping: { shape: string; columns: unknown[] };
const RECORDS = 20_000;
const children: Child[] = [];
const workers: RunningWorker[] = [];

beforeAll(async () => {
  world = await makeLogWorld();
  text = writeWideCsv(keepFirstRecords(createBenchmarkLog("large"), RECORDS));
  const inspected = await inspectLog(bytesSource("log.csv", new TextEncoder().encode(text)));
  if (!inspected.ok) throw new Error(inspected.error.message);
  mapping = {
    shape: inspected.value.shape,
    columns: inspected.value.columns.flatMap(({ name, proposal }) => (proposal?.unit ? [{ name, ...proposal }] : [])),
  };
});
// A worker that a failed test left running would take the next test's logs.
afterEach(async () => {
  for (const worker of workers.splice(0)) await worker.stop();
  for (const child of children.splice(0)) await child.stop();
});
afterAll(async () => world.close());

async function startWorker(): Promise<void> {
  workers.push(await world.startWorker());
}

/** The compiled worker as a process of its own, as `npm start` runs it. */
async function startWorkerProcess(): Promise<Child> {
  const { env } = world.container;
  const strings = Object.fromEntries(Object.entries(env).map(([key, value]) => [key, String(value)]));
  const environment = {
    ...process.env,
    ...strings,
    DEMO: "0",
    AUTH_SECRET_IS_LOCAL: "1",
    NODE_ENV: "production" as const,
  };
  const child = startNode({ name: "worker", script: `${env.BUILD_DIR}/worker.mjs`, environment, quiet: true });
  children.push(child);
  await child.ready;
  return child;
}

async function upload(name: string): Promise<string> {
  const response = await world.upload({ bytes: text, name, mapping, machineId: null, query: "?again=1" });
  expect(response.status).toBe(202);
  return ((await response.json()) as { id: string }).id;
}

async function waitFor(logId: string, wanted: (log: Log) => boolean): Promise<Log> {
  for (let tries = 0; tries < 4_000; tries++) {
    const log = await world.getLog(logId);
    if (wanted(log)) return log;
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
  throw new Error(`log ${logId} never came so far: ${JSON.stringify(await world.getLog(logId))}`);
}

async function countRows(logId: string): Promise<{ points: number; versions: number; attempts: number; open: number }> {
  const { rows } = await adminDb().$client.query<Record<string, number>>(
    `select (select count(*)::int from log_points where log_id = $1) as points,
      (select count(distinct version)::int from pass_readings where log_id = $1) as versions,
      (select max(attempts)::int from jobs where subject = $1) as attempts,
      (select count(*)::int from jobs where subject = $1 and state in ('queued', 'running')) as open`,
    [logId],
  );
  return rows[0] as unknown as Awaited<ReturnType<typeof countRows>>;
}

const isUnderWay = (log: Log) => (log.status === "reading" || log.status === "building") && log.progress > 0.05;

describe("a worker", () => {
  it("killed in the middle of a log leaves nothing half-written; the next one finishes it, once", async () => {
    const first = await startWorkerProcess();
    const logId = await upload("killed.csv");
    await waitFor(logId, isUnderWay);
    first.process.kill("SIGKILL");
    const left = await world.getLog(logId);
    expect(left.status).not.toBe("ready");
    expect((await countRows(logId)).points).toBe(0);
    await startWorkerProcess();
    const log = await waitFor(logId, (state) => state.status === "ready");
    expect(log).toMatchObject({ version: 1, counts: { records: RECORDS, rows: 48 } });
    // Long enough for a second delivery to show.
    await new Promise((resolve) => setTimeout(resolve, 6_000));
    expect(await countRows(logId)).toEqual({ points: RECORDS, versions: 1, attempts: 2, open: 0 });
    expect((await world.getLog(logId)).version).toBe(1);
  });

  it("told to stop puts the log back, untried, and ends by itself", async () => {
    const first = await startWorkerProcess();
    const logId = await upload("stopped.csv");
    await waitFor(logId, isUnderWay);
    await first.stop();
    expect(first.process.exitCode).toBe(0);
    const left = await world.getLog(logId);
    expect(left).toMatchObject({ status: "queued", version: 0 });
    expect((await countRows(logId)).attempts).toBe(0);
    await startWorkerProcess();
    await waitFor(logId, (state) => state.status === "ready");
    expect(await countRows(logId)).toMatchObject({ points: RECORDS, versions: 1, open: 0 });
  });

  it("beside another one never reads the same log twice", async () => {
    await startWorker();
    await startWorker();
    const ids = await Promise.all([1, 2, 3].map((n) => upload(`side-${n}.csv`)));
    for (const id of ids) {
      expect(await waitFor(id, (state) => state.status === "ready")).toMatchObject({ version: 1 });
      expect(await countRows(id)).toEqual({ points: RECORDS, versions: 1, attempts: 1, open: 0 });
    }
  });
});

describe("a log under way", () => {
  it("is stopped on request, says so, keeps nothing, and can be read again", async () => {
    await startWorker();
    const logId = await upload("cancelled.csv");
    await waitFor(logId, isUnderWay);
    await world.read("operator", { method: "POST", path: `/api/v1/logs/${logId}/cancel`, expect: 202 });
    const stopped = await waitFor(logId, (state) => state.status === "failed");
    expect(stopped).toMatchObject({ version: 0, error: { code: "cancelled" } });
    expect(await countRows(logId)).toMatchObject({ points: 0, versions: 0, open: 0 });
    const again = await world.as("operator", { method: "POST", path: `/api/v1/logs/${logId}/cancel` });
    expect(again.status).toBe(409);
    await world.read("operator", { method: "POST", path: `/api/v1/logs/${logId}/retry`, expect: 202 });
    expect(await waitFor(logId, (state) => state.status === "ready")).toMatchObject({ version: 1, error: null });
  });

  it("that nobody reads yet is stopped at once", async () => {
    const logId = await upload("waiting.csv");
    await world.read("operator", { method: "POST", path: `/api/v1/logs/${logId}/cancel`, expect: 202 });
    expect(await world.getLog(logId)).toMatchObject({ status: "failed", error: { code: "cancelled" } });
    expect((await countRows(logId)).open).toBe(0);
  });

  it("that is deleted meanwhile leaves nothing", async () => {
    await startWorker();
    const logId = await upload("deleted.csv");
    await waitFor(logId, isUnderWay);
    expect((await world.as("owner", { method: "DELETE", path: `/api/v1/logs/${logId}` })).status).toBe(204);
    await workers.pop()?.stop();
    expect(await countRows(logId)).toMatchObject({ points: 0, versions: 0, open: 0 });
  });

  it("whose job was never sent is found all the same", async () => {
    const { queue } = world.container;
    const send = queue.send.bind(queue);
    queue.send = () => Promise.reject(new Error("the queue is away"));
    const logId = await upload("unsent.csv").finally(() => (queue.send = send));
    await startWorker();
    await waitFor(logId, (state) => state.status === "ready");
  });
});

describe("a log that asks too much", () => {
  it("of time fails with a word about it", async () => {
    const slow = await makeLogWorld({ READ_LIMIT_S: "0.2" });
    try {
      await slow.startWorker();
      const log = await slow.uploadAndSettle({ bytes: text, name: "slow.csv", mapping, machineId: null });
      expect(log).toMatchObject({ status: "failed", error: { code: "took-too-long" } });
      expect(log.error?.message).toContain("0.2 s");
    } finally {
      await slow.close();
    }
  });
});
