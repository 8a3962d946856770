import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { migrateDatabase } from "@/db/migrate";
import { createTestDatabase, type TestDatabase } from "@/tests/support/test-db";

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
afterAll(async () => database.drop());

describe("migrateDatabase", () => {
  it("changes nothing the second time, also when two processes start together", async () => {
    await Promise.all([migrateDatabase(database.adminUrl), migrateDatabase(database.adminUrl)]);
    const { rows } = await adminDb().$client.query("select count(*)::int as n from drizzle.__drizzle_migrations");
    expect(rows[0].n).toBeGreaterThan(0);
  });

  it("splits points and readings over eight partitions by log", async () => {
    const { rows } = await adminDb().$client.query(
      `select p.partrelid::regclass::text as parent, p.partstrat, count(*)::int as parts
       from pg_partitioned_table p join pg_inherits i on i.inhparent = p.partrelid group by 1, 2 order by 1`,
    );
    expect(rows).toEqual([
      { parent: "log_points", partstrat: "h", parts: 8 },
      { parent: "pass_readings", partstrat: "h", parts: 8 },
    ]);
  });

  it("compresses packed readings with lz4 in every partition", async () => {
    const { rows } = await adminDb().$client.query(
      `select distinct attcompression from pg_attribute a join pg_class c on c.oid = a.attrelid
       where c.relname like 'pass_readings_%' and c.relkind = 'r' and attname = 'values'`,
    );
    expect(rows).toEqual([{ attcompression: "l" }]);
  });
});
