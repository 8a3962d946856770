import { listAll, type Page } from "@/lib/api/list-pages";
import { requestJson, requestNothing } from "@/lib/api/request-json";
import { Note, NoteList, type NoteInput, type NotePatch } from "@/lib/schemas/notes";

function notesPath(fieldId: string): string {
  return `/api/v1/fields/${fieldId}/notes`;
}

/** Every note of a field, oldest first. */
export function listNotes(fieldId: string): Promise<Page<Note>> {
  return listAll((cursor, limit = 500) => {
    const after = cursor === null ? "" : `&cursor=${encodeURIComponent(cursor)}`;
    return requestJson(NoteList, `${notesPath(fieldId)}?limit=${limit}${after}`);
  });
}

export const createNote = (fieldId: string, body: NoteInput) =>
  requestJson(Note, notesPath(fieldId), { method: "POST", body, idempotencyKey: crypto.randomUUID() });

export const changeNote = ({ fieldId, id }: Pick<Note, "fieldId" | "id">, body: NotePatch) =>
  requestJson(Note, `${notesPath(fieldId)}/${id}`, { method: "PATCH", body });

export const deleteNote = ({ fieldId, id }: Pick<Note, "fieldId" | "id">) =>
  requestNothing(`${notesPath(fieldId)}/${id}`, { method: "DELETE" });
