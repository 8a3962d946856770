import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { copyFileSync, existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { buildCode, isCodeBuilt } from "@/scripts/build-code";

const SOURCES = ["app", "components", "lib", "db", "scripts"];
const SINGLE_FILES = [
  "package-lock.json",
  "package.json",
  "next.config.mjs",
  "tailwind.config.ts",
  "tsconfig.json",
  "proxy.ts",
];

function* filesUnder(folder: string): Iterable<string> {
  const entries = readdirSync(folder, { withFileTypes: true }).sort((a, b) => (a.name < b.name ? -1 : 1));
  for (const entry of entries) {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) yield* filesUnder(path);
    else yield path;
  }
}

/** One hash over every source file, by path and content. */
function hashSources(): string {
  const hash = createHash("sha256");
  const paths = [
    ...SOURCES.filter(existsSync).flatMap((folder) => [...filesUnder(folder)]),
    ...SINGLE_FILES.filter(existsSync),
  ];
  for (const path of paths) hash.update(path).update("\0").update(readFileSync(path)).update("\0");
  return hash.digest("hex");
}

function runTool(label: string, script: string, parameters: string[]): void {
  const done = spawnSync(process.execPath, [script, ...parameters], {
    stdio: ["ignore", "inherit", "inherit"],
    env: { ...process.env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1" },
  });
  if (done.status !== 0) throw new Error(`${label} failed`);
}

/** Files the browser needs that are made, not written: the map's worker and the offline basemap. */
export function buildAssets(): void {
  mkdirSync("public", { recursive: true });
  copyFileSync("node_modules/maplibre-gl/dist/maplibre-gl-worker.mjs", "public/maplibre-gl-worker.mjs");
  const basemap = "scripts/build-basemap.mts";
  if (!existsSync(basemap)) return;
  const done = spawnSync(process.execPath, ["--import", "tsx", basemap], { stdio: ["ignore", "inherit", "inherit"] });
  if (done.status !== 0) throw new Error("The basemap could not be built");
}

function readBuiltHash(path: string): string {
  return existsSync(path) ? readFileSync(path, "utf8") : "";
}

/** Compiles worker and tools when any source changed. */
export async function buildCodeIfStale(): Promise<void> {
  const hash = hashSources();
  if (isCodeBuilt() && readBuiltHash("build/code-hash") === hash) return;
  await buildCode();
  mkdirSync("build", { recursive: true });
  writeFileSync("build/code-hash", hash);
}

/** Assets, worker, tools and the web application, each only when a source changed. */
export async function buildIfStale(): Promise<void> {
  const hash = hashSources();
  await buildCodeIfStale();
  if (existsSync(".next/BUILD_ID") && readBuiltHash("build/web-hash") === hash) return;
  console.log("Building the application (once after each change of its sources)");
  buildAssets();
  runTool("The build", "node_modules/next/dist/bin/next", ["build"]);
  writeFileSync("build/web-hash", hash);
}
