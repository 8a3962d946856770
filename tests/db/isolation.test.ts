import { Client } from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb, appDb, withOrganisation } from "@/db/client";
import { fields } from "@/db/schema";
import { DEMO_ORGANISATIONS, seedOrganisations } from "@/db/seed/organisations";
import { createTestDatabase, type TestDatabase } from "@/tests/support/test-db";

const [larkspur, other] = DEMO_ORGANISATIONS.map((organisation) => organisation.id) as [string, string];
let database: TestDatabase;
let guarded: string[] = [];

/** One row of every kind in both organisations, written past the policies. */
async function fillBoth(): Promise<void> {
  for (const [organisation, user] of [
    [larkspur, "usr_larkspurowner"],
    [other, "usr_otherfarmowner"],
  ]) {
    const statements = [
      `insert into fields (organisation_id, id, name) values ($1, 'fld_x', 'A field')`,
      `insert into machines (organisation_id, id, kind, name, body) values ($1, 'mac_x', 'combine', 'A machine', '{}')`,
      `insert into logs (organisation_id, id, field_id, name, counts, file_name, file_bytes, sha256)
       values ($1, 'log_x', 'fld_x', 'A log', '{}', 'a.csv', 1, 'aa')`,
      `insert into log_points (organisation_id, log_id, version, seq, pass, flags) values ($1, 'log_x', 1, 1, 1, 0)`,
      `insert into pass_readings
       (organisation_id, log_id, version, pass, channel, unit, element, first_seq, records, rows, "values")
       values ($1, 'log_x', 1, 1, 'downforce', 'N', 'f4', 1, 1, 1, '\\x00000000')`,
      `insert into log_results (organisation_id, log_id, version, kind, body) values ($1, 'log_x', 1, 'passes', '[]')`,
      `insert into log_files (organisation_id, log_id, part, file_name, file_bytes, sha256)
       values ($1, 'log_x', 0, 'a.csv', 1, 'aa')`,
      `insert into log_adjustments (organisation_id, log_id, revision, delays_s, cleaning, is_as_read)
       values ($1, 'log_x', 1, '{}', '{}', true)`,
      `insert into field_notes (organisation_id, id, field_id, body, geometry)
       values ($1, 'not_x', 'fld_x', 'a wet spot', '{"type":"Point","coordinates":[0,0]}')`,
      `insert into legends (organisation_id, channel, unit, edges) values ($1, 'margin', 'N', '{180,490}')`,
      `insert into recipes (organisation_id, id, name) values ($1, 'rec_x', 'r')`,
      `insert into recipe_versions (organisation_id, recipe_id, version, format, column_names, header_signature, mapping)
       values ($1, 'rec_x', 1, 'csv', '["a"]', 's', '{}')`,
      `insert into jobs (organisation_id, id, name, subject, payload) values ($1, 'job_x', 'read-log', 'log_x', '{}')`,
      `insert into shares (organisation_id, id, field_id, audience, layers, token_hash, expires_at)
       values ($1, 'shr_x', 'fld_x', 'public', '[]', $1, now())`,
      `insert into audit_entries (organisation_id, id, action, subject) values ($1, 'aud_x', 'a.b', 'c')`,
    ];
    const ofPerson = [
      `insert into tokens (organisation_id, id, user_id, name, role, token_hash) values ($1, 'tok_x', $2, 't', 'viewer', $1)`,
      `insert into field_grants (organisation_id, user_id, field_id) values ($1, $2, 'fld_x')`,
      `insert into idempotency_keys (organisation_id, user_id, key, route, fingerprint) values ($1, $2, 'k', 'r', 'f')`,
    ];
    for (const statement of statements) await adminDb().$client.query(statement, [organisation]);
    for (const statement of ofPerson) await adminDb().$client.query(statement, [organisation, user]);
  }
}

beforeAll(async () => {
  database = await createTestDatabase();
  await seedOrganisations();
  await fillBoth();
  const { rows } = await adminDb().$client.query<{ name: string }>(
    `select c.relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'public'
     join pg_attribute a on a.attrelid = c.oid and a.attname = 'organisation_id' where c.relkind in ('r', 'p') order by 1`,
  );
  guarded = rows.map((row) => row.name);
});
afterAll(async () => database.drop());

const isPartition = (table: string) => /_\d$/.test(table);

async function asApplication<T>(work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: database.appUrl });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

describe("row-level security", () => {
  it("is on and forced, with a policy, for every table that has an organisation", async () => {
    expect(guarded.length).toBeGreaterThan(12);
    const { rows } = await adminDb().$client.query(
      `select relname from pg_class c where relname = any($1)
       and (not relrowsecurity or not relforcerowsecurity
            or not exists (select from pg_policy p where p.polrelid = c.oid))`,
      [guarded],
    );
    expect(rows).toEqual([]);
  });

  it("shows the application nothing without an organisation, in any table", async () => {
    await asApplication(async (client) => {
      for (const table of [...guarded, "organisations"].filter((name) => !isPartition(name))) {
        const { rows } = await client.query(`select * from "${table}"`);
        expect({ table, rows }).toEqual({ table, rows: [] });
      }
    });
  });

  it("shows one organisation its own rows and none of the other's", async () => {
    await asApplication(async (client) => {
      await client.query("select set_config('app.organisation_id', $1, false)", [larkspur]);
      for (const table of guarded.filter((name) => !isPartition(name))) {
        const { rows } = await client.query<{ organisation_id: string }>(`select * from "${table}"`);
        const owners = [...new Set(rows.map((row) => row.organisation_id))];
        expect({ table, owners }).toEqual({ table, owners: [larkspur] });
      }
    });
  });

  it("gives no way round through a partition", async () => {
    await asApplication(async (client) => {
      await client.query("select set_config('app.organisation_id', $1, false)", [larkspur]);
      for (const table of guarded.filter(isPartition)) {
        await expect(client.query(`select * from "${table}"`)).rejects.toThrow("permission denied");
      }
    });
  });

  it("refuses to write, move or delete a row of another organisation", async () => {
    await asApplication(async (client) => {
      await client.query("select set_config('app.organisation_id', $1, false)", [larkspur]);
      const write = client.query("insert into fields (organisation_id, id, name) values ($1, 'fld_y', 'n')", [other]);
      await expect(write).rejects.toThrow("row-level security");
      const move = client.query("update machines set organisation_id = $1 where id = 'mac_x'", [other]);
      await expect(move).rejects.toThrow("row-level security");
      const gone = await client.query("delete from recipes where organisation_id = $1", [other]);
      expect(gone.rowCount).toBe(0);
    });
  });

  it("keeps password hashes, other farms' people and the attempt counters from the application", async () => {
    await asApplication(async (client) => {
      await client.query("select set_config('app.organisation_id', $1, false)", [other]);
      const { rows } = await client.query("select email from users");
      expect(rows).toEqual([{ email: "owner@otherfarm.example" }]);
      await expect(client.query("select password_hash from users")).rejects.toThrow("permission denied");
      await expect(client.query("select * from rate_limits")).rejects.toThrow("permission denied");
    });
  });

  it("lets nobody rewrite the audit log", async () => {
    await asApplication(async (client) => {
      await client.query("select set_config('app.organisation_id', $1, false)", [larkspur]);
      await expect(client.query("update audit_entries set action = 'x'")).rejects.toThrow("permission denied");
      await expect(client.query("delete from audit_entries")).rejects.toThrow("permission denied");
    });
  });

  it("grants the application no more than that", async () => {
    const { rows } = await adminDb().$client.query(
      "select rolsuper, rolbypassrls, rolcreaterole, rolcreatedb from pg_roles where rolname = 'coulterbook_app'",
    );
    expect(rows).toEqual([{ rolsuper: false, rolbypassrls: false, rolcreaterole: false, rolcreatedb: false }]);
  });
});

describe("withOrganisation", () => {
  it("sees its own rows only, and leaves nothing set for the next user of the connection", async () => {
    const seen = await withOrganisation({ organisationId: larkspur }, (tx) => tx.select().from(fields));
    expect(seen.map((row) => row.organisationId)).toEqual([larkspur]);
    for (let i = 0; i < 12; i++) expect(await appDb().select().from(fields)).toEqual([]);
  });

  it("rolls everything back when the work fails", async () => {
    const work = withOrganisation({ organisationId: larkspur }, async (tx) => {
      await tx.insert(fields).values({ organisationId: larkspur, id: "fld_z", name: "Gone" });
      throw new Error("stop");
    });
    await expect(work).rejects.toThrow("stop");
    const rows = await withOrganisation({ organisationId: larkspur }, (tx) => tx.select().from(fields));
    expect(rows.map((row) => row.id)).toEqual(["fld_x"]);
  });
});
