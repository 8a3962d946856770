import type { Operation } from "@/lib/openapi/operation";
import { ListQuery } from "@/lib/schemas/listing";
import { Note, NoteInput, NoteList, NotePatch } from "@/lib/schemas/notes";

const tag = "Notes";

export const noteOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/fields/{fieldId}/notes",
    tag,
    permission: "notes.read",
    summary: "Notes of a field, oldest first",
    description: "What people wrote down about places and lines of the field.",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of notes", schema: NoteList }],
  },
  {
    method: "POST",
    path: "/api/v1/fields/{fieldId}/notes",
    tag,
    permission: "notes.write",
    summary: "Add a note",
    description: "A text with the point or line it is about. A field holds at most 1000 notes.",
    body: NoteInput,
    replies: [{ status: 201, description: "The note; its address in Location", schema: Note }],
    errors: ["conflict"],
  },
  {
    method: "PATCH",
    path: "/api/v1/fields/{fieldId}/notes/{noteId}",
    tag,
    permission: "notes.write",
    summary: "Change a note",
    description: "What is not named stays.",
    body: NotePatch,
    replies: [{ status: 200, description: "The note as it is now", schema: Note }],
  },
  {
    method: "DELETE",
    path: "/api/v1/fields/{fieldId}/notes/{noteId}",
    tag,
    permission: "notes.write",
    summary: "Delete a note",
    replies: [{ status: 204, description: "Gone" }],
  },
];
