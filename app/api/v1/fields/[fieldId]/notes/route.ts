import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ListQuery } from "@/lib/schemas/listing";
import { Note, NoteInput, NoteList } from "@/lib/schemas/notes";
import { createNote, listNotes } from "@/lib/server/notes/notes";

export const GET = withScope<"fieldId">("notes.read", async ({ container, scope, params, url }) =>
  reply(NoteList, await listNotes(container, scope, { ...parseQuery(ListQuery, url), fieldId: params.fieldId })),
);

export const POST = withScope<"fieldId">("notes.write", async ({ container, scope, params, request }) => {
  const input = await parseBody(NoteInput, request);
  const note = await createNote(container, scope, { fieldId: params.fieldId, input });
  return reply(Note, note, { status: 201, headers: { location: `/api/v1/fields/${note.fieldId}/notes/${note.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
