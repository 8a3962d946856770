import { spawnSync, type SpawnSyncOptionsWithStringEncoding, type SpawnSyncReturns } from "node:child_process";
import {
  chmodSync,
  chownSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  readlinkSync,
  renameSync,
  rmSync,
  statSync,
} from "node:fs";
import { basename, dirname, join, resolve } from "node:path";
import { Client } from "pg";
import { findFreePort } from "@/scripts/find-port";

/** A PostgreSQL cluster of this checkout, on a free loopback port. */
export interface Cluster {
  port: number;
  /** Whether this call started it; false when it was running already. */
  started: boolean;
  adminUrl(database: string): string;
  appUrl(database: string): string;
  stop(): void;
}

const TEST_SETTINGS = "-c fsync=off -c synchronous_commit=off -c full_page_writes=off -c max_connections=200";
const LOCAL_SETTINGS = "-c max_wal_size=2GB -c max_connections=100";

/** The folder with initdb and pg_ctl: POSTGRES_BIN, else the newest of Debian's, else the PATH. */
export function findBinaries(): string {
  if (process.env.POSTGRES_BIN) return process.env.POSTGRES_BIN;
  const root = "/usr/lib/postgresql";
  const versions = existsSync(root)
    ? readdirSync(root).filter((name) => existsSync(join(root, name, "bin/initdb")))
    : [];
  const newest = versions.sort((a, b) => Number(b) - Number(a))[0];
  if (newest) return join(root, newest, "bin");
  const onPath = (process.env.PATH ?? "").split(":").find((folder) => existsSync(join(folder, "initdb")));
  if (onPath) return onPath;
  throw new Error(
    "PostgreSQL is missing. Ask the administrator: apt-get install -y --no-install-recommends postgresql",
  );
}

function userId(name: string): { uid: number; gid: number } {
  const id = (flag: string) => Number(spawnSync("id", [flag, name], { encoding: "utf8" }).stdout);
  return { uid: id("-u"), gid: id("-g") };
}

/** Runs a PostgreSQL program as the user who owns the cluster: root may not run it itself. */
function runAs(owner: string, folder: string, command: string[]): SpawnSyncReturns<string> {
  const options: SpawnSyncOptionsWithStringEncoding = { cwd: "/", encoding: "utf8", stdio: ["ignore", "pipe", "pipe"] };
  if (process.getuid?.() !== 0 || owner === "root") return spawnSync(command[0] ?? "", command.slice(1), options);
  const reaches = spawnSync("runuser", ["-u", owner, "--", "test", "-x", folder], options).status === 0;
  if (reaches) return spawnSync("runuser", ["-u", owner, "--", ...command], options);
  // The checkout lies under a folder that this user may not traverse (a home of mode 700).
  const capability = "+dac_read_search";
  const drop = [`--reuid=${owner}`, `--regid=${owner}`, "--init-groups"];
  return spawnSync(
    "setpriv",
    [...drop, `--inh-caps=${capability}`, `--ambient-caps=${capability}`, ...command],
    options,
  );
}

function demand(result: SpawnSyncReturns<string>, doing: string): void {
  if (result.status === 0) return;
  const said = `${result.error?.message ?? ""} ${result.stdout ?? ""} ${result.stderr ?? ""}`.trim();
  throw new Error(`PostgreSQL could not be ${doing}: ${said}`);
}

function ownerOf(path: string): string {
  return spawnSync("stat", ["-c", "%U", path], { encoding: "utf8" }).stdout.trim();
}

/** The port of the postmaster that runs on this very folder, or null. Its working folder is its data folder. */
export function runningPort(dataDir: string): number | null {
  const pidFile = join(dataDir, "postmaster.pid");
  if (!existsSync(pidFile)) return null;
  const lines = readFileSync(pidFile, "utf8").split("\n");
  try {
    if (readlinkSync(`/proc/${Number(lines[0])}/cwd`) === dataDir) return Number(lines[3]);
  } catch {
    // No such process: the file was left by a killed start.
  }
  return null;
}

/** Makes the cluster in a folder of its own and moves it in place, so that a killed start leaves no half-made one. */
function createCluster(binaries: string, dataDir: string): void {
  mkdirSync(dirname(dataDir), { recursive: true });
  const prefix = `${basename(dataDir)}.new-`;
  for (const name of readdirSync(dirname(dataDir))) {
    if (name.startsWith(prefix)) rmSync(join(dirname(dataDir), name), { recursive: true, force: true });
  }
  if (existsSync(dataDir)) rmSync(dataDir, { recursive: true });
  const fresh = join(dirname(dataDir), `${prefix}${process.pid}`);
  mkdirSync(fresh);
  chmodSync(fresh, 0o700);
  const isRoot = process.getuid?.() === 0;
  if (isRoot) {
    const { uid, gid } = userId("postgres");
    chownSync(fresh, uid, gid);
  }
  const flags = ["-U", "app", "--auth=trust", "-E", "UTF8", "--locale=C.UTF-8"];
  demand(runAs(ownerOf(fresh), fresh, [join(binaries, "initdb"), "-D", fresh, ...flags]), "set up");
  renameSync(fresh, dataDir);
}

/** A first port to try that differs between checkouts, so that two of them rarely meet. */
function firstPort(dataDir: string): number {
  let hash = 0;
  for (const letter of dataDir) hash = (hash * 31 + letter.charCodeAt(0)) >>> 0;
  return 20_000 + (hash % 9_000);
}

async function launch(binaries: string, dataDir: string, settings: string): Promise<number> {
  const owner = ownerOf(dataDir);
  let last: SpawnSyncReturns<string> | undefined;
  for (let attempt = 0; attempt < 4; attempt++) {
    const wanted = process.env.POSTGRES_PORT && settings === LOCAL_SETTINGS ? Number(process.env.POSTGRES_PORT) : null;
    const port = wanted ?? (await findFreePort(firstPort(dataDir) + attempt * 7));
    const flags = `-p ${port} -h 127.0.0.1 -c unix_socket_directories='' ${settings}`;
    const log = join(dataDir, "server.log");
    last = runAs(owner, dataDir, [
      join(binaries, "pg_ctl"),
      "-D",
      dataDir,
      "-w",
      "-t",
      "60",
      "-l",
      log,
      "-o",
      flags,
      "start",
    ]);
    if (last.status === 0) return port;
    // Backends of a killed server may need a moment to go.
    await new Promise((done) => setTimeout(done, 1500));
  }
  const log = join(dataDir, "server.log");
  const tail = existsSync(log) ? readFileSync(log, "utf8").split("\n").slice(-8).join("\n") : "";
  throw new Error(`PostgreSQL did not start: ${last?.stdout ?? ""} ${last?.stderr ?? ""}\n${tail}`);
}

/** Starts the cluster of `dataDir`, making it first where needed; one that runs already is used as it is. */
export async function startCluster(input: { dataDir: string; purpose: "local" | "test" }): Promise<Cluster> {
  const dataDir = resolve(input.dataDir);
  const binaries = findBinaries();
  let port = existsSync(join(dataDir, "PG_VERSION")) ? runningPort(dataDir) : null;
  const started = port === null;
  if (port === null) {
    if (!existsSync(join(dataDir, "PG_VERSION"))) createCluster(binaries, dataDir);
    const owner = ownerOf(dataDir);
    const isRoot = process.getuid?.() === 0;
    if (!isRoot && statSync(dataDir).uid !== process.getuid?.()) {
      throw new Error(
        `${dataDir} belongs to ${owner}: run as that user, or as root, or set DATA_DIR to another folder`,
      );
    }
    rmSync(join(dataDir, "postmaster.pid"), { force: true });
    port = await launch(binaries, dataDir, input.purpose === "test" ? TEST_SETTINGS : LOCAL_SETTINGS);
  }
  const base = (user: string, database: string) => `postgres://${user}@127.0.0.1:${port}/${database}`;
  return {
    port,
    started,
    adminUrl: (database) => base("app", database),
    appUrl: (database) => base("coulterbook_app", database),
    stop: () => stopCluster(dataDir),
  };
}

/** Stops the cluster of this folder if it runs. */
export function stopCluster(folder: string): void {
  const dataDir = resolve(folder);
  if (!existsSync(join(dataDir, "PG_VERSION")) || runningPort(dataDir) === null) return;
  const stop = [join(findBinaries(), "pg_ctl"), "-D", dataDir, "-m", "fast", "-w", "-t", "60", "stop"];
  demand(runAs(ownerOf(dataDir), dataDir, stop), "stopped");
}

/** Makes the database where it is missing. */
export async function ensureDatabase(cluster: Cluster, database: string): Promise<void> {
  const client = new Client({ connectionString: cluster.adminUrl("postgres") });
  await client.connect();
  try {
    const found = await client.query("select 1 from pg_database where datname = $1", [database]);
    if (found.rowCount === 0) await client.query(`create database "${database.replaceAll('"', "")}"`);
  } finally {
    await client.end();
  }
}
