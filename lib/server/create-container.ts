import { PostgresQueue } from "@/lib/server/adapters/jobs/postgres-queue";
import { SmtpMailer } from "@/lib/server/adapters/mail/smtp-mailer";
import { S3Storage } from "@/lib/server/adapters/storage/s3-storage";
import type { Container } from "@/lib/server/container";
import type { Environment } from "@/lib/server/env";

/** The real adapters of an environment; locally the environment points them at the fakes. */
export function createContainer(env: Environment): Container {
  return {
    env,
    storage: new S3Storage(env),
    mailer: new SmtpMailer(env),
    queue: new PostgresQueue(env),
    clock: { now: () => new Date() },
  };
}
