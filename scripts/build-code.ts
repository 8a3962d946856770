import { existsSync, readdirSync } from "node:fs";
import { build } from "esbuild";

/** Programs of ours that run as their own process or thread, and what each is. */
const ENTRIES: Record<string, string> = {
  worker: "lib/server/worker/main.ts",
  "read-log-thread": "lib/server/logs/read-log-thread.ts",
  "look-thread": "lib/server/alignment/look-thread.ts",
  "cleaning-thread": "lib/server/adjustments/cleaning-thread.ts",
  fakes: "lib/server/fakes/main.ts",
  web: "scripts/web-main.ts",
  migrate: "db/migrate-main.ts",
  seed: "db/seed/main.ts",
};

/** Compiles worker, threads, fakes and tools to `build/<name>.mjs`. Packages stay in node_modules. */
export async function buildCode(outdir = "build"): Promise<void> {
  const present = Object.entries(ENTRIES).filter(([, path]) => existsSync(path));
  await build({
    entryPoints: Object.fromEntries(present),
    outdir,
    outExtension: { ".js": ".mjs" },
    bundle: true,
    platform: "node",
    format: "esm",
    target: "node20",
    packages: "external",
    alias: { "server-only": "./tests/support/server-only.ts" },
    sourcemap: "linked",
    logLevel: "warning",
  });
}

/** Whether every program has been compiled. */
export function isCodeBuilt(outdir = "build"): boolean {
  if (!existsSync(outdir)) return false;
  const names = new Set(readdirSync(outdir));
  return Object.keys(ENTRIES).every((name) => names.has(`${name}.mjs`));
}
