// `npm run bench`: speed as ratios against a baseline run side by side. Times alone say nothing on a shared machine.
// BENCH_ROUNDS=5 pairs a figure; BENCH_ONLY=large,storage picks among the names of PARTS below.
import { mkdirSync } from "node:fs";
import { resolve } from "node:path";
import { Client } from "pg";
import { closeDatabases } from "@/db/client";
import { buildIfStale } from "@/scripts/build-if-stale";
import { startCluster } from "@/scripts/cluster";
import { copyFlat } from "@/tests/bench/baselines";
import { openBench, type BenchContext } from "@/tests/bench/bench-context";
import { makeBenchFile, type BenchFileKind } from "@/tests/bench/bench-files";
import { measureOrganisation } from "@/tests/bench/measure-organisation";
import { measurePaint } from "@/tests/bench/measure-paint";
import { measureReader } from "@/tests/bench/measure-reader";
import { measureRequests } from "@/tests/bench/measure-requests";
import { measureReadBack, measureStoredBytes } from "@/tests/bench/measure-storage";
import { measureTiles } from "@/tests/bench/measure-tiles";
import { measureUpload, type UploadBench } from "@/tests/bench/measure-upload";
import { uploadToReady } from "@/tests/bench/upload-to-ready";
import { startTestServer, type TestServer } from "@/tests/support/server";
import { LARKSPUR_DRILL } from "@/lib/simulator/scenario/larkspur-machines";

const PARTS = [
  "small",
  "large",
  "long",
  "shapefile",
  "geojson",
  "storage",
  "requests",
  "organisation",
  "tiles",
  "paint",
] as const;
type Part = (typeof PARTS)[number];
const chosen = (process.env.BENCH_ONLY ?? "").split(",").filter((name) => name !== "");
const unknown = chosen.filter((name) => !(PARTS as readonly string[]).includes(name));
if (unknown.length > 0) throw new Error(`BENCH_ONLY: ${unknown.join(", ")} is none of ${PARTS.join(", ")}`);
const wants = (...parts: Part[]) => chosen.length === 0 || parts.some((part) => chosen.includes(part));

const ROUNDS = Number(process.env.BENCH_ROUNDS ?? 5);
const FOLDER = resolve(".data/bench");

await buildIfStale();
mkdirSync(FOLDER, { recursive: true });
// Durability on, as in real use: the baseline pays for it too.
const cluster = await startCluster({ dataDir: ".data/bench-postgres", purpose: "local" });
process.env.TEST_DATABASE_ADMIN_URL = cluster.adminUrl("postgres");
process.env.BUILD_DIR = "build";
process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = "true";
const servers: TestServer[] = [];
const databases: Client[] = [];
async function finish(code: number): Promise<never> {
  await closeDatabases().catch(() => undefined);
  for (const database of databases) await database.end().catch(() => undefined);
  for (const server of servers) await server.close();
  if (cluster.started) cluster.stop();
  process.exit(code);
}
for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const) process.on(signal, () => void finish(1));

async function open(): Promise<(rowCount: number) => Promise<BenchContext>> {
  const server = await startTestServer({
    seed: false,
    environment: { S3_ENDPOINT: "", FILES_DIR: resolve(FOLDER, "files") },
  });
  servers.push(server);
  const database = new Client({ connectionString: server.databaseAdminUrl });
  await database.connect();
  databases.push(database);
  return (rowCount) => openBench({ server, database }, { rowCount, body: LARKSPUR_DRILL });
}

const COPY_WIDE = "psql \\copy, wide";

async function measure(): Promise<void> {
  const begin = await open();
  console.log("\nRatios, the median of pairs run one after the other [least..most]; smaller is better unless said.\n");
  if (wants("small")) {
    const context = await begin(24);
    const file = await makeBenchFile("small", "wide", FOLDER);
    const bench = { file, label: "small wide CSV", base: () => copyFlat(context, file), baseName: COPY_WIDE };
    // No goal is set for a log this small; what it costs is mostly the way there and back.
    await measureUpload(context, { ...bench, atMost: Infinity, rounds: ROUNDS });
  }
  const context = await begin(48);
  const wide = await makeBenchFile("large", "wide", FOLDER);
  const base = () => copyFlat(context, wide);
  const upload = async (kind: BenchFileKind, bench: Omit<UploadBench, "file" | "rounds" | "base" | "baseName">) => {
    const file = kind === "wide" ? wide : await makeBenchFile("large", kind, FOLDER);
    await measureUpload(context, { file, base, baseName: COPY_WIDE, rounds: ROUNDS, ...bench });
    return file;
  };
  if (wants("large")) await upload("wide", { label: "large wide CSV", atMost: 1.6, inFull: true });
  if (wants("long")) {
    const file = await makeBenchFile("large", "long", FOLDER);
    const flat = { base: () => copyFlat(context, file, "flat_long"), baseName: "psql \\copy, long" };
    await measureUpload(context, { file, label: "large long CSV", atMost: 1.3, rounds: ROUNDS, ...flat });
  }
  if (wants("shapefile")) {
    const file = await upload("shapefile", { label: "144-field shapefile zip", atMost: 1 });
    await measureReader({ file, label: "  the zip", base, atMost: 1, rounds: ROUNDS });
  }
  if (wants("geojson")) {
    const file = await upload("geojson", { label: "GeoJSON points", atMost: 2.5 });
    await measureReader({ file, label: "  the GeoJSON", base, atMost: 2.5, rounds: ROUNDS });
  }
  if (wants("storage")) {
    await measureStoredBytes(context, wide);
    const { logId } = await uploadToReady(context, wide);
    await base();
    await measureReadBack(context, { file: wide, logId, rounds: ROUNDS });
  }
  if (wants("requests")) await measureRequests(context, (await uploadToReady(context, wide)).logId, ROUNDS);
  if (wants("organisation")) {
    const other = await (await open())(48);
    const logIds = { many: (await uploadToReady(context, wide)).logId, one: (await uploadToReady(other, wide)).logId };
    await measureOrganisation({ many: context, one: other, logIds, rounds: ROUNDS });
  }
  if (wants("paint")) await measurePaint(context, (await uploadToReady(context, wide)).logId, ROUNDS);
  if (wants("tiles")) await measureTiles(ROUNDS);
}

try {
  await measure();
  await finish(0);
} catch (error) {
  console.error(error);
  await finish(1);
}
