import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { replaceContainer } from "@/app/_server/container";
import type { Log } from "@/lib/schemas/logs";
import { createContainer, type Container } from "@/lib/server/create-container";
import { startObjectStore } from "@/lib/server/fakes/object-store";
import { startWorker, type RunningWorker } from "@/lib/server/worker/start-worker";
import { findFreePort } from "@/scripts/find-port";
import { makeWorld, type Actor, type World } from "@/tests/support/make-world";

/** A world with a real object store (a fake server on a folder), the real queue, and a worker that can be stopped. */
export interface LogWorld extends Omit<World, "container"> {
  container: Container;
  fieldId: string;
  machineId: string;
  startWorker: () => Promise<RunningWorker>;
  upload: (input: UploadInput) => Promise<Response>;
  /** Uploads, demands 202 and waits until the log is settled. */
  uploadAndSettle: (input: UploadInput) => Promise<Log>;
  settle: (logId: string) => Promise<Log>;
  getLog: (logId: string) => Promise<Log>;
  /** Keys of everything in the object store. */
  storedKeys: () => Promise<string[]>;
}

export interface UploadInput {
  bytes: Uint8Array | string;
  name: string;
  mapping?: unknown;
  machineId?: string | null;
  actor?: Actor;
  query?: string;
  fieldId?: string;
}

export const FIXTURES = "fixtures/logs";

export function fixtureBytes(name: string): Uint8Array {
  return readFileSync(path.join(FIXTURES, name));
}

/** The drill of the fixtures, as their truth tells it. */
export function fixtureMachine(): Record<string, unknown> {
  const truth = JSON.parse(readFileSync(path.join(FIXTURES, "csv/wide-newtons/truth.json"), "utf8")) as {
    machine: Record<string, unknown>;
  };
  return truth.machine;
}

/** Runs a step the first time and answers with the same promise afterwards. */
function once(work: () => Promise<void>): () => Promise<void> {
  let running: Promise<void> | undefined;
  return () => (running ??= work());
}

const SETTLED = ["ready", "failed", "needs-mapping"];

export async function makeLogWorld(changes: Record<string, string> = {}): Promise<LogWorld> {
  const world = await makeWorld();
  const folder = mkdtempSync(path.join(tmpdir(), "coulterbook-objects-"));
  const port = await findFreePort(30_000 + (process.pid % 20_000));
  const store = await startObjectStore({ folder, port, bucket: "coulterbook" });
  const env = {
    ...world.container.env,
    S3_ENDPOINT: `http://127.0.0.1:${store.port}`,
    BUILD_DIR: process.env.BUILD_DIR ?? "build",
    ...Object.fromEntries(Object.entries(changes).map(([key, value]) => [key, Number(value)])),
  };
  const container = createContainer(env);
  replaceContainer(container);
  const workers: RunningWorker[] = [];
  const field = await world.read("owner", { method: "POST", path: "/api/v1/fields", body: { name: "East quarter" } });
  const machine = await world.read("owner", { method: "POST", path: "/api/v1/machines", body: fixtureMachine() });
  const fieldId = String(field.id);

  const upload = (input: UploadInput) => {
    const form = new FormData();
    const bytes = typeof input.bytes === "string" ? input.bytes : new Uint8Array(input.bytes);
    // The file first: the other parts must be found behind it.
    form.set("file", new File([bytes], input.name));
    if (input.mapping !== undefined) form.set("mapping", JSON.stringify(input.mapping));
    if (input.machineId !== null) form.set("machineId", input.machineId ?? String(machine.id));
    const query = input.query ?? "";
    return world.as(input.actor ?? "operator", {
      method: "POST",
      path: `/api/v1/fields/${input.fieldId ?? fieldId}/logs${query}`,
      body: form,
    });
  };
  const getLog = async (logId: string) =>
    (await world.read("owner", { path: `/api/v1/logs/${logId}` })) as unknown as Log;
  const settle = async (logId: string) => {
    const until = Date.now() + 45_000;
    while (Date.now() < until) {
      const log = await getLog(logId);
      if (SETTLED.includes(log.status)) return log;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    throw new Error(`log ${logId} did not settle: ${JSON.stringify(await getLog(logId))}`);
  };
  return {
    ...world,
    container,
    fieldId,
    machineId: String(machine.id),
    upload,
    getLog,
    settle,
    uploadAndSettle: async (input) => {
      const response = await upload(input);
      const body = (await response.json()) as { id: string };
      if (response.status !== 202) throw new Error(`upload: ${response.status} ${JSON.stringify(body)}`);
      return settle(body.id);
    },
    startWorker: async () => {
      const worker = await startWorker(createContainer(env));
      const stop = once(worker.stop);
      workers.push({ stop });
      return { stop };
    },
    storedKeys: async () => {
      const keys: string[] = [];
      for await (const { key } of container.storage.list("organisations/")) keys.push(key);
      return keys;
    },
    close: async () => {
      for (const worker of workers) await worker.stop();
      await container.queue.close();
      await world.close();
      await store.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
