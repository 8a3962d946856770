import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import type { Role } from "@/lib/access/permissions";
import { removeMember } from "@/lib/server/members/change-members";
import { callApi } from "@/tests/support/call-api";
import { makeWorld, sessionCookieOf, type World } from "@/tests/support/make-world";

let world: World;
let serial = 0;
beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());

async function addMember(role: Role): Promise<{ id: string; email: string; cookie: string }> {
  const email = `person${serial++}@larkspur.example`;
  const body = { email, name: "Person", role, password: "sorghum-stubble" };
  const member = await world.read("owner", { method: "POST", path: "/api/v1/members", body, expect: 201 });
  return { id: String(member.id), email, cookie: await sessionCookieOf(email, world.container) };
}

async function makeToken(cookie: string, body: Record<string, unknown>): Promise<{ id: string; token: string }> {
  const call = { method: "POST", path: "/api/v1/tokens", body: { name: "script", ...body }, cookie, expect: 201 };
  const { id, token } = await world.read("owner", call);
  return { id: String(id), token: String(token) };
}

const statusOf = async (token: string, path: string, method = "GET") => (await callApi({ method, path, token })).status;

describe("members", () => {
  it("takes effect at the person's next request, with no new sign-in", async () => {
    const { id, cookie } = await addMember("viewer");
    await world.read("owner", { path: "/api/v1/audit", cookie, expect: 403 });
    await world.read("owner", { method: "PATCH", path: `/api/v1/members/${id}`, body: { role: "owner" } });
    await world.read("owner", { path: "/api/v1/audit", cookie, expect: 200 });
    await world.read("owner", { method: "DELETE", path: `/api/v1/members/${id}`, expect: 204 });
    await world.read("owner", { path: "/api/v1/me", cookie, expect: 403 });
  });

  it("keeps the last owner, also when two leave at once", async () => {
    const members = (await world.read("owner", { path: "/api/v1/members" })).items as { id: string; role: Role }[];
    const only = members.find((member) => member.role === "owner")!.id;
    const path = `/api/v1/members/${only}`;
    const demoted = await world.read("owner", { method: "PATCH", path, body: { role: "viewer" }, expect: 409 });
    expect(demoted.code).toBe("last_owner");
    await world.read("owner", { method: "DELETE", path, expect: 409 });
    const second = await addMember("owner");
    // The service itself: through the API the first removal may already lock out whoever asks for the second.
    const scope = { organisationId: "org_larkspurflats", userId: "usr_larkspurowner", role: "owner" as const };
    const left = await Promise.allSettled([only, second.id].map((id) => removeMember(world.container, scope, id)));
    await adminDb().$client.query(
      `insert into memberships (organisation_id, id, user_id, role)
       values ('org_larkspurflats', 'mem_larkspurowner', 'usr_larkspurowner', 'owner') on conflict do nothing`,
    );
    expect(left.map((outcome) => outcome.status).sort()).toEqual(["fulfilled", "rejected"]);
    expect(left.find((outcome) => outcome.status === "rejected")).toMatchObject({
      reason: { detailCode: "last_owner" },
    });
  });

  it("gives a viewer fields, and only fields that exist here", async () => {
    const { id, cookie } = await addMember("viewer");
    const field = await world.read("owner", { method: "POST", path: "/api/v1/fields", body: { name: "Given" } });
    const path = `/api/v1/members/${id}`;
    const given = await world.read("owner", { method: "PATCH", path, body: { fieldIds: [field.id] } });
    expect(given.fieldIds).toEqual([field.id]);
    const seen = await world.read("owner", { path: "/api/v1/fields", cookie });
    expect((seen.items as { id: string }[]).map((item) => item.id)).toEqual([field.id]);
    await world.read("owner", { method: "PATCH", path, body: { fieldIds: ["fld_elsewhere"] }, expect: 422 });
    await world.read("owner", { method: "DELETE", path: `/api/v1/fields/${String(field.id)}`, expect: 204 });
    expect(await world.read("owner", { path })).toMatchObject({ fieldIds: [] });
  });

  it("refuses the same person twice, and does not touch the password of one known elsewhere", async () => {
    const { email } = await addMember("viewer");
    const again = { email: email.toUpperCase(), name: "Again", role: "viewer", password: "another-password" };
    await world.read("owner", { method: "POST", path: "/api/v1/members", body: again, expect: 409 });
    const before = await adminDb().$client.query("select password_hash from users where id = 'usr_otherfarmowner'");
    const guest = { email: "owner@otherfarm.example", name: "Guest", role: "viewer", password: "overwritten-one" };
    const joined = await world.read("owner", { method: "POST", path: "/api/v1/members", body: guest, expect: 201 });
    expect(joined.name).toBe("Omar Fenn");
    const after = await adminDb().$client.query("select password_hash from users where id = 'usr_otherfarmowner'");
    expect(after.rows).toEqual(before.rows);
  });

  it("lets a person of two organisations choose by name", async () => {
    const mine = async (headers: Record<string, string>, cookie = world.cookies["other-owner"]) =>
      (await world.read("other-owner", { path: "/api/v1/me", headers, cookie })).organisation as { slug: string };
    expect((await mine({})).slug).toBe("otherfarm");
    expect((await mine({ "x-organisation": "larkspur-flats" })).slug).toBe("larkspur-flats");
    const remembered = `${world.cookies["other-owner"]}; coulterbook-organisation=larkspur-flats`;
    expect((await mine({}, remembered)).slug).toBe("larkspur-flats");
    const stale = `${world.cookies["other-owner"]}; coulterbook-organisation=no-longer`;
    expect((await mine({}, stale)).slug).toBe("otherfarm");
  });
});

describe("tokens", () => {
  it("keeps only the hash of at least 160 random bits", async () => {
    const { token } = await makeToken(world.cookies.owner, {});
    expect(token).toMatch(/^cbk_/);
    expect(Buffer.from(token.slice(4), "base64url").length * 8).toBeGreaterThanOrEqual(160);
    const { rows } = await adminDb().$client.query("select * from tokens");
    expect(JSON.stringify(rows)).not.toContain(token.slice(4));
    const listed = await world.read("owner", { path: "/api/v1/tokens" });
    expect(JSON.stringify(listed)).not.toContain("cbk_");
  });

  it("does no more than its role, and records its last use", async () => {
    const { id, token } = await makeToken(world.cookies.owner, { role: "viewer" });
    expect(await statusOf(token, "/api/v1/fields")).toBe(200);
    expect(await statusOf(token, "/api/v1/audit")).toBe(403);
    const listed = (await world.read("owner", { path: "/api/v1/tokens" })).items as {
      id: string;
      lastUsedAt: unknown;
    }[];
    expect(listed.find((item) => item.id === id)?.lastUsedAt).not.toBeNull();
  });

  it("never does more than its owner: not when made, and not after the owner's role shrank", async () => {
    const body = { name: "t", role: "operator" };
    // An operator uploads logs and a researcher does not, though a researcher reads more.
    await world.read("researcher", { method: "POST", path: "/api/v1/tokens", body, expect: 422 });
    const person = await addMember("owner");
    const { token } = await makeToken(person.cookie, { role: "owner" });
    expect(await statusOf(token, "/api/v1/audit")).toBe(200);
    await world.read("owner", { method: "PATCH", path: `/api/v1/members/${person.id}`, body: { role: "researcher" } });
    expect(await statusOf(token, "/api/v1/audit")).toBe(403);
    expect(await statusOf(token, "/api/v1/members")).toBe(200);
  });

  it("cannot make a token that does more than itself", async () => {
    const { token } = await makeToken(world.cookies.owner, { role: "researcher" });
    const call = { method: "POST", path: "/api/v1/tokens", token, body: { name: "t", role: "owner" } };
    expect((await callApi(call)).status).toBe(422);
  });

  it("cannot make a token that outlives itself", async () => {
    const ends = new Date(Date.now() + 3_600_000);
    const { token } = await makeToken(world.cookies.owner, { expiresAt: ends.toISOString() });
    const make = (body: Record<string, unknown>) =>
      callApi({ method: "POST", path: "/api/v1/tokens", token, body: { name: "t", ...body } });
    const later = await make({ expiresAt: new Date(ends.getTime() + 1000).toISOString() });
    expect(later.status).toBe(422);
    expect(await later.json()).toMatchObject({ errors: [{ path: "expiresAt" }] });
    expect(await (await make({})).json()).toMatchObject({ expiresAt: ends.toISOString() });
    const sooner = new Date(ends.getTime() - 1000).toISOString();
    expect(await (await make({ expiresAt: sooner })).json()).toMatchObject({ expiresAt: sooner });
  });

  it("stops when withdrawn, when it expires, and when its owner leaves", async () => {
    const person = await addMember("agronomist");
    const withdrawn = await makeToken(person.cookie, {});
    const call = { method: "DELETE", path: `/api/v1/tokens/${withdrawn.id}`, cookie: person.cookie, expect: 204 };
    await world.read("owner", call);
    expect(await statusOf(withdrawn.token, "/api/v1/fields")).toBe(401);

    const ends = new Date(Date.now() + 60_000);
    const expiring = await makeToken(person.cookie, { expiresAt: ends.toISOString() });
    expect(await statusOf(expiring.token, "/api/v1/fields")).toBe(200);
    world.container.setNow(new Date(ends.getTime() + 1));
    expect(await statusOf(expiring.token, "/api/v1/fields")).toBe(401);
    world.container.setNow(null);

    const left = await makeToken(person.cookie, {});
    await world.read("owner", { method: "DELETE", path: `/api/v1/members/${person.id}`, expect: 204 });
    expect(await statusOf(left.token, "/api/v1/fields")).toBe(401);
  });

  it("must end in the future, and belongs to one organisation", async () => {
    const body = { name: "late", expiresAt: "2020-01-01T00:00:00Z" };
    await world.read("owner", { method: "POST", path: "/api/v1/tokens", body, expect: 422 });
    const { token } = await makeToken(world.cookies["other-owner"], {});
    const call = { path: "/api/v1/fields", token, headers: { "x-organisation": "larkspur-flats" } };
    expect((await callApi(call)).status).toBe(404);
  });

  it("slows guesses down, and still lets right tokens in", async () => {
    const { token } = await makeToken(world.cookies.owner, {});
    const headers = { "x-forwarded-for": "203.0.113.7" };
    const statuses = [];
    for (let i = 0; i < 32; i++) {
      statuses.push((await callApi({ path: "/api/v1/fields", token: `cbk_guess${i}`, headers })).status);
    }
    expect(statuses.slice(0, 30)).toEqual(Array.from({ length: 30 }, () => 401));
    expect(statuses.slice(30)).toEqual([429, 429]);
    expect((await callApi({ path: "/api/v1/fields", token, headers })).status).toBe(200);
  });
});

describe("me", () => {
  it("tells who asks, and keeps the chosen units", async () => {
    const me = await world.read("operator", { path: "/api/v1/me" });
    expect(me).toMatchObject({ email: "operator@larkspur.example", organisation: { role: "operator" } });
    await world.read("operator", { method: "PATCH", path: "/api/v1/me", body: { unitSystem: "metric" } });
    expect(await world.read("operator", { path: "/api/v1/me" })).toMatchObject({ unitSystem: "metric" });
  });

  it("keeps units chosen one by one, and lets go of those set to null", async () => {
    const change = (body: unknown) => world.read("operator", { method: "PATCH", path: "/api/v1/me", body });
    const none = { force: null, depth: null, area: null, speed: null };
    expect(await world.read("operator", { path: "/api/v1/me" })).toMatchObject({ unitPreferences: none });
    expect(await change({ unitPreferences: { force: "kgf", depth: "cm" } })).toMatchObject({
      unitPreferences: { ...none, force: "kgf", depth: "cm" },
    });
    // The older way of choosing a system changes nothing of it.
    const after = await change({ unitSystem: "imperial", unitPreferences: { force: null } });
    expect(after).toMatchObject({ unitSystem: "imperial", unitPreferences: { ...none, depth: "cm" } });
    const unknown = { unitPreferences: { force: "stone" } };
    await world.read("operator", { method: "PATCH", path: "/api/v1/me", body: unknown, expect: 422 });
  });

  it("keeps the wish for high contrast", async () => {
    const me = await world.read("operator", { method: "PATCH", path: "/api/v1/me", body: { contrast: "more" } });
    expect(me).toMatchObject({ contrast: "more" });
  });

  it("changes the password with the old one only, and ends the other sessions", async () => {
    const person = await addMember("researcher");
    const patch = (body: Record<string, string>) =>
      world.as("owner", { method: "PATCH", path: "/api/v1/me", body, cookie: person.cookie });
    expect((await patch({ newPassword: "a-longer-password" })).status).toBe(422);
    expect((await patch({ newPassword: "a-longer-password", currentPassword: DEMO_PASSWORD })).status).toBe(422);
    expect((await patch({ newPassword: "short", currentPassword: "sorghum-stubble" })).status).toBe(422);
    const changed = await patch({ newPassword: "a-longer-password", currentPassword: "sorghum-stubble" });
    expect(changed.status).toBe(200);
    const [renewed] = changed.headers.getSetCookie();
    expect(renewed).toMatch(/HttpOnly; SameSite=Lax/);
    await world.read("owner", { path: "/api/v1/me", cookie: person.cookie, expect: 401 });
    await world.read("owner", { path: "/api/v1/me", cookie: renewed!.split(";")[0]!, expect: 200 });
  });
});

describe("sessions", () => {
  it("end everywhere but where that was asked, and leave an entry", async () => {
    const elsewhere = await sessionCookieOf("researcher@larkspur.example", world.container);
    const call = { method: "DELETE", path: "/api/v1/me/sessions" };
    const response = await world.as("researcher", call);
    expect(response.status).toBe(204);
    const [renewed] = response.headers.getSetCookie();
    await world.read("researcher", { path: "/api/v1/me", cookie: elsewhere, expect: 401 });
    await world.read("researcher", { path: "/api/v1/me", expect: 401 });
    world.keepCookie("researcher", response);
    await world.read("researcher", { path: "/api/v1/me", cookie: renewed!.split(";")[0]!, expect: 200 });
    const audit = await world.read("owner", { path: "/api/v1/audit?limit=1" });
    expect(audit.items).toMatchObject([{ action: "session.end", userName: expect.any(String) }]);
  });
});

describe("audit", () => {
  it("has an entry for every change, newest first, and none of its secrets", async () => {
    const before = Date.now();
    const { id } = await world.read("owner", { method: "POST", path: "/api/v1/fields", body: { name: "Watched" } });
    const path = `/api/v1/fields/${String(id)}`;
    await world.read("owner", { method: "PATCH", path, body: { name: "Watched on" } });
    await world.read("owner", { method: "DELETE", path, expect: 204 });
    const audit = await world.read("owner", { path: "/api/v1/audit?limit=3" });
    const entries = audit.items as { action: string; subject: string; at: string; userName: string }[];
    expect(entries.map((entry) => entry.action)).toEqual(["field.delete", "field.update", "field.create"]);
    expect(entries.every((entry) => entry.subject === id && entry.userName === "Ottilie Brandt")).toBe(true);
    expect(Date.parse(entries[0]!.at)).toBeGreaterThanOrEqual(before);
    const { rows } = await adminDb().$client.query("select * from audit_entries");
    expect(JSON.stringify(rows)).not.toMatch(/cbk_|argon2|password":/);
  });

  it("keeps what was there, what is there now, and the name the thing had", async () => {
    const body = { name: "Old name", farm: "Larkspur Flats" };
    const { id } = await world.read("owner", { method: "POST", path: "/api/v1/fields", body });
    const path = `/api/v1/fields/${String(id)}`;
    await world.read("owner", { method: "PATCH", path, body: { name: "New name", farm: "Larkspur Flats" } });
    const machine = { kind: "combine", name: "Header", headerWidthM: 6.096, headerRows: 8 };
    const made = await world.read("owner", { method: "POST", path: "/api/v1/machines", body: machine });
    const machinePath = `/api/v1/machines/${String(made.id)}`;
    await world.read("owner", { method: "PATCH", path: machinePath, body: { headerWidthM: 9.144, headerRows: null } });
    const audit = await world.read("owner", { path: "/api/v1/audit?limit=4" });
    const detailOf = (action: string) =>
      (audit.items as { action: string; detail: unknown }[]).find((entry) => entry.action === action)?.detail;
    expect(detailOf("field.update")).toEqual({
      name: "Old name",
      changed: ["name"],
      before: { name: "Old name" },
      after: { name: "New name" },
    });
    expect(detailOf("machine.update")).toMatchObject({
      name: "Header",
      before: { headerWidthM: 6.096, headerRows: 8 },
      after: { headerWidthM: 9.144, headerRows: null },
    });
  });

  it("pages without losing or repeating an entry", async () => {
    const whole = (await world.read("owner", { path: "/api/v1/audit?limit=500" })).items as { id: string }[];
    const paged: string[] = [];
    let cursor = "";
    do {
      const page = await world.read("owner", { path: `/api/v1/audit?limit=7${cursor}` });
      paged.push(...(page.items as { id: string }[]).map((entry) => entry.id));
      cursor = page.nextCursor ? `&cursor=${String(page.nextCursor)}` : "";
    } while (cursor);
    expect(paged).toEqual(whole.map((entry) => entry.id));
  });
});
