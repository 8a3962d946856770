import { mkdirSync, rmSync } from "node:fs";
import { buildCode } from "@/scripts/build-code";
import { startCluster } from "@/scripts/cluster";

async function startDatabase(): Promise<() => void> {
  if (process.env.TEST_DATABASE_ADMIN_URL) return () => undefined;
  const cluster = await startCluster({ dataDir: ".data/test-postgres", purpose: "test" });
  process.env.TEST_DATABASE_ADMIN_URL = cluster.adminUrl("postgres");
  return () => {
    if (cluster.started) cluster.stop();
  };
}

/** Worker and reading thread of the sources as they are now, in a folder of this run: threads are run compiled. */
async function compilePrograms(): Promise<() => void> {
  if (process.env.BUILD_DIR) return () => undefined;
  const folder = `.data/test-build/${process.pid}`;
  mkdirSync(folder, { recursive: true });
  await buildCode(folder);
  process.env.BUILD_DIR = folder;
  return () => rmSync(folder, { recursive: true, force: true });
}

/**
 * Vitest global set-up of the integration and browser projects: the test cluster runs, TEST_DATABASE_ADMIN_URL names it,
 * and the programs are compiled. A cluster that ran before (`npm run db:test:start`, `npm test`) is left running.
 */
export default async function startTestCluster(): Promise<() => void> {
  process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = "true";
  const stopDatabase = await startDatabase();
  const removePrograms = await compilePrograms();
  return () => {
    removePrograms();
    stopDatabase();
  };
}
