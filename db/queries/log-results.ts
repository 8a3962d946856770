import { and, eq } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { logResults } from "@/db/schema";
import type { Scope } from "@/lib/scope";

interface ResultKey {
  logId: string;
  version: number;
  /** `placed`, `columns`, `passes`, `rows:<channel>`, `coverage`, `verdict`. */
  kind: string;
}

function isThisResult(scope: Pick<Scope, "organisationId">, key: ResultKey) {
  return and(
    eq(logResults.organisationId, scope.organisationId),
    eq(logResults.logId, key.logId),
    eq(logResults.version, key.version),
    eq(logResults.kind, key.kind),
  );
}

/** A stored answer about one version of a log; the caller's schema says what shape it has. */
export async function findLogResult(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  key: ResultKey,
): Promise<unknown> {
  const [row] = await tx.select({ body: logResults.body }).from(logResults).where(isThisResult(scope, key));
  return row?.body ?? null;
}

/** Stores an answer; one that another request stored meanwhile is replaced by the same answer. */
export async function saveLogResult(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  input: ResultKey & { body: unknown },
): Promise<void> {
  const { body, ...key } = input;
  await tx
    .insert(logResults)
    .values({ ...key, organisationId: scope.organisationId, body })
    .onConflictDoUpdate({
      target: [logResults.organisationId, logResults.logId, logResults.version, logResults.kind],
      set: { body },
    });
}
