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

  it("says what machine the file describes, and notes one that differs", async () => {
    const bytes = fixtureBytes("iso11783/one-task/input.zip");
    const machine = { kind: "seeder", name: "Wider drill", rowCount: 8, rowSpacingM: 0.3, antennaToRowsM: 2.5 };
    const body = { ...machine, hitch: "rigid", rowUnitMassKg: 82 };
    const { id } = await world.read("owner", { method: "POST", path: "/api/v1/machines", body });
    const log = await world.uploadAndSettle({ bytes, name: "one.zip", machineId: String(id) });
    const path = `/api/v1/logs/${log.id}`;
    const columns = (await world.read("operator", { path: `${path}/columns` })) as unknown as LogColumns;
    expect(columns.device).toMatchObject({ name: "Larkspur drill", rows: 8, rowSpacingM: 0.25, widthM: 2 });
    expect(columns.device?.rowOffsetsM).toHaveLength(8);
    const mapping = { ...confirmedMapping(columns), timeZone: "America/Chicago" };
    await world.read("operator", { method: "PUT", path: `${path}/mapping`, body: mapping });
    const wide = await world.settle(log.id);
    const note = wide.notes.find(({ code }) => code === "device-disagrees");
    expect(note?.message).toContain("The file's machine is 2 m wide, the chosen one 2.4 m.");
    await world.read("owner", { method: "PATCH", path, body: { machineId: world.machineId } });
    const right = await world.settle(log.id);
    expect(right.notes.map(({ code }) => code)).not.toContain("device-disagrees");
  });

  it("the recipe of it does not choose for the next file", async () => {
    const query = "?again=1";
    const bytes = fixtureBytes("iso11783/several-tasks/input.zip");
    const log = await world.uploadAndSettle({ bytes, name: "tasks again.zip", query });
    expect(log.status).toBe("needs-mapping");
  });
});
