import { execFileSync } from "node:child_process";
import { chmodSync, existsSync, mkdirSync, mkdtempSync, readdirSync, rmSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import path from "node:path";
import { randomBytes } from "node:crypto";
import { Client } from "pg";
import { closeDatabases } from "@/db/client";
import { migrateDatabase } from "@/db/migrate";

export interface TestDatabase {
  adminUrl: string;
  appUrl: string;
  drop: () => Promise<void>;
}

function withDatabase(url: string, name: string, user?: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  if (user) {
    changed.username = user;
    changed.password = "";
  }
  return changed.toString();
}

function binFolder(): string {
  const versions = existsSync("/usr/lib/postgresql") ? readdirSync("/usr/lib/postgresql").sort() : [];
  const newest = versions.at(-1);
  if (!newest) throw new Error("PostgreSQL is not installed: set TEST_DATABASE_ADMIN_URL or install postgresql");
  return `/usr/lib/postgresql/${newest}/bin`;
}

function asDatabaseUser(command: string, args: string[]): void {
  const isRoot = process.getuid?.() === 0;
  const [program, all] = isRoot ? ["runuser", ["-u", "postgres", "--", command, ...args]] : [command, args];
  execFileSync(program as string, all as string[], { cwd: "/", stdio: ["ignore", "ignore", "inherit"] });
}

async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.on("error", reject);
    server.listen(0, "127.0.0.1", () => {
      const address = server.address();
      server.close(() =>
        address && typeof address === "object" ? resolve(address.port) : reject(new Error("no port")),
      );
    });
  });
}

interface Cluster {
  adminUrl: string;
  stop: () => void;
}

/** A private throw-away cluster, durability off, for a run of the tests without the project's scripts. */
async function startCluster(): Promise<Cluster> {
  const bin = binFolder();
  const folder = mkdtempSync(path.join(tmpdir(), "coulterbook-test-"));
  chmodSync(folder, 0o755);
  const data = path.join(folder, "data");
  mkdirSync(data, { mode: 0o700 });
  if (process.getuid?.() === 0) execFileSync("chown", ["postgres:postgres", data]);
  const port = await freePort();
  asDatabaseUser(`${bin}/initdb`, ["-D", data, "-U", "app", "--auth=trust", "-E", "UTF8", "--locale=C.UTF-8", "-N"]);
  const options = [
    `-p ${port} -h 127.0.0.1`,
    "-c unix_socket_directories='' -c fsync=off -c synchronous_commit=off -c full_page_writes=off",
  ].join(" ");
  asDatabaseUser(`${bin}/pg_ctl`, ["-D", data, "-w", "-t", "30", "-l", `${data}/server.log`, "-o", options, "start"]);
  return {
    adminUrl: `postgres://app@127.0.0.1:${port}/postgres`,
    stop: () => {
      asDatabaseUser(`${bin}/pg_ctl`, ["-D", data, "-m", "immediate", "-w", "stop"]);
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

async function run(url: string, statement: string): Promise<void> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}

/**
 * A new migrated database for one test file. Sets DATABASE_URL and DATABASE_ADMIN_URL, so that `appDb()` and
 * `adminDb()` reach it; `drop` closes the pools and removes it (and the private cluster, if one was started).
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const given = process.env.TEST_DATABASE_ADMIN_URL;
  const cluster: Cluster = given ? { adminUrl: given, stop: () => undefined } : await startCluster();
  const name = `t_${randomBytes(6).toString("hex")}`;
  await run(cluster.adminUrl, `create database ${name}`);
  const adminUrl = withDatabase(cluster.adminUrl, name);
  const appUrl = withDatabase(cluster.adminUrl, name, "coulterbook_app");
  await migrateDatabase(adminUrl);
  await closeDatabases();
  process.env.DATABASE_ADMIN_URL = adminUrl;
  process.env.DATABASE_URL = appUrl;
  return {
    adminUrl,
    appUrl,
    drop: async () => {
      await closeDatabases();
      await run(cluster.adminUrl, `drop database ${name} with (force)`);
      cluster.stop();
    },
  };
}
