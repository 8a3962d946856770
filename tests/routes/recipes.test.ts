import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { makeWorld, type World } from "@/tests/support/make-world";

const columns = [
  { name: "Lon", channel: "longitude", unit: "deg" },
  { name: "Lat", channel: "latitude", unit: "deg" },
  { name: "GW 1", channel: "contact", row: 1, unit: "percent" },
];
const contact = { kind: "share-of-time", thresholdN: 50, windowS: 1 };
const mapping = { columns, shape: "wide", timeZone: "America/Chicago", contact };
const body = { name: "Drill card", mapping, columnNames: ["Lon", "Lat", "GW 1", "Unused"] };
const combine = { kind: "combine", name: "Header", headerWidthM: 6.096 };

type Recipe = Record<string, unknown> & { id: string };
let world: World;

const save = (changes: Record<string, unknown> = {}, expected = 201) =>
  world.read("agronomist", {
    method: "POST",
    path: "/api/v1/recipes",
    body: { ...body, ...changes },
    expect: expected,
  }) as Promise<Recipe>;
const list = async (query = "") =>
  (await world.read("operator", { path: `/api/v1/recipes${query}` })).items as Recipe[];
const importFile = (file: unknown, actor: "agronomist" | "other-owner" = "agronomist") =>
  world.as(actor, { method: "POST", path: "/api/v1/recipes/import", body: file });

beforeAll(async () => {
  world = await makeWorld();
  world.container.setNow(new Date("2026-12-01T12:00:00Z"));
});
afterAll(async () => world.close());

describe("versions of a recipe", () => {
  it("saving under the same name makes the next one; older ones stay readable", async () => {
    const first = await save({ note: "as found on the card" });
    expect(first).toMatchObject({ version: 1, format: "csv", shape: "wide", machine: null, logCount: 0 });
    const second = await save({ mapping: { ...mapping, timeZone: "UTC" }, machine: combine });
    expect(second).toMatchObject({ id: first.id, version: 2, machine: combine, mapping: { timeZone: "UTC", contact } });
    const old = await world.read("researcher", { path: `/api/v1/recipes/${first.id}?version=1` });
    expect(old).toMatchObject({ version: 1, note: "as found on the card", mapping: { timeZone: "America/Chicago" } });
    expect(old.versions).toMatchObject([
      { version: 2, createdBy: { name: expect.any(String) as string } },
      { version: 1 },
    ]);
    expect((await list()).filter(({ name }) => name === "Drill card")).toHaveLength(1);
    const absent = await world.as("owner", { path: `/api/v1/recipes/${first.id}?version=3` });
    expect(absent.status).toBe(404);
    const beyond = await world.as("owner", { path: `/api/v1/recipes/${first.id}?version=2147483648` });
    expect(beyond.status).toBe(422);
  });

  it("two savings at once make two versions, never one twice", async () => {
    const made = await Promise.all(Array.from({ length: 6 }, () => save({ name: "At once" })));
    expect(new Set(made.map(({ id }) => id)).size).toBe(1);
    const detail = await world.read("owner", { path: `/api/v1/recipes/${made[0]!.id}` });
    expect((detail.versions as { version: number }[]).map(({ version }) => version)).toEqual([6, 5, 4, 3, 2, 1]);
  });

  it("an earlier version can be used again as the newest", async () => {
    const { id } = await save({ name: "Again" });
    await save({ name: "Again", mapping: { ...mapping, timeZone: "UTC" } });
    const path = `/api/v1/recipes/${id}`;
    const again = await world.read("operator", { method: "PATCH", path, body: { useVersion: 1 } });
    expect(again).toMatchObject({ version: 3, note: "Version 1 again", mapping: { timeZone: "America/Chicago" } });
  });
});

describe("names and deletion", () => {
  it("renames, refuses a name that is taken, and an empty change", async () => {
    const { id } = await save({ name: "Before" });
    await save({ name: "Taken" });
    const path = `/api/v1/recipes/${id}`;
    const renamed = await world.read("owner", { method: "PATCH", path, body: { name: "After" } });
    expect(renamed).toMatchObject({ id, name: "After", version: 1 });
    const taken = await world.as("owner", { method: "PATCH", path, body: { name: "Taken" } });
    expect(taken.status).toBe(409);
    expect(await taken.json()).toMatchObject({ code: "recipe_name_taken", errors: [{ path: "name" }] });
    expect((await world.as("owner", { method: "PATCH", path, body: {} })).status).toBe(422);
  });

  it("a deletion is undone, unless another took the name", async () => {
    const { id } = await save({ name: "Mistaken" });
    const path = `/api/v1/recipes/${id}`;
    expect((await world.as("owner", { method: "DELETE", path })).status).toBe(204);
    expect((await world.as("owner", { method: "DELETE", path })).status).toBe(404);
    expect((await list()).map((item) => item.id)).not.toContain(id);
    expect(await list("?deleted=1")).toMatchObject([{ id, deletedAt: "2026-12-01T12:00:00.000Z" }]);
    expect((await world.as("owner", { method: "PATCH", path, body: { name: "x" } })).status).toBe(409);
    const back = await world.read("owner", { method: "POST", path: `${path}/restore` });
    expect(back).toMatchObject({ id, name: "Mistaken", deletedAt: null });
    await world.as("owner", { method: "DELETE", path });
    expect((await save({ name: "Mistaken" })).id).not.toBe(id);
    const taken = await world.as("owner", { method: "POST", path: `${path}/restore` });
    expect(await taken.json()).toMatchObject({ status: 409, code: "recipe_name_taken" });
  });
});

describe("a recipe travels", () => {
  it("out as a file and into another organisation, machine and definitions with it", async () => {
    const { id } = await save({ name: "Travels: far", machine: combine, note: "shared" });
    const response = await world.as("researcher", { path: `/api/v1/recipes/${id}/export` });
    expect(response.headers.get("content-disposition")).toBe('attachment; filename="travels-far-v1.recipe.json"');
    const file = (await response.json()) as Record<string, unknown>;
    expect(file).toMatchObject({
      kind: "coulterbook-recipe",
      schemaVersion: 1,
      name: "Travels: far",
      version: 1,
      format: "csv",
      columnNames: body.columnNames,
      mapping,
      machine: combine,
      note: "shared",
    });
    expect((await world.as("other-owner", { path: `/api/v1/recipes/${id}/export` })).status).toBe(404);
    const taken = await importFile(file, "other-owner");
    expect(taken.status).toBe(201);
    const copy = (await taken.json()) as Recipe;
    expect(copy).toMatchObject({ name: "Travels: far", version: 1, mapping, machine: combine });
    expect(copy.id).not.toBe(id);
    expect((await world.as("owner", { path: `/api/v1/recipes/${copy.id}` })).status).toBe(404);
  });

  it.each([
    ["another kind of file", { kind: "a-list" }, "kind", /coulterbook-recipe/],
    ["a later schema", { schemaVersion: 2 }, "schemaVersion", /reads recipe files of schemaVersion 1/],
    [
      "a unit nobody knows",
      { mapping: { ...mapping, columns: [{ ...columns[0], unit: "furlong" }] } },
      "mapping.columns.0.unit",
      /.+/,
    ],
    ["a column that the header lacks", { columnNames: ["Lon", "Lat"] }, "mapping.columns.2.name", /GW 1/],
    ["a machine that cannot be", { machine: { ...combine, headerWidthM: -1 } }, "machine.headerWidthM", /.+/],
    ["no position", { mapping: { ...mapping, columns: columns.slice(2) } }, undefined, /position|longitude/i],
  ])("%s is refused with the place of the fault", async (_name, change, path, message) => {
    const { id } = await save({ name: "Source of faults" });
    const file = await world.read("owner", { path: `/api/v1/recipes/${id}/export` });
    const response = await importFile({ ...file, ...change });
    expect(response.status).toBe(422);
    const { errors } = (await response.json()) as { errors: { path?: string; message: string }[] };
    expect(errors[0]?.path).toBe(path);
    expect(errors[0]?.message).toMatch(message);
  });

  it("keeps a header of thousands of long names", async () => {
    const columnNames = [
      ...columns.map(({ name }) => name),
      ...Array.from({ length: 5000 }, (_, i) => `${i * 7919} ${crypto.randomUUID()}`),
    ];
    expect(await save({ name: "Very wide", columnNames })).toMatchObject({ version: 1 });
  });
});
