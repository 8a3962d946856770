// `npm run db:test:start` keeps the test cluster up between test runs; `npm run db:test:stop` ends it.
import { startCluster, stopCluster } from "@/scripts/cluster";

const TEST_CLUSTER = ".data/test-postgres";

if (process.argv[2] === "stop") {
  stopCluster(TEST_CLUSTER);
} else {
  const cluster = await startCluster({ dataDir: TEST_CLUSTER, purpose: "test" });
  console.log(`TEST_DATABASE_ADMIN_URL=${cluster.adminUrl("postgres")}`);
}
