// `npm test`: its own cluster and ports, then types, lint, unit, component, integration and browser tests.
import { spawn, type ChildProcess } from "node:child_process";
import { once } from "node:events";
import { mkdirSync, readFileSync, rmSync, existsSync } from "node:fs";
import { buildCodeIfStale, buildIfStale } from "@/scripts/build-if-stale";
import { startCluster, type Cluster } from "@/scripts/cluster";

const REPORTS = ".data/test-reports";
const NEXT = "node_modules/next/dist/bin/next";

interface Tally {
  passed: number;
  failed: number;
  skipped: number;
}

const tally: Tally = { passed: 0, failed: 0, skipped: 0 };
const failedSteps: string[] = [];

let running: ChildProcess | undefined;

/** Runs a tool to its end; a failed one is counted and the rest still runs. */
async function runStep(name: string, script: string, parameters: string[]): Promise<void> {
  console.log(`\n== ${name}`);
  const started = Date.now();
  running = spawn(process.execPath, [script, ...parameters], { stdio: ["ignore", "inherit", "inherit"] });
  const [code] = (await once(running, "exit")) as [number | null];
  console.log(`== ${name}: ${code === 0 ? "ok" : "FAILED"} in ${Math.round((Date.now() - started) / 1000)} s`);
  if (code !== 0) failedSteps.push(name);
}

/** Counts a report of vitest; a run without a report has failed as a whole. */
function countReport(name: string, path: string): void {
  if (!existsSync(path)) {
    tally.failed += 1;
    console.error(`${name} left no report`);
    return;
  }
  const report = JSON.parse(readFileSync(path, "utf8")) as Record<string, unknown>;
  const number = (key: string) => (typeof report[key] === "number" ? report[key] : 0);
  tally.passed += number("numPassedTests");
  tally.failed += number("numFailedTests");
  tally.skipped += number("numPendingTests") + number("numTodoTests");
  // A file that could not be loaded has no tests to fail.
  if (report.success === false && number("numFailedTests") === 0) tally.failed += 1;
}

async function runProject(project: string): Promise<void> {
  const path = `${REPORTS}/${project}.json`;
  const flags = ["run", "--project", project, "--passWithNoTests", "--reporter=default", "--reporter=json"];
  await runStep(`${project} tests`, "node_modules/vitest/vitest.mjs", [...flags, `--outputFile.json=${path}`]);
  countReport(`${project} tests`, path);
}

async function buildForBrowser(): Promise<boolean> {
  console.log("\n== build");
  try {
    await buildIfStale();
    return true;
  } catch (error) {
    console.error(error);
    failedSteps.push("build");
    return false;
  }
}

let cluster: Cluster | undefined;
function finish(code: number): never {
  if (cluster?.started) cluster.stop();
  process.exit(code);
}
/** A signal ends the step under way first: its own processes need the cluster to the last. */
async function interrupt(): Promise<never> {
  if (running && running.exitCode === null && running.signalCode === null) {
    running.kill("SIGTERM");
    await Promise.race([once(running, "exit"), new Promise((resolve) => setTimeout(resolve, 5000))]);
    running.kill("SIGKILL");
  }
  return finish(1);
}
for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const) process.on(signal, () => void interrupt());

try {
  rmSync(REPORTS, { recursive: true, force: true });
  mkdirSync(REPORTS, { recursive: true });
  cluster = await startCluster({ dataDir: ".data/test-postgres", purpose: "test" });
  process.env.TEST_DATABASE_ADMIN_URL = cluster.adminUrl("postgres");
  process.env.NEXT_TELEMETRY_DISABLED = "1";
  process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = "true";
  await buildCodeIfStale();
  process.env.BUILD_DIR = "build";
  await runStep("route types", NEXT, ["typegen"]);
  await runStep("types", "node_modules/typescript/bin/tsc", ["--noEmit"]);
  await runStep("lint", "node_modules/eslint/bin/eslint.js", ["."]);
  for (const project of ["unit", "components", "integration"]) await runProject(project);
  if (await buildForBrowser()) await runProject("e2e");
} catch (error) {
  console.error(error);
  failedSteps.push("preparation");
}
if (failedSteps.length > 0) console.log(`\nFailed: ${failedSteps.join(", ")}`);
// Types, lint and build count as one failed test each, so that the last line never hides them.
const stepFailures = failedSteps.filter((step) => !step.endsWith("tests")).length;
console.log(`\n${tally.passed} passed, ${tally.failed + stepFailures} failed, ${tally.skipped} skipped`);
finish(failedSteps.length > 0 || tally.failed > 0 ? 1 : 0);
