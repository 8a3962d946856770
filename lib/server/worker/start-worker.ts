import PgBoss from "pg-boss";
import { Client } from "pg";
import { findStrandedLogs } from "@/db/queries/system/stranded-logs";
import { findStrandedLooks } from "@/db/queries/system/stranded-looks";
import type { JobPayloads } from "@/lib/ports/job-queue";
import { openBoss, WAKE_CHANNEL } from "@/lib/server/adapters/jobs/postgres-queue";
import type { Container } from "@/lib/server/create-container";
import { lookCloser } from "@/lib/server/alignment/look-closer";
import { LogInterrupted } from "@/lib/server/logs/log-failure";
import { readLogJob } from "@/lib/server/logs/read-log-job";
import { sweepIncoming } from "@/lib/server/logs/sweep-incoming";
import { ThreadPool } from "@/lib/server/logs/thread-pool";

const SWEEP_MS = 5_000;
const STRANDED_AFTER_S = 4;
const POLL_S = 2;

export interface RunningWorker {
  /** Puts back what is being read and ends. */
  stop(): Promise<void>;
}

/** Takes jobs until told to stop. Any number of workers may run against one database. */
export async function startWorker({ env, queue, storage }: Container): Promise<RunningWorker> {
  const stopping = new AbortController();
  const threads = new ThreadPool(env);
  threads.warm(1);
  const boss = await openBoss(env.DATABASE_ADMIN_URL, "work");
  const reading = new Set<Promise<void>>();
  const looking = new Set<Promise<void>>();
  const handle = async (jobs: PgBoss.Job<JobPayloads["read-log"]>[]) => {
    for (const job of jobs) {
      await during(reading, readLogJob(job.data, { threads, signal: stopping.signal }));
      // Lost when this fails, it is found by the sweep.
      await queue.send("look-closer", job.data, { key: job.data.logId }).catch(() => undefined);
    }
  };
  const whenIdle = async () => {
    while (reading.size > 0) await Promise.race([...reading].map((work) => work.catch(() => undefined)));
  };
  const lookOptions = { env, signal: stopping.signal, whenIdle };
  const handleLooks = async (jobs: PgBoss.Job<JobPayloads["look-closer"]>[]) => {
    for (const job of jobs) await during(looking, lookCloser(job.data, lookOptions));
  };
  const workerIds = [await boss.work("look-closer", { batchSize: 1, pollingIntervalSeconds: POLL_S }, handleLooks)];
  for (let count = 0; count < env.WORKER_CONCURRENCY; count++) {
    workerIds.push(await boss.work("read-log", { batchSize: 1, pollingIntervalSeconds: POLL_S }, handle));
  }
  const listener = await listenForWork(env.DATABASE_ADMIN_URL, () => workerIds.forEach((id) => boss.notifyWorker(id)));
  // What a killed worker left, and what was never sent because the queue was away, is sent again.
  const sweep = async () => {
    for (const stranded of await findStrandedLogs(STRANDED_AFTER_S)) {
      await queue.send("read-log", stranded, { key: stranded.logId });
    }
    for (const stranded of await findStrandedLooks(STRANDED_AFTER_S)) {
      await queue.send("look-closer", stranded, { key: stranded.logId });
    }
  };
  const safeSweep = () => sweep().catch((error: unknown) => console.error("sweep:", error));
  const timer = setInterval(() => void safeSweep(), SWEEP_MS);
  await safeSweep();
  void sweepIncoming(storage).catch((error: unknown) => console.error("sweep of uploads:", error));
  return {
    stop: async () => {
      clearInterval(timer);
      stopping.abort(new LogInterrupted("shutdown"));
      await Promise.allSettled([...reading, ...looking]);
      await listener.end().catch(() => undefined);
      await boss.stop({ graceful: false });
      await threads.close();
      await queue.close();
    },
  };
}

/** Awaits work, which counts as under way until it ends. */
async function during(underWay: Set<Promise<void>>, work: Promise<void>): Promise<void> {
  underWay.add(work);
  await work.finally(() => underWay.delete(work));
}

async function listenForWork(adminUrl: string, onWork: () => void): Promise<Client> {
  const client = new Client({ connectionString: adminUrl, keepAlive: true });
  client.on("notification", onWork);
  client.on("error", (error) => console.error(`listener: ${error.message}`));
  await client.connect();
  await client.query(`listen ${WAKE_CHANNEL}`);
  return client;
}
