import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { makeWorld, type World } from "@/tests/support/make-world";

const drill = {
  kind: "seeder",
  name: "24-row drill",
  rowCount: 24,
  rowSpacingM: 0.25,
  antennaToRowsM: 4.2,
  antennaRightM: 0,
  hitch: "rigid",
  rowUnitMassKg: 95,
  targetMarginN: 400,
};
let world: World;
beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());

const add = (body: unknown, expected = 201) =>
  world.read("agronomist", { method: "POST", path: "/api/v1/machines", body, expect: expected });

describe("machines", () => {
  it("gives back what was stored, with an address", async () => {
    const made = await add(drill);
    expect(made).toMatchObject(drill);
    expect(await world.read("operator", { path: `/api/v1/machines/${String(made.id)}` })).toEqual(made);
    expect(await world.read("owner", { path: "/api/v1/machines" })).toMatchObject({ items: [made] });
  });

  it("names the rule that a machine breaks", async () => {
    const offsets = await add({ ...drill, rowOffsetsM: [0, 1] }, 422);
    expect(offsets.errors).toMatchObject([{ path: "rowOffsetsM", message: "needs one entry a row: 24, got 2" }]);
    const trailed = await add({ ...drill, hitch: "trailed" }, 422);
    expect(trailed.errors).toMatchObject([{ path: "hitchToRowsM" }]);
    await add({ kind: "tractor", name: "x" }, 422);
  });

  it("checks the whole machine after a change, and takes a value away by null", async () => {
    const { id } = await add(drill);
    const path = `/api/v1/machines/${String(id)}`;
    const patch = (body: unknown, expected = 200) =>
      world.read("agronomist", { method: "PATCH", path, body, expect: expected });
    expect(await patch({ name: "Drill, wide tyres" })).toMatchObject({ name: "Drill, wide tyres", targetMarginN: 400 });
    expect(await patch({ targetMarginN: null })).not.toHaveProperty("targetMarginN");
    await patch({ rowSpacingM: -1 }, 422);
    await patch({ hitch: "trailed" }, 422);
    await patch({ kind: "combine" }, 422);
    expect(await world.read("owner", { path })).toMatchObject({ rowSpacingM: 0.25, hitch: "rigid" });
  });

  it("is kept while logs were placed with it, and leaves them their copy when forced", async () => {
    const { id } = await add(drill);
    const field = await world.read("owner", { method: "POST", path: "/api/v1/fields", body: { name: "F" } });
    await adminDb().$client.query(
      `insert into logs (organisation_id, id, field_id, machine_id, machine_body, name, counts, file_name, file_bytes, sha256)
       values ('org_larkspurflats', 'log_m', $1, $2, $3, 'l', '{}', 'a.csv', 1, 'aa')`,
      [field.id, id, JSON.stringify(drill)],
    );
    const path = `/api/v1/machines/${String(id)}`;
    const kept = await world.read("agronomist", { method: "DELETE", path, expect: 409 });
    expect(kept).toMatchObject({ code: "machine_has_logs", logCount: 1 });
    await world.read("agronomist", { method: "DELETE", path: `${path}?force=1`, expect: 204 });
    const { rows } = await adminDb().$client.query("select machine_id, machine_body->>'name' as name from logs");
    expect(rows).toEqual([{ machine_id: null, name: "24-row drill" }]);
  });
});
