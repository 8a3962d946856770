"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { queryKeys } from "@/components/hooks/query-keys";
import { usePages } from "@/components/hooks/use-pages";
import { useRemove } from "@/components/removals/use-removals";
import { changeField, createField, deleteField, getField, putBoundary, putBoundaryFile } from "@/lib/api/client";
import { fieldPage, listAll } from "@/lib/api/list-pages";
import type { FieldInput, FieldPatch } from "@/lib/schemas/fields";

/** All fields the person may see, for choosing one. */
export function useFields() {
  return useQuery({ queryKey: queryKeys.fields, queryFn: () => listAll(fieldPage) });
}

/** The same a page at a time, for looking at them. */
export function useFieldPages() {
  return usePages({ queryKey: queryKeys.fields, load: fieldPage });
}

export function useField(fieldId: string | undefined) {
  return useQuery({
    queryKey: queryKeys.field(fieldId ?? ""),
    queryFn: () => getField(fieldId ?? ""),
    enabled: fieldId !== undefined,
  });
}

/** What to do with a boundary: leave it, or set it from a file or from pasted GeoJSON. */
export type BoundaryChange = { kind: "none" } | { kind: "file"; file: File } | { kind: "geometry"; geometry: unknown };

async function sendBoundary(fieldId: string, change: BoundaryChange) {
  if (change.kind === "file") return putBoundaryFile(fieldId, change.file);
  if (change.kind === "geometry") return putBoundary(fieldId, change.geometry);
  return null;
}

/** Makes a field, then sets its boundary. A refused boundary takes the new field away again: no half-made fields. */
export function useCreateField() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: async ({ input, boundary }: { input: FieldInput; boundary: BoundaryChange }) => {
      const field = await createField(input);
      try {
        await sendBoundary(field.id, boundary);
      } catch (error) {
        await deleteField(field.id);
        throw error;
      }
      return field;
    },
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.fields }),
  });
}

export function useChangeField(fieldId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: async ({ patch, boundary }: { patch: FieldPatch; boundary: BoundaryChange }) => {
      await changeField(fieldId, patch);
      await sendBoundary(fieldId, boundary);
    },
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.fields }),
  });
}

/** Takes a field and its logs away after a time for calling it off. */
export function useDeleteField() {
  const remove = useRemove();
  return ({ id, name }: { id: string; name: string }) =>
    remove({
      id,
      name,
      remove: () => deleteField(id, true),
      // Not what is asked under the deleted field itself: that would only be refused.
      lists: [
        { queryKey: queryKeys.fields, exact: true },
        { queryKey: [...queryKeys.fields, "pages"], exact: true },
      ],
    });
}
