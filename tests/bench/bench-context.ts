import type { Client } from "pg";
import type { TestServer } from "@/tests/support/server";

/** A server with a field and a machine to upload to, and its database. */
export interface BenchContext {
  server: TestServer;
  database: Client;
  cookie: string;
  fieldId: string;
  machineId: string;
}

async function post(server: TestServer, cookie: string, path: string, body: unknown): Promise<string> {
  const response = await fetch(`${server.baseUrl}${path}`, {
    method: "POST",
    headers: { cookie, origin: server.baseUrl, "content-type": "application/json" },
    body: JSON.stringify(body),
  });
  const made = (await response.json()) as { id?: string };
  if (!made.id) throw new Error(`${path}: ${response.status} ${JSON.stringify(made)}`);
  return made.id;
}

/** Sections and wings are of the drill's own number of rows. */
const NO_SECTIONS = { sections: undefined, wings: undefined };

/** A field and a machine of so many rows on a server that has none. */
export async function openBench(
  { server, database }: Pick<BenchContext, "server" | "database">,
  machine: { rowCount: number; body: object },
): Promise<BenchContext> {
  const cookie = await server.signIn("owner@larkspur.example");
  const { rowCount, body } = machine;
  const name = `Bench of ${rowCount} rows`;
  const fieldId = await post(server, cookie, "/api/v1/fields", { name });
  const machineId = await post(server, cookie, "/api/v1/machines", { ...body, ...NO_SECTIONS, name, rowCount });
  return { server, database, cookie, fieldId, machineId };
}
