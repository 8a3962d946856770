import PgBoss from "pg-boss";
import type { JobName, JobPayloads, JobQueue } from "@/lib/ports/job-queue";
import type { Environment } from "@/lib/server/env";

/** Tells every worker that something waits, so that it need not poll. */
export const WAKE_CHANNEL = "coulterbook_jobs";

/** Queues, and how each behaves. `short`: one waiting job a key. */
export const JOB_QUEUES = {
  "read-log": { policy: "short", retryLimit: 2, retryDelay: 1, expireInSeconds: 3600 },
  "look-closer": { policy: "short", retryLimit: 2, retryDelay: 1, expireInSeconds: 3600 },
} as const satisfies Record<JobName, object>;

/** Opens pg-boss; `supervise` where jobs are worked on. */
export async function openBoss(adminUrl: string, role: "send" | "work"): Promise<PgBoss> {
  const boss = new PgBoss({
    connectionString: adminUrl,
    max: role === "work" ? 4 : 2,
    supervise: role === "work",
    schedule: false,
    maintenanceIntervalSeconds: 60,
  });
  boss.on("error", (error) => console.error(`queue: ${error.message}`));
  await boss.start();
  for (const [name, options] of Object.entries(JOB_QUEUES)) await boss.createQueue(name, { name, ...options });
  return boss;
}

/** The queue as the web process and the seed see it: they only send. */
export class PostgresQueue implements JobQueue {
  private opened: Promise<PgBoss> | undefined;

  constructor(private readonly env: Pick<Environment, "DATABASE_ADMIN_URL">) {}

  private boss(): Promise<PgBoss> {
    this.opened ??= openBoss(this.env.DATABASE_ADMIN_URL, "send").catch((error: unknown) => {
      this.opened = undefined;
      throw error;
    });
    return this.opened;
  }

  async send<Name extends JobName>(name: Name, payload: JobPayloads[Name], options: { key?: string } = {}) {
    const boss = await this.boss();
    await boss.send(name, payload, { ...JOB_QUEUES[name], singletonKey: options.key });
    await boss.getDb().executeSql(`select pg_notify('${WAKE_CHANNEL}', $1)`, [name]);
  }

  async ping(): Promise<void> {
    const boss = await this.boss();
    await boss.getDb().executeSql("select 1 from pgboss.version", []);
  }

  async close(): Promise<void> {
    const boss = await this.opened;
    this.opened = undefined;
    await boss?.stop({ graceful: false });
  }
}
