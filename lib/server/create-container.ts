import type { Clock } from "@/lib/ports/clock";
import type { JobQueue } from "@/lib/ports/job-queue";
import type { Mailer } from "@/lib/ports/mailer";
import type { ObjectStorage } from "@/lib/ports/object-storage";
import { PostgresQueue } from "@/lib/server/adapters/jobs/postgres-queue";
import { SmtpMailer } from "@/lib/server/adapters/mail/smtp-mailer";
import { openStorage, storageSettings } from "@/lib/server/adapters/storage/open-storage";
import type { Environment } from "@/lib/server/env";

/** Everything with a side effect that a service may use. */
export interface Container {
  env: Environment;
  storage: ObjectStorage;
  mailer: Mailer;
  queue: JobQueue;
  clock: Clock;
}

/** The real adapters of an environment; locally the environment points them at the fakes. */
export function createContainer(env: Environment): Container {
  return {
    env,
    storage: openStorage(storageSettings(env)),
    mailer: new SmtpMailer(env),
    queue: new PostgresQueue(env),
    clock: { now: () => new Date() },
  };
}
