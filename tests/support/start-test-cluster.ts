import { startCluster } from "@/scripts/cluster";

/**
 * Vitest global set-up of the integration and browser projects: the test cluster runs, and TEST_DATABASE_ADMIN_URL names it.
 * A cluster that ran before (`npm run db:test:start`, or the whole `npm test`) is left running.
 */
export default async function startTestCluster(): Promise<() => void> {
  if (process.env.TEST_DATABASE_ADMIN_URL) return () => undefined;
  const cluster = await startCluster({ dataDir: ".data/test-postgres", purpose: "test" });
  process.env.TEST_DATABASE_ADMIN_URL = cluster.adminUrl("postgres");
  return () => {
    if (cluster.started) cluster.stop();
  };
}
