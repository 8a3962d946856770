import { afterAll, beforeAll, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { Field } from "@/lib/schemas/fields";
import { makeWorld, type World } from "@/tests/support/make-world";

const LARKSPUR = "org_larkspurflats";
let world: World;
let serial = 0;
beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());

async function addField(): Promise<string> {
  const call = { method: "POST", path: "/api/v1/fields", body: { name: `Field ${serial++}` }, expect: 201 };
  return String((await world.read("owner", call)).id);
}

interface Given {
  kind?: string;
  status?: string;
  day: number;
  severities?: string[];
  notes?: string[];
  revision?: number;
}

/** A log as the worker leaves it, taken in on that day of November. */
async function addLog(fieldId: string, given: Given): Promise<string> {
  const id = `log_newest${serial++}`;
  const { kind = "seeding", status = "ready", day, severities, notes = [], revision = 0 } = given;
  const said = notes.map((code) => ({ code, count: 1, message: code }));
  const at = `2026-11-${String(day).padStart(2, "0")}T12:00:00Z`;
  await adminDb().$client.query(
    `insert into logs (organisation_id, id, field_id, name, kind, counts, file_name, file_bytes, sha256, status, version,
                       notes, created_at, adjustment_revision)
     values ($1, $2, $3, $2, $4, '{"records":1,"rows":1,"readings":1,"flagged":0,"rejected":0,"passes":1}', 'a.csv', 1,
             $2, $5, 1, $6, $7, $8)`,
    [LARKSPUR, id, fieldId, kind, status, JSON.stringify(said), at, revision],
  );
  if (severities) {
    const body = { findings: severities.map((severity) => ({ severity })) };
    const name = revision === 0 ? "verdict" : `verdict#${revision}`;
    await adminDb().$client.query(
      "insert into log_results (organisation_id, log_id, version, kind, body) values ($1, $2, 1, $3, $4)",
      [LARKSPUR, id, name, JSON.stringify(body)],
    );
  }
  return id;
}

async function newestOf(fieldId: string, actor: "owner" | "operator" = "owner") {
  const field = Field.parse(await world.read(actor, { path: `/api/v1/fields/${fieldId}` }));
  const listed = await world.read(actor, { path: "/api/v1/fields?limit=500" });
  const same = (listed.items as Field[]).find(({ id }) => id === fieldId);
  expect(same).toEqual(field);
  return field;
}

it("is the newest seeding log that was read, with its gravest finding", async () => {
  const fieldId = await addField();
  await addLog(fieldId, { day: 1, severities: ["act"] });
  const speaking = await addLog(fieldId, { day: 2, severities: ["ok", "look"] });
  await addLog(fieldId, { day: 3, kind: "harvest" });
  await addLog(fieldId, { day: 4, status: "needs-mapping" });
  await addLog(fieldId, { day: 5, status: "failed" });
  const field = await newestOf(fieldId);
  expect(field.newestLog).toMatchObject({ id: speaking, severity: "look", status: "ready", isElsewhere: false });
  expect(field.waitingLogs).toBe(2);
});

it("speaks of the log as it is adjusted, and says nothing where that was not worked out yet", async () => {
  const [adjusted, unread] = [await addField(), await addField()];
  const id = await addLog(adjusted, { day: 1, severities: ["act"], revision: 3 });
  expect((await newestOf(adjusted)).newestLog).toMatchObject({ id, severity: "act" });
  await addLog(unread, { day: 1, revision: 2 });
  expect((await newestOf(unread)).newestLog).toMatchObject({ severity: null });
});

it("is any read log, then any at all, where no seeding log was read; a harvest has no verdict", async () => {
  const fieldId = await addField();
  await addLog(fieldId, { day: 1, status: "queued" });
  expect((await newestOf(fieldId)).newestLog).toMatchObject({ status: "queued", severity: null });
  const harvest = await addLog(fieldId, { day: 2, kind: "harvest", severities: ["act"], notes: ["outside-field"] });
  await addLog(fieldId, { day: 3, status: "queued" });
  expect((await newestOf(fieldId)).newestLog).toMatchObject({ id: harvest, severity: null, isElsewhere: true });
});

it("never names a log that the person may not see", async () => {
  const fieldId = await addField();
  await addLog(fieldId, { day: 1, kind: "harvest" });
  expect(await newestOf(fieldId, "operator")).toMatchObject({ newestLog: null, waitingLogs: 0, logCount: 0 });
});
