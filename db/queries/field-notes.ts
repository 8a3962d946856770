import { and, asc, eq, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { fieldNotes, users } from "@/db/schema";
import { cursorInstant, decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Scope } from "@/lib/scope";

export type NoteRow = typeof fieldNotes.$inferSelect & { createdByName: string | null };
export type NoteValues = Pick<NoteRow, "body" | "geometry">;
export interface NoteAddress {
  fieldId: string;
  noteId: string;
}

function isNote(scope: Scope, { fieldId, noteId }: NoteAddress) {
  return and(
    eq(fieldNotes.organisationId, scope.organisationId),
    eq(fieldNotes.fieldId, fieldId),
    eq(fieldNotes.id, noteId),
  );
}

function selectNotes(tx: Transaction) {
  return tx
    .select({ note: fieldNotes, createdByName: users.name })
    .from(fieldNotes)
    .leftJoin(users, eq(users.id, fieldNotes.createdBy));
}

/** Notes of one field, oldest first. */
export async function listNotes(tx: Transaction, scope: Scope, query: ListQuery & { fieldId: string }) {
  const after = decodeCursor(query.cursor);
  const later = after
    ? sql`(${fieldNotes.createdAt}, ${fieldNotes.id}) > (${cursorInstant(after).toISOString()}::timestamptz, ${after[1]})`
    : undefined;
  const rows = await selectNotes(tx)
    .where(and(eq(fieldNotes.organisationId, scope.organisationId), eq(fieldNotes.fieldId, query.fieldId), later))
    .orderBy(asc(fieldNotes.createdAt), asc(fieldNotes.id))
    .limit(query.limit + 1);
  const notes = rows.map(({ note, createdByName }): NoteRow => ({ ...note, createdByName }));
  return pageOf(notes, query.limit, (row) => [row.createdAt.toISOString(), row.id]);
}

export async function getNote(tx: Transaction, scope: Scope, address: NoteAddress): Promise<NoteRow | null> {
  const [row] = await selectNotes(tx).where(isNote(scope, address));
  return row ? { ...row.note, createdByName: row.createdByName } : null;
}

/** How many notes the field holds. */
export async function countNotes(tx: Transaction, scope: Scope, fieldId: string): Promise<number> {
  return tx.$count(
    fieldNotes,
    and(eq(fieldNotes.organisationId, scope.organisationId), eq(fieldNotes.fieldId, fieldId)),
  );
}

export async function insertNote(
  tx: Transaction,
  scope: Scope,
  input: NoteValues & NoteAddress & { at: Date },
): Promise<void> {
  const { noteId, at, ...values } = input;
  await tx.insert(fieldNotes).values({
    ...values,
    id: noteId,
    organisationId: scope.organisationId,
    createdBy: scope.userId || null,
    createdAt: at,
    updatedAt: at,
  });
}

export async function updateNoteRow(
  tx: Transaction,
  scope: Scope,
  input: NoteAddress & { changes: Partial<NoteValues>; at: Date },
): Promise<void> {
  await tx
    .update(fieldNotes)
    .set({ ...input.changes, updatedAt: input.at })
    .where(isNote(scope, input));
}

export async function deleteNoteRow(tx: Transaction, scope: Scope, address: NoteAddress): Promise<void> {
  await tx.delete(fieldNotes).where(isNote(scope, address));
}
