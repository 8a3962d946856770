import { and, desc, eq, isNull, lt, ne, or, sql, type SQL } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { fieldGrants, fields, logs, machines } from "@/db/schema";
import { AppError } from "@/lib/errors";
import type { Machine } from "@/lib/machines/machine";
import type { Boundary } from "@/lib/schemas/geometry";
import type { Scope } from "@/lib/scope";

export type LogRow = typeof logs.$inferSelect;
export type NewLog = Pick<
  typeof logs.$inferInsert,
  "id" | "fieldId" | "machineId" | "mapping" | "name" | "fileName" | "fileBytes" | "sha256"
>;
export type LogChange = Partial<Omit<typeof logs.$inferInsert, "organisationId" | "id" | "fieldId">>;

export const NO_COUNTS = { records: 0, rows: 0, readings: 0, flagged: 0, rejected: 0, passes: 0 };

function isGranted(scope: Scope): SQL {
  return sql`exists (select 1 from ${fieldGrants} where ${fieldGrants.organisationId} = ${scope.organisationId}
    and ${fieldGrants.userId} = ${scope.userId} and ${fieldGrants.fieldId} = ${logs.fieldId})`;
}

/** A viewer sees logs of fields given to them; an operator sees harvest logs only of such fields; others see all. */
function isVisible(scope: Scope): SQL | undefined {
  const own = eq(logs.organisationId, scope.organisationId);
  if (scope.role === "viewer") return and(own, isGranted(scope));
  if (scope.role === "operator") return and(own, or(ne(logs.kind, "harvest"), isGranted(scope)));
  return own;
}

export async function findLog(tx: Transaction, scope: Scope, logId: string): Promise<LogRow | null> {
  const [row] = await tx
    .select()
    .from(logs)
    .where(and(isVisible(scope), eq(logs.id, logId)));
  return row ?? null;
}

/** @throws AppError `not_found` for an absent, a foreign and a hidden log alike. */
export async function getLogOrThrow(tx: Transaction, scope: Scope, logId: string): Promise<LogRow> {
  const row = await findLog(tx, scope, logId);
  if (!row) throw new AppError("not_found", "There is no such log.");
  return row;
}

/** Newest first. The cursor is the last row's moment and id. */
export async function listLogsOfField(
  tx: Transaction,
  scope: Scope,
  input: { fieldId: string; limit: number; before: { createdAt: Date; id: string } | null },
): Promise<LogRow[]> {
  const { before } = input;
  const older = before
    ? or(lt(logs.createdAt, before.createdAt), and(eq(logs.createdAt, before.createdAt), lt(logs.id, before.id)))
    : undefined;
  return tx
    .select()
    .from(logs)
    .where(and(isVisible(scope), eq(logs.fieldId, input.fieldId), older))
    .orderBy(desc(logs.createdAt), desc(logs.id))
    .limit(input.limit);
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

/** Whether any log of the organisation, other than `exceptLogId`, keeps these bytes. */
export async function isFileInUse(
  tx: Transaction,
  scope: Scope,
  input: { sha256: string; exceptLogId: string },
): Promise<boolean> {
  const [row] = await tx
    .select({ id: logs.id })
    .from(logs)
    .where(
      and(eq(logs.organisationId, scope.organisationId), eq(logs.sha256, input.sha256), ne(logs.id, input.exceptLogId)),
    )
    .limit(1);
  return row !== undefined;
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
  for (const table of ["pass_readings", "log_points", "log_results"]) {
    await tx.execute(
      sql`delete from ${sql.identifier(table)} where organisation_id = ${scope.organisationId} and log_id = ${logId}`,
    );
  }
  await tx.delete(logs).where(and(eq(logs.organisationId, scope.organisationId), eq(logs.id, logId)));
}

/** The field a log may be put in; null for an absent or foreign one, and for a viewer without a grant. */
export async function findFieldOfLogs(
  tx: Transaction,
  scope: Scope,
  fieldId: string,
): Promise<{ id: string; name: string; boundary: Boundary | null } | null> {
  const granted = sql`exists (select 1 from ${fieldGrants} where ${fieldGrants.organisationId} = ${scope.organisationId}
    and ${fieldGrants.userId} = ${scope.userId} and ${fieldGrants.fieldId} = ${fields.id})`;
  const [row] = await tx
    .select({ id: fields.id, name: fields.name, boundary: fields.boundary })
    .from(fields)
    .where(
      and(
        eq(fields.organisationId, scope.organisationId),
        eq(fields.id, fieldId),
        scope.role === "viewer" ? granted : undefined,
      ),
    );
  return row ?? null;
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
