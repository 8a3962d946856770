import { sql } from "drizzle-orm";
import { drizzle, type NodePgDatabase } from "drizzle-orm/node-postgres";
import { Pool } from "pg";
import * as schema from "@/db/schema";
import type { Scope } from "@/lib/scope";

export type Database = NodePgDatabase<typeof schema> & { $client: Pool };
export type Transaction = Parameters<Parameters<Database["transaction"]>[0]>[0];

interface Pools {
  app?: Database;
  admin?: Database;
}

// One pair of pools a process, also across hot reloads and Next's separately bundled routes.
const shared = globalThis as typeof globalThis & { coulterbookDatabases?: Pools };
const pools: Pools = (shared.coulterbookDatabases ??= {});

function connect(variable: "DATABASE_URL" | "DATABASE_ADMIN_URL", connections: number): Database {
  const connectionString = process.env[variable];
  if (!connectionString) throw new Error(`${variable} is not set: the database address is needed`);
  const pool = new Pool({ connectionString, max: connections, idleTimeoutMillis: 30_000 });
  pool.on("error", (error) => console.error(`database connection lost: ${error.message}`));
  return drizzle(pool, { schema, casing: "snake_case" });
}

/**
 * The application's own database role: row-level security on, so a query outside `withOrganisation` sees nothing.
 * PostgreSQL refuses `COPY ... FROM` under row-level security: bulk writes go through `db/queries/system`.
 */
export function appDb(): Database {
  return (pools.app ??= connect("DATABASE_URL", 10));
}

/** The owner's role, which sees every organisation. Only `db/queries/system` may use it. */
export function adminDb(): Database {
  return (pools.admin ??= connect("DATABASE_ADMIN_URL", 6));
}

/** Closes both pools; a later call opens new ones from the environment of that moment. */
export async function closeDatabases(): Promise<void> {
  const open = [pools.app, pools.admin];
  pools.app = undefined;
  pools.admin = undefined;
  await Promise.all(open.map((database) => database?.$client.end()));
}

/** Runs `work` in one transaction that sees this organisation's rows and no others. */
export async function withOrganisation<T>(
  scope: Pick<Scope, "organisationId">,
  work: (tx: Transaction) => Promise<T>,
): Promise<T> {
  return appDb().transaction(async (tx) => {
    await tx.execute(sql`select set_config('app.organisation_id', ${scope.organisationId}, true)`);
    return work(tx);
  });
}
