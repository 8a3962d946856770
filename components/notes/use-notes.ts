"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { queryKeys } from "@/components/hooks/query-keys";
import { useRemove, useWithoutRemoved } from "@/components/removals/use-removals";
import { changeNote, createNote, deleteNote, listNotes } from "@/lib/api/notes";
import type { Note, NoteInput } from "@/lib/schemas/notes";

function notesKey(fieldId: string) {
  return [...queryKeys.field(fieldId), "notes"] as const;
}

/** A field's notes, without those that are being removed. */
export function useNotes(fieldId: string): Note[] | undefined {
  const { data } = useQuery({ queryKey: notesKey(fieldId), queryFn: () => listNotes(fieldId) });
  return useWithoutRemoved(data?.items);
}

/** Adds a note, or changes the one that is given. */
export function useSaveNote(fieldId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ note, input }: { note: Note | null; input: NoteInput }) =>
      note ? changeNote(note, input) : createNote(fieldId, input),
    onSuccess: () => client.invalidateQueries({ queryKey: notesKey(fieldId) }),
  });
}

/** Removes a note, after a time in which that can be called off. */
export function useRemoveNote() {
  const remove = useRemove();
  return (note: Note) =>
    remove({
      id: note.id,
      name: `Note “${shortText(note.text)}”`,
      remove: () => deleteNote(note),
      lists: [{ queryKey: notesKey(note.fieldId) }],
    });
}

const SHORT_CHARACTERS = 40;

/** The beginning of a note, to tell it from the others. */
export function shortText(text: string): string {
  const line = text.split("\n")[0] ?? "";
  return line.length > SHORT_CHARACTERS ? `${line.slice(0, SHORT_CHARACTERS).trimEnd()}…` : line;
}
