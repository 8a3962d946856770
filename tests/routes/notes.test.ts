import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { Note, NoteList } from "@/lib/schemas/notes";
import { makeWorld, SQUARE, type World } from "@/tests/support/make-world";

const PLACE = { type: "Point", coordinates: [-98.005, 38.505] };
const LINE = {
  type: "LineString",
  coordinates: [
    [0, 0],
    [1, 0],
  ],
};
let world: World;
let notes: string;

beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());
beforeEach(async () => {
  const body = { name: "North forty", boundary: SQUARE };
  const field = await world.read("agronomist", { method: "POST", path: "/api/v1/fields", body, expect: 201 });
  notes = `/api/v1/fields/${String(field.id)}/notes`;
});

const add = async (body: unknown) =>
  Note.parse(await world.read("operator", { method: "POST", path: notes, body, expect: 201 }));
const list = async () => NoteList.parse(await world.read("researcher", { path: `${notes}?limit=500` })).items;

describe("notes of a field", () => {
  it("are added by an operator, read by others, oldest first, with who wrote them and how long a line is", async () => {
    const place = await add({ text: " Wet spot,\nprobe it ", geometry: PLACE });
    expect(place).toMatchObject({ text: "Wet spot,\nprobe it", geometry: PLACE, lengthM: null });
    const line = await add({ text: "Old fence", geometry: LINE });
    // One degree of the equator: 2 pi a / 360 with a = 6378137 m (WGS 84), hand-worked.
    expect(line.lengthM).toBeCloseTo(111319.4908, 3);
    const items = await list();
    expect(items.map(({ text }) => text)).toEqual(["Wet spot,\nprobe it", "Old fence"]);
    expect(items[0]?.createdBy?.id).toBe("usr_larkspuroperator");
  });

  it("change in what is named and keep the rest; a deleted one is gone", async () => {
    const { id } = await add({ text: "Stone", geometry: PLACE });
    const path = `${notes}/${id}`;
    expect(await world.read("agronomist", { method: "PATCH", path, body: { geometry: LINE } })).toMatchObject({
      text: "Stone",
      geometry: LINE,
    });
    await world.read("agronomist", { method: "DELETE", path, expect: 204 });
    expect(await list()).toEqual([]);
    await world.read("agronomist", { method: "DELETE", path, expect: 404 });
  });

  it.each([
    ["no text", { text: "  ", geometry: PLACE }],
    ["a place off the earth", { text: "x", geometry: { type: "Point", coordinates: [200, 0] } }],
    [
      "a line of one point twice",
      {
        text: "x",
        geometry: {
          type: "LineString",
          coordinates: [
            [1, 1],
            [1, 1],
          ],
        },
      },
    ],
    [
      "a line of 2001 positions",
      { text: "x", geometry: { type: "LineString", coordinates: Array(2001).fill([1, 1]) } },
    ],
    ["an area", { text: "x", geometry: SQUARE }],
    ["hidden characters", { text: "a\u202eb", geometry: PLACE }],
  ])("refuse %s", async (_name, body) => {
    await world.read("operator", { method: "POST", path: notes, body, expect: 422 });
    expect(await list()).toEqual([]);
  });

  it("belong to their field alone, and go with it", async () => {
    const { id, fieldId } = await add({ text: "Stone", geometry: PLACE });
    const other = await world.read("agronomist", {
      method: "POST",
      path: "/api/v1/fields",
      body: { name: "South forty" },
      expect: 201,
    });
    const elsewhere = `/api/v1/fields/${String(other.id)}/notes/${id}`;
    await world.read("agronomist", { method: "PATCH", path: elsewhere, body: { text: "Moved" }, expect: 404 });
    await world.read("agronomist", { method: "DELETE", path: elsewhere, expect: 404 });
    await world.read("viewer", { path: notes, expect: 404 });
    await world.read("agronomist", { method: "DELETE", path: `/api/v1/fields/${fieldId}`, expect: 204 });
    await world.read("researcher", { path: notes, expect: 404 });
  });

  it("are told in the audit log", async () => {
    const { id } = await add({ text: "Stone", geometry: PLACE });
    const audit = await world.read("owner", { path: "/api/v1/audit" });
    expect(audit.items).toContainEqual(expect.objectContaining({ action: "note.create", subject: id }));
  });
});
