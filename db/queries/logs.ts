import { and, desc, eq, isNull, ne, sql, type SQL } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { visibleLog } from "@/db/queries/visibility";
import { fields, logs, machines } from "@/db/schema";
import { can } from "@/lib/access/permissions";
import { AppError } from "@/lib/errors";
import type { Machine } from "@/lib/machines/machine";
import { cursorInstant, decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { Boundary } from "@/lib/schemas/geometry";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

export type LogRow = typeof logs.$inferSelect;
export type NewLog = Pick<
  typeof logs.$inferInsert,
  "id" | "fieldId" | "machineId" | "mapping" | "name" | "fileName" | "fileBytes" | "sha256"
>;
export type LogChange = Partial<Omit<typeof logs.$inferInsert, "organisationId" | "id" | "fieldId">>;

export const NO_COUNTS = { records: 0, rows: 0, readings: 0, flagged: 0, rejected: 0, passes: 0 };

function isVisible(scope: Scope): SQL | undefined {
  return and(eq(logs.organisationId, scope.organisationId), visibleLog(scope, logs.fieldId, logs.kind));
}

export async function findLog(tx: Transaction, scope: Scope, logId: string): Promise<LogRow | null> {
  const [row] = await tx
    .select()
    .from(logs)
    .where(and(isVisible(scope), eq(logs.id, logId)));
  return row ?? null;
}

/** As `findLog`, held until the transaction ends: of a person's change and a worker's beginning, one waits for the other. */
export async function findLogForChange(tx: Transaction, scope: Scope, logId: string): Promise<LogRow | null> {
  const [row] = await tx
    .select()
    .from(logs)
    .where(and(isVisible(scope), eq(logs.id, logId)))
    .for("update");
  return row ?? null;
}

/** @throws AppError `not_found` for an absent, a foreign and a hidden log alike. */
export async function getLogOrThrow(tx: Transaction, scope: Scope, logId: string): Promise<LogRow> {
  const row = await findLog(tx, scope, logId);
  if (!row) throw new AppError("not_found", "There is no such log.");
  return row;
}

/** Newest first, a page at a time. */
export async function listLogsOfField(
  tx: Transaction,
  scope: Scope,
  input: { fieldId: string; query: ListQuery },
): Promise<{ rows: LogRow[]; nextCursor: string | null }> {
  const after = decodeCursor(input.query.cursor);
  const older = after
    ? sql`(date_trunc('milliseconds', ${logs.createdAt}), ${logs.id}) < (${cursorInstant(after).toISOString()}::timestamptz, ${after[1]})`
    : undefined;
  const rows = await tx
    .select()
    .from(logs)
    .where(and(isVisible(scope), eq(logs.fieldId, input.fieldId), older))
    .orderBy(desc(sql`date_trunc('milliseconds', ${logs.createdAt})`), desc(logs.id))
    .limit(input.query.limit + 1);
  return pageOf(rows, input.query.limit, (row) => [row.createdAt.toISOString(), row.id]);
}

/** Held until the transaction ends: no two requests handle the same bytes of an organisation at once. */
export async function lockBytes(tx: Transaction, scope: Scope, sha256: string): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${scope.organisationId} ${sha256}`}, 0))`);
}

/** The oldest log of the field with these bytes. */
export async function findSameBytes(
  tx: Transaction,
  scope: Scope,
  input: { fieldId: string; sha256: string },
): Promise<{ id: string } | null> {
  const [row] = await tx
    .select({ id: logs.id })
    .from(logs)
    .where(
      and(
        eq(logs.organisationId, scope.organisationId),
        eq(logs.fieldId, input.fieldId),
        eq(logs.sha256, input.sha256),
      ),
    )
    .orderBy(logs.createdAt)
    .limit(1);
  return row ?? null;
}

export async function insertLog(tx: Transaction, scope: Scope, input: NewLog): Promise<void> {
  await tx.insert(logs).values({
    ...input,
    organisationId: scope.organisationId,
    uploadedBy: scope.userId,
    counts: NO_COUNTS,
  });
}

export async function changeLog(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  logId: string,
  change: LogChange,
): Promise<void> {
  await tx
    .update(logs)
    .set({ ...change, updatedAt: new Date() })
    .where(and(eq(logs.organisationId, scope.organisationId), eq(logs.id, logId)));
}

/** Whether the caller may delete this log: every log, or only their own upload while nothing was ever read from it. */
export async function isLogRemovable(tx: Transaction, scope: Scope, logId: string): Promise<boolean> {
  const own = and(eq(logs.uploadedBy, scope.userId), eq(logs.version, 0), ne(logs.status, "ready"));
  const rows = await tx
    .select({ id: logs.id })
    .from(logs)
    .where(and(isVisible(scope), eq(logs.id, logId), can(scope.role, "logs.delete") ? undefined : own))
    .for("update");
  return rows.length > 0;
}

/** Asks the worker to stop; false when nothing is going on. */
export async function requestCancel(tx: Transaction, scope: Scope, logId: string): Promise<boolean> {
  const changed = await tx
    .update(logs)
    .set({ cancelRequestedAt: new Date() })
    .where(
      and(
        eq(logs.organisationId, scope.organisationId),
        eq(logs.id, logId),
        sql`${logs.status} in ('queued', 'reading', 'building')`,
        isNull(logs.cancelRequestedAt),
      ),
    )
    .returning({ id: logs.id });
  return changed.length > 0;
}

/** Removes the log and everything derived from it. */
export async function deleteLogRows(tx: Transaction, scope: Scope, logId: string): Promise<void> {
  for (const table of ["pass_readings", "log_points", "log_results", "log_files"]) {
    await tx.execute(
      sql`delete from ${sql.identifier(table)} where organisation_id = ${scope.organisationId} and log_id = ${logId}`,
    );
  }
  await tx.delete(logs).where(and(eq(logs.organisationId, scope.organisationId), eq(logs.id, logId)));
}

/** Where the log's field lies; null for a field without a boundary. */
export async function findBoundaryOfLog(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  fieldId: string,
): Promise<Boundary | null> {
  const [row] = await tx
    .select({ boundary: fields.boundary })
    .from(fields)
    .where(and(eq(fields.organisationId, scope.organisationId), eq(fields.id, fieldId)));
  return row?.boundary ?? null;
}

export async function findMachineOfLog(
  tx: Transaction,
  scope: Pick<Scope, "organisationId">,
  machineId: string,
): Promise<Machine | null> {
  const [row] = await tx
    .select({ body: machines.body })
    .from(machines)
    .where(and(eq(machines.organisationId, scope.organisationId), eq(machines.id, machineId)));
  return row?.body ?? null;
}
