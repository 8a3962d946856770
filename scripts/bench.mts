// `npm run bench`: speed as ratios against a baseline run side by side. Times alone say nothing on a shared machine.
import { mkdirSync } from "node:fs";
import { resolve } from "node:path";
import { Client } from "pg";
import { buildIfStale } from "@/scripts/build-if-stale";
import { startCluster } from "@/scripts/cluster";
import { makeBenchFile, measureUpload, type BenchContext } from "@/tests/bench/measure-upload";
import { measureRequests } from "@/tests/bench/measure-requests";
import { measureTiles } from "@/tests/bench/measure-tiles";
import { startTestServer, type TestServer } from "@/tests/support/server";
import { LARKSPUR_DRILL } from "@/lib/simulator/scenario/larkspur-machines";

const ROUNDS = Number(process.env.BENCH_ROUNDS ?? 5);
const FOLDER = resolve(".data/bench");

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

await buildIfStale();
mkdirSync(FOLDER, { recursive: true });
// Durability on, as in real use: the baseline pays for it too.
const cluster = await startCluster({ dataDir: ".data/bench-postgres", purpose: "local" });
process.env.TEST_DATABASE_ADMIN_URL = cluster.adminUrl("postgres");
process.env.BUILD_DIR = "build";
process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = "true";
let server: TestServer | undefined;
let database: Client | undefined;
async function finish(code: number): Promise<never> {
  await database?.end().catch(() => undefined);
  await server?.close();
  if (cluster.started) cluster.stop();
  process.exit(code);
}
for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const) process.on(signal, () => void finish(1));

try {
  server = await startTestServer({ seed: false });
  database = new Client({ connectionString: server.databaseAdminUrl });
  await database.connect();
  const cookie = await server.signIn("owner@larkspur.example");
  const fieldId = await post(server, cookie, "/api/v1/fields", { name: "Bench" });
  console.log(
    "\nRatios, the median of pairs run one after the other [least..most]; smaller is better unless it says a second.\n",
  );
  let logId = "";
  for (const size of ["small", "large"] as const) {
    const rowCount = size === "small" ? 24 : 48;
    const machineId = await post(server, cookie, "/api/v1/machines", { ...LARKSPUR_DRILL, name: size, rowCount });
    const context: BenchContext = { server, database, cookie, fieldId, machineId };
    logId = await measureUpload(context, await makeBenchFile(size, FOLDER), ROUNDS);
    if (size === "large") await measureRequests(context, logId, ROUNDS);
  }
  await measureTiles(ROUNDS);
  await finish(0);
} catch (error) {
  console.error(error);
  await finish(1);
}
