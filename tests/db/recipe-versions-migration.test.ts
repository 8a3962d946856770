import { readFileSync } from "node:fs";
import { Client } from "pg";
import { afterAll, beforeAll, expect, it } from "vitest";
import { createTestDatabase, type TestDatabase } from "@/tests/support/test-db";

let database: TestDatabase;
let client: Client;

async function apply(name: string): Promise<void> {
  await client.query("begin");
  for (const statement of readFileSync(`db/migrations/${name}.sql`, "utf8").split("--> statement-breakpoint")) {
    await client.query(statement);
  }
  await client.query("commit");
}

beforeAll(async () => {
  database = await createTestDatabase();
  client = new Client({ connectionString: database.adminUrl });
  await client.connect();
  await client.query("drop schema public cascade");
  await client.query("create schema public");
});
afterAll(async () => {
  await client.end();
  await database.drop();
});

it("recipes kept before there were versions become versions, and their logs name them", async () => {
  await apply("0000_organisations_fields_logs");
  await apply("0001_isolation");
  await client.query(`insert into organisations (id, name, slug) values ('org_a', 'A', 'a')`);
  await client.query(`insert into fields (organisation_id, id, name) values ('org_a', 'fld_a', 'F')`);
  const signature = JSON.stringify(["csv", "wide", "lon", "lat", 'a "b"']);
  const other = JSON.stringify(["geojson", "single", "x"]);
  for (const [id, name, header, at] of [
    ["rec_1", "Drill", signature, "2026-01-01"],
    ["rec_2", "Drill", other, "2026-01-02"],
    ["rec_3", "Combine", other, "2026-01-03"],
  ]) {
    await client.query(
      `insert into recipes (organisation_id, id, name, header_signature, mapping, created_at)
       values ('org_a', $1, $2, $3, jsonb_build_object('was', $1::text), $4)`,
      [id, name, header, at],
    );
    await client.query(
      `insert into logs (organisation_id, id, field_id, name, counts, file_name, file_bytes, sha256, recipe_id)
       values ('org_a', $1, 'fld_a', 'L', '{}', 'a.csv', 1, 'aa', $2)`,
      [`log_${id}`, id],
    );
  }
  await apply("0002_recipe_versions");
  const recipes = await client.query("select id, name, version from recipes order by id");
  expect(recipes.rows).toEqual([
    { id: "rec_1", name: "Drill", version: 2 },
    { id: "rec_3", name: "Combine", version: 1 },
  ]);
  const versions = await client.query(
    "select recipe_id, version, format, column_names, header_signature, mapping from recipe_versions order by 1, 2",
  );
  const said = { column_names: ["x"], format: "geojson", header_signature: other };
  const first = { column_names: ["lon", "lat", 'a "b"'], format: "csv", header_signature: signature };
  expect(versions.rows).toEqual([
    { recipe_id: "rec_1", version: 1, ...first, mapping: { was: "rec_1" } },
    { recipe_id: "rec_1", version: 2, ...said, mapping: { was: "rec_2" } },
    { recipe_id: "rec_3", version: 1, ...said, mapping: { was: "rec_3" } },
  ]);
  const logs = await client.query("select id, recipe_id, recipe_version from logs order by id");
  expect(logs.rows).toEqual([
    { id: "log_rec_1", recipe_id: "rec_1", recipe_version: 1 },
    { id: "log_rec_2", recipe_id: "rec_1", recipe_version: 2 },
    { id: "log_rec_3", recipe_id: "rec_3", recipe_version: 1 },
  ]);
});
