import { drizzle } from "drizzle-orm/node-postgres";
import { migrate } from "drizzle-orm/node-postgres/migrator";
import { Client } from "pg";

/** Any number, the same for all: only one process migrates a database at a time. */
const MIGRATION_LOCK = 7_219_044;

/**
 * Brings a database up to the newest migration; does nothing when it is there already.
 * The folder is found from the working directory, the project's root in every process of ours.
 */
export async function migrateDatabase(adminUrl: string, migrationsFolder = "db/migrations"): Promise<void> {
  const client = new Client({ connectionString: adminUrl });
  await client.connect();
  try {
    await client.query("select pg_advisory_lock($1)", [MIGRATION_LOCK]);
    await migrate(drizzle(client, { casing: "snake_case" }), { migrationsFolder });
  } finally {
    await client.end();
  }
}
