import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { LogColumns } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
});
afterAll(async () => world.close());

describe("a file that holds several logs", () => {
  it("waits for a person to choose one, refuses a mapping that does not, and reads the chosen one", async () => {
    const log = await world.uploadAndSettle({
      bytes: fixtureBytes("iso11783/several-tasks/input.zip"),
      name: "tasks.zip",
    });
    expect(log.status).toBe("needs-mapping");
    const path = `/api/v1/logs/${log.id}`;
    const columns = (await world.read("owner", { path: `${path}/columns` })) as unknown as LogColumns;
    expect(columns.format).toBe("iso11783");
    expect(columns.layers?.map(({ id }) => id)).toEqual(["TSK-2/TLG00002", "TSK-1/TLG00001"]);
    const mapping = { ...confirmedMapping(columns), timeZone: "America/Chicago" };
    const put = (body: unknown) => world.as("operator", { method: "PUT", path: `${path}/mapping`, body });
    const open = await put(mapping);
    expect(open.status).toBe(422);
    expect(((await open.json()) as { code: string }).code).toBe("several-layers");
    expect((await put({ ...mapping, layer: "TSK-9/TLG00001" })).status).toBe(422);
    expect((await put({ ...mapping, layer: "TSK-1/TLG00001", save: "Task data of the drill" })).status).toBe(202);
    const read = await world.settle(log.id);
    expect(read).toMatchObject({ status: "ready", kind: "seeding" });
    expect(read.counts).toMatchObject({ records: 60, rows: 8 });
    expect(read.channels.map(({ id }) => id)).toEqual(expect.arrayContaining(["downforce", "margin", "depth"]));
  });

  it("the recipe of it does not choose for the next file", async () => {
    const query = "?again=1";
    const bytes = fixtureBytes("iso11783/several-tasks/input.zip");
    const log = await world.uploadAndSettle({ bytes, name: "tasks again.zip", query });
    expect(log.status).toBe("needs-mapping");
  });
});
