import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
beforeAll(async () => {
  world = await makeLogWorld();
});
afterAll(async () => world.close());

/** Every state that a stream of events tells, to its end. */
async function readEvents(logId: string): Promise<Log[]> {
  const response = await world.as("operator", { path: `/api/v1/logs/${logId}/events` });
  expect(response.headers.get("content-type")).toContain("text/event-stream");
  const text = await response.text();
  return text
    .split("\n\n")
    .filter((event) => event.startsWith("data: "))
    .map((event) => JSON.parse(event.slice("data: ".length)) as Log);
}

describe("server-sent events", () => {
  it("tell the way from waiting to ready, never backwards, and end there", async () => {
    const bytes = fixtureBytes("csv/wide-newtons/input.csv");
    const id = ((await (await world.upload({ bytes, name: "a.csv" })).json()) as { id: string }).id;
    const waiting = readEvents(id);
    const worker = await world.startWorker();
    const first = await waiting;
    expect(first[0]).toMatchObject({ status: "queued", stage: "Waiting for its turn" });
    expect(first.at(-1)).toMatchObject({ status: "needs-mapping" });
    await worker.stop();

    const columns = (await world.read("owner", { path: `/api/v1/logs/${id}/columns` })) as unknown as LogColumns;
    const path = `/api/v1/logs/${id}/mapping`;
    await world.read("operator", { method: "PUT", path, body: confirmedMapping(columns) });
    const reading = readEvents(id);
    await world.startWorker();
    const states = await reading;
    expect(states[0]?.status).toBe("queued");
    expect(states.at(-1)).toMatchObject({ status: "ready", progress: 1, version: 1 });
    const progress = states.map((state) => state.progress);
    expect([...progress].sort((a, b) => a - b)).toEqual(progress);
    expect(new Set(states.map((state) => state.id))).toEqual(new Set([id]));
  });

  it("of a settled log tell its state and end at once", async () => {
    const { items } = (await world.read("operator", { path: `/api/v1/fields/${world.fieldId}/logs` })) as {
      items: Log[];
    };
    const { id } = items[0]!;
    expect(await readEvents(id)).toEqual([await world.read("operator", { path: `/api/v1/logs/${id}` })]);
  });
});
