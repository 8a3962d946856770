import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { can, ROLES } from "@/lib/access/permissions";
import { OPERATIONS } from "@/lib/openapi";
import type { Operation } from "@/lib/openapi/operation";
import type { ApiCall } from "@/tests/support/call-api";
import { makeWorld, SQUARE, type World } from "@/tests/support/make-world";

const LARKSPUR = "org_larkspurflats";
let world: World;
let serial = 0;

async function make(path: string, body: unknown): Promise<string> {
  return String((await world.read("owner", { method: "POST", path, body, expect: 201 })).id);
}

async function grant(fieldId: string): Promise<void> {
  await adminDb().$client.query("insert into field_grants (organisation_id, user_id, field_id) values ($1, $2, $3)", [
    LARKSPUR,
    "usr_larkspurviewer",
    fieldId,
  ]);
}

const combine = { kind: "combine", name: "Header", headerWidthM: 6.096 };
const recipe = {
  mapping: {
    columns: [
      { name: "a", channel: "longitude", unit: "deg" },
      { name: "b", channel: "latitude", unit: "deg" },
    ],
    shape: "single",
  },
};
const recipeFile = {
  ...recipe,
  kind: "coulterbook-recipe",
  schemaVersion: 1,
  name: "Travelled",
  version: 4,
  format: "csv",
  columnNames: ["a", "b"],
  machine: null,
  note: null,
  exportedAt: "2026-11-30T12:00:00Z",
};
const shareBody = { audience: "landowner", layers: ["boundary"], expiresAt: "2027-06-01T00:00:00Z" };

const noteBody = { text: "A wet spot", geometry: { type: "Point", coordinates: [-98.005, 38.505] } };

/** A thing of the owner's organisation that an address can name; a viewer was given its field. */
const targets: Record<string, () => Promise<string>> = {
  fieldId: async () => {
    const id = await make("/api/v1/fields", { name: `Field ${serial++}`, boundary: SQUARE });
    await grant(id);
    return id;
  },
  machineId: () => make("/api/v1/machines", combine),
  memberId: () =>
    make("/api/v1/members", {
      email: `new${serial++}@larkspur.example`,
      name: "New",
      role: "viewer",
      password: "sorghum-stubble",
    }),
  shareId: async () => make(`/api/v1/fields/${await targets.fieldId!()}/shares`, shareBody),
  logId: async () => {
    const fieldId = await targets.fieldId!();
    const id = `log_test${serial++}`;
    await adminDb().$client.query(
      `insert into logs (organisation_id, id, field_id, name, counts, file_name, file_bytes, sha256, status)
       values ($1, $2, $3, 'A log', '{"records":0,"rows":0,"readings":0,"flagged":0,"rejected":0,"passes":0}',
               'a.csv', 1, $2, 'failed')`,
      [LARKSPUR, id, fieldId],
    );
    world.container.objects.set(`organisations/${LARKSPUR}/uploads/${id}`, new Uint8Array([1]));
    return id;
  },
  recipeId: async () => {
    const name = `Recipe ${serial++}`;
    return make("/api/v1/recipes", { ...recipe, name });
  },
};

const BODIES: Record<string, unknown> = {
  "POST /api/v1/fields": { name: "Made" },
  "PATCH /api/v1/fields/{fieldId}": { name: "Changed" },
  "PUT /api/v1/fields/{fieldId}/boundary": SQUARE,
  "POST /api/v1/fields/{fieldId}/shares": shareBody,
  "POST /api/v1/fields/{fieldId}/notes": noteBody,
  "PATCH /api/v1/fields/{fieldId}/notes/{noteId}": { text: "Changed" },
  "POST /api/v1/machines": combine,
  "PATCH /api/v1/machines/{machineId}": { name: "Changed" },
  "PATCH /api/v1/members/{memberId}": { role: "researcher" },
  "POST /api/v1/tokens": { name: "script", role: "viewer" },
  "POST /api/v1/recipes": { ...recipe, name: "Kept" },
  "POST /api/v1/recipes/import": recipeFile,
  "PATCH /api/v1/recipes/{recipeId}": { useVersion: 1 },
  "PATCH /api/v1/me": { unitSystem: "metric" },
  "PATCH /api/v1/logs/{logId}": { name: "Changed" },
  "POST /api/v1/logs/{logId}/cleaning": { rules: {} },
  "POST /api/v1/logs/{logId}/cleaning/preview": { rules: {} },
  "POST /api/v1/logs/{logId}/cleaning/undo": {},
  "POST /api/v1/logs/{logId}/delays": {},
  "PUT /api/v1/logs/{logId}/delays": { delaysS: { margin: 1.5 } },
  "PUT /api/v1/legends": { channel: "margin", unit: "N", edges: [200, 400] },
  "PUT /api/v1/logs/{logId}/mapping": { columns: [{ name: "a", channel: "longitude", unit: "deg" }], shape: "single" },
};
const FIXED: Record<string, string> = { pass: "1", channel: "downforce", z: "15", x: "7000", y: "12000" };
const QUERY: Record<string, string> = { with: "log_other", channel: "downforce", breaks: "1", lon: "0", lat: "0" };

function bodyOf(operation: Operation): unknown {
  const key = `${operation.method} ${operation.path}`;
  if (key === "POST /api/v1/members") {
    return { email: `added${serial++}@larkspur.example`, name: "Added", role: "viewer", password: "sorghum-stubble" };
  }
  return BODIES[key];
}

/** A request that would succeed, on things made for it alone. */
async function callOf(operation: Operation, actor: string): Promise<ApiCall> {
  let path: string = operation.path;
  for (const [, name] of operation.path.matchAll(/\{(\w+)\}/g)) {
    const own = name === "tokenId" ? await tokenOf(actor) : await (targets[name!]?.() ?? noteOf(name!, path));
    path = path.replace(`{${name}}`, own ?? FIXED[name!] ?? "unknown");
  }
  const asked = Object.keys(operation.query?.shape ?? {}).filter((name) => name in QUERY);
  if (asked.length > 0) path += `?${asked.map((name) => `${name}=${QUERY[name]}`).join("&")}`;
  const body = bodyOf(operation);
  return { method: operation.method, path, ...(body === undefined ? {} : { body }) };
}

/** A note is named with its field, which the address names already. */
async function noteOf(name: string, path: string): Promise<string | undefined> {
  return name === "noteId" ? make(path.replace(/\/\{noteId\}$/, ""), noteBody) : undefined;
}

/** A token belongs to one person: theirs, not the owner's. */
async function tokenOf(actor: string): Promise<string> {
  const maker = (ROLES as readonly string[]).includes(actor) ? (actor as (typeof ROLES)[number]) : "owner";
  const call = { method: "POST", path: "/api/v1/tokens", body: { name: "t", role: "viewer" }, expect: 201 };
  return String((await world.read(maker, call)).id);
}

beforeAll(async () => {
  world = await makeWorld();
  world.container.setNow(new Date("2026-12-01T12:00:00Z"));
});
afterAll(async () => world.close());

const closed = OPERATIONS.filter((operation) => operation.permission !== "public");
const named = (operations: readonly Operation[]) =>
  operations.map((operation) => [`${operation.method} ${operation.path}`, operation] as const);

/** Said by the rules of an operation, past the question of who asks: not ready, not built, no such reading. */
const PAST_THE_DOOR = [200, 201, 202, 204, 400, 404, 409, 415, 422, 501];

describe("every operation asks who it is", () => {
  it.each(named(closed))("%s", async (_name, operation) => {
    const { status } = await world.as("stranger", await callOf(operation, "stranger"));
    expect(status).toBe(401);
  });
});

describe("every operation keeps to the table of roles", () => {
  const cases = closed.flatMap((operation) =>
    ROLES.map((role) => [`${operation.method} ${operation.path} as ${role}`, operation, role] as const),
  );
  it.each(cases)("%s", async (_name, operation, role) => {
    const permission = operation.permission;
    if (permission === "public") throw new Error("public operations have no role");
    const response = await world.as(role, await callOf(operation, role));
    // The one operation that ends the session it came with.
    if (operation.path === "/api/v1/me/sessions") world.keepCookie(role, response);
    const isAllowed = can(role, permission);
    const text = await response.text();
    if (!isAllowed) return expect({ status: response.status, text }).toMatchObject({ status: 403 });
    expect(PAST_THE_DOOR, `${response.status} ${text}`).toContain(response.status);
    const isPlain = !operation.path.includes("{logId}") && !operation.path.endsWith("/logs");
    if (isPlain) expect(response.status, text).toBe(operation.replies[0]?.status);
  });
});

describe("nothing of one organisation exists for another's owner", () => {
  const addressed = closed.filter((operation) => operation.path.includes("{"));
  it.each(named(addressed))("%s", async (_name, operation) => {
    const response = await world.as("other-owner", await callOf(operation, "other-owner"));
    expect({ status: response.status, text: await response.text() }).toMatchObject({ status: 404 });
  });

  it("and lists show them only their own", async () => {
    await make("/api/v1/fields", { name: "Larkspur only" });
    for (const list of ["fields", "machines", "tokens", "recipes"]) {
      expect(await world.read("other-owner", { path: `/api/v1/${list}` })).toMatchObject({ items: [] });
    }
    const members = await world.read("other-owner", { path: "/api/v1/members" });
    expect((members.items as { email: string }[]).map((item) => item.email)).toEqual(["owner@otherfarm.example"]);
  });
});

describe("what a role sees depends on the row too", () => {
  it("shows a viewer only the fields given to them", async () => {
    const hidden = await make("/api/v1/fields", { name: "Not given" });
    await world.read("viewer", { path: `/api/v1/fields/${hidden}`, expect: 404 });
    const page = await world.read("viewer", { path: "/api/v1/fields?limit=500" });
    expect((page.items as { id: string }[]).map((item) => item.id)).not.toContain(hidden);
    await world.read("viewer", { path: `/api/v1/fields/${hidden}/logs`, expect: 404 });
  });

  it("hides harvest logs, their number and their time from an operator without the field", async () => {
    const logId = await targets.logId!();
    await adminDb().$client.query("update logs set kind = 'harvest' where id = $1", [logId]);
    const { fieldId } = await world.read("researcher", { path: `/api/v1/logs/${logId}` });
    await world.read("operator", { path: `/api/v1/logs/${logId}`, expect: 404 });
    const field = await world.read("operator", { path: `/api/v1/fields/${String(fieldId)}` });
    expect(field).toMatchObject({ logCount: 0, lastLogAt: null });
    await adminDb().$client.query(
      "insert into field_grants (organisation_id, user_id, field_id) values ($1, 'usr_larkspuroperator', $2)",
      [LARKSPUR, fieldId],
    );
    expect(await world.read("operator", { path: `/api/v1/logs/${logId}` })).toMatchObject({ kind: "harvest" });
  });
});
