import { and, asc, eq, getTableColumns, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { visibleField, visibleLog } from "@/db/queries/visibility";
import { fieldGrants, fields, logs } from "@/db/schema";
import { decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

export type FieldRow = typeof fields.$inferSelect & { logCount: number; lastLogAt: Date | null };
export type FieldValues = Pick<typeof fields.$inferInsert, "name" | "farm" | "landowner" | "boundary" | "areaM2">;

function isField(scope: Scope, fieldId: string) {
  return and(eq(fields.organisationId, scope.organisationId), eq(fields.id, fieldId), visibleField(scope, fields.id));
}

function selectFields(tx: Transaction, scope: Scope) {
  const seen = tx
    .select({
      fieldId: logs.fieldId,
      logCount: sql<number>`count(*)::int`.as("log_count"),
      lastLogAt: sql<string>`max(${logs.createdAt})`.as("last_log_at"),
    })
    .from(logs)
    .where(and(eq(logs.organisationId, scope.organisationId), visibleLog(scope, logs.fieldId, logs.kind)))
    .groupBy(logs.fieldId)
    .as("seen");
  return tx
    .select({ ...getTableColumns(fields), logCount: seen.logCount, lastLogAt: seen.lastLogAt })
    .from(fields)
    .leftJoin(seen, eq(seen.fieldId, fields.id));
}

type SelectedField = Awaited<ReturnType<typeof selectFields>>[number];

function toFieldRow(row: SelectedField): FieldRow {
  return { ...row, logCount: row.logCount ?? 0, lastLogAt: row.lastLogAt === null ? null : new Date(row.lastLogAt) };
}

/** Fields by name, a page at a time. */
export async function listFields(
  tx: Transaction,
  scope: Scope,
  query: ListQuery,
): Promise<{ rows: FieldRow[]; nextCursor: string | null }> {
  const after = decodeCursor(query.cursor);
  const own = eq(fields.organisationId, scope.organisationId);
  const later = after ? sql`(${fields.name}, ${fields.id}) > (${after[0]}, ${after[1]})` : undefined;
  const rows = await selectFields(tx, scope)
    .where(and(own, visibleField(scope, fields.id), later))
    .orderBy(asc(fields.name), asc(fields.id))
    .limit(query.limit + 1);
  return pageOf(rows.map(toFieldRow), query.limit, (row) => [row.name, row.id]);
}

export async function getField(tx: Transaction, scope: Scope, fieldId: string): Promise<FieldRow | null> {
  const [row] = await selectFields(tx, scope).where(isField(scope, fieldId));
  return row ? toFieldRow(row) : null;
}

export async function insertField(tx: Transaction, scope: Scope, input: FieldValues & { id: string }): Promise<void> {
  await tx.insert(fields).values({ ...input, organisationId: scope.organisationId });
}

export async function updateField(
  tx: Transaction,
  scope: Scope,
  input: { fieldId: string; changes: Partial<FieldValues>; at: Date },
): Promise<void> {
  await tx
    .update(fields)
    .set({ ...input.changes, updatedAt: input.at })
    .where(isField(scope, input.fieldId));
}

/** Removes the field and who was given it; shares go with it by foreign key. Its logs must be gone before. */
export async function deleteFieldRow(tx: Transaction, scope: Scope, fieldId: string): Promise<void> {
  const own = eq(fieldGrants.organisationId, scope.organisationId);
  await tx.delete(fieldGrants).where(and(own, eq(fieldGrants.fieldId, fieldId)));
  await tx.delete(fields).where(isField(scope, fieldId));
}

/** Which of these fields exist here and may be seen. */
export async function countFields(tx: Transaction, scope: Scope, fieldIds: string[]): Promise<number> {
  let found = 0;
  for (const fieldId of new Set(fieldIds)) {
    const rows = await tx.select({ id: fields.id }).from(fields).where(isField(scope, fieldId));
    found += rows.length;
  }
  return found;
}

/** Ids of every log in the field, seen or not: deleting a field must not overlook one. */
export async function listLogIdsOfField(tx: Transaction, scope: Scope, fieldId: string): Promise<string[]> {
  const rows = await tx
    .select({ id: logs.id })
    .from(logs)
    .where(and(eq(logs.organisationId, scope.organisationId), eq(logs.fieldId, fieldId)));
  return rows.map((row) => row.id);
}
