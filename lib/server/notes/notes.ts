import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import {
  countNotes,
  deleteNoteRow,
  getNote,
  insertNote,
  listNotes as listNoteRows,
  updateNoteRow,
  type NoteAddress,
} from "@/db/queries/field-notes";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import type { ListQuery } from "@/lib/schemas/listing";
import type { Note, NoteInput, NotePatch } from "@/lib/schemas/notes";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { describeNote } from "@/lib/server/notes/describe-note";

/** A field's map holds no more without hiding what it shows. */
const MOST_NOTES = 1000;
/** As much of a note as tells it from another in the audit log. */
const TOLD_CHARACTERS = 80;

/** @throws AppError `not_found` for a note of a field that may not be seen, and for an absent one */
async function readNoteIn(tx: Transaction, scope: Scope, address: NoteAddress): Promise<Note> {
  await getFieldOrThrow(tx, scope, address.fieldId);
  const row = await getNote(tx, scope, address);
  if (!row) throw new AppError("not_found", "There is no such note.");
  return describeNote(row);
}

export async function listNotes(_container: Container, scope: Scope, query: ListQuery & { fieldId: string }) {
  return withOrganisation(scope, async (tx) => {
    await getFieldOrThrow(tx, scope, query.fieldId);
    const { rows, nextCursor } = await listNoteRows(tx, scope, query);
    return { items: rows.map(describeNote), nextCursor };
  });
}

export async function createNote(
  container: Container,
  scope: Scope,
  { fieldId, input }: { fieldId: string; input: NoteInput },
): Promise<Note> {
  const address = { fieldId, noteId: newId("note") };
  return withOrganisation(scope, async (tx) => {
    await getFieldOrThrow(tx, scope, fieldId);
    if ((await countNotes(tx, scope, fieldId)) >= MOST_NOTES) {
      throw new AppError("conflict", `The field holds ${MOST_NOTES} notes already. Delete some first.`, {
        detailCode: "too_many_notes",
      });
    }
    const { text, geometry } = input;
    await insertNote(tx, scope, { ...address, body: text, geometry, at: container.clock.now() });
    await recordAudit(tx, scope, { action: "note.create", subject: address.noteId, detail: tell(fieldId, text) });
    return readNoteIn(tx, scope, address);
  });
}

/** Changes what is named and leaves the rest. */
export async function updateNote(
  container: Container,
  scope: Scope,
  { patch, ...address }: NoteAddress & { patch: NotePatch },
): Promise<Note> {
  return withOrganisation(scope, async (tx) => {
    const known = await readNoteIn(tx, scope, address);
    const { text = known.text, geometry = known.geometry } = patch;
    await updateNoteRow(tx, scope, { ...address, changes: { body: text, geometry }, at: container.clock.now() });
    await recordAudit(tx, scope, { action: "note.update", subject: known.id, detail: tell(known.fieldId, text) });
    return readNoteIn(tx, scope, address);
  });
}

export async function deleteNote(_container: Container, scope: Scope, address: NoteAddress): Promise<void> {
  await withOrganisation(scope, async (tx) => {
    const { id, fieldId, text } = await readNoteIn(tx, scope, address);
    await deleteNoteRow(tx, scope, address);
    await recordAudit(tx, scope, { action: "note.delete", subject: id, detail: tell(fieldId, text) });
  });
}

function tell(fieldId: string, text: string) {
  return { fieldId, name: text.slice(0, TOLD_CHARACTERS) };
}
