import "server-only";
import { pingDatabase } from "@/db/queries/ping-database";
import type { Readiness } from "@/lib/schemas/readiness";
import type { Container } from "@/lib/server/container";

const PATIENCE_MS = 3_000;

async function answers(service: string, ask: () => Promise<unknown>): Promise<"answers" | "silent"> {
  const late = new Promise<never>((_, reject) => {
    setTimeout(() => reject(new Error(`no answer within ${PATIENCE_MS} ms`)), PATIENCE_MS).unref();
  });
  try {
    await Promise.race([ask(), late]);
    return "answers";
  } catch (error) {
    console.error(`${service} does not answer: ${error instanceof Error ? error.message : String(error)}`);
    return "silent";
  }
}

/** Asks each service this process needs, all at once; says nothing about why one is silent (that is in the log). */
export async function checkReadiness(container: Container): Promise<Readiness> {
  const [database, queue, storage] = await Promise.all([
    answers("database", pingDatabase),
    answers("queue", () => container.queue.ping()),
    answers("storage", () => container.storage.ping()),
  ]);
  const isReady = [database, queue, storage].every((answer) => answer === "answers");
  return { status: isReady ? "ready" : "not-ready", database, queue, storage };
}
