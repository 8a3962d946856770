import { parseBody } from "@/app/_server/parse-body";
import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Note, NotePatch } from "@/lib/schemas/notes";
import { deleteNote, updateNote } from "@/lib/server/notes/notes";

export const PATCH = withScope<"fieldId" | "noteId">("notes.write", async ({ container, scope, params, request }) => {
  const patch = await parseBody(NotePatch, request);
  return reply(Note, await updateNote(container, scope, { ...params, patch }));
});

export const DELETE = withScope<"fieldId" | "noteId">("notes.write", async ({ container, scope, params }) => {
  await deleteNote(container, scope, params);
  return replyNothing();
});

export { refuseMethod as GET, refuseMethod as POST, refuseMethod as PUT } from "@/app/_server/refuse-method";
