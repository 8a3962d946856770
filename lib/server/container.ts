import "server-only";
import type { Clock } from "@/lib/ports/clock";
import type { JobQueue } from "@/lib/ports/job-queue";
import type { Mailer } from "@/lib/ports/mailer";
import type { ObjectStorage } from "@/lib/ports/object-storage";
import type { Environment } from "@/lib/server/env";

/** The outside world as services see it; built once a process from the environment. */
export interface Container {
  env: Environment;
  storage: ObjectStorage;
  mailer: Mailer;
  queue: JobQueue;
  clock: Clock;
}
