// The worker process: takes jobs from the queue, reads logs in threads of its own.
import { closeDatabases } from "@/db/client";
import { createContainer } from "@/lib/server/create-container";
import { env } from "@/lib/server/env";
import { startWorker } from "@/lib/server/worker/start-worker";

const worker = await startWorker(createContainer(env()));
process.send?.({ ready: true });

async function stop(): Promise<void> {
  // What cannot be put back in time is found by the next worker: see findStrandedLogs.
  setTimeout(() => process.exit(1), 8_000).unref();
  await worker.stop();
  await closeDatabases();
  process.exit(0);
}
process.once("SIGTERM", () => void stop());
process.once("SIGINT", () => void stop());
