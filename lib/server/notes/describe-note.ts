import "server-only";
import type { NoteRow } from "@/db/queries/field-notes";
import { measureShape } from "@/lib/drawing/measure-shape";
import type { Note } from "@/lib/schemas/notes";

/** A note as the API shows it. */
export function describeNote(row: NoteRow): Note {
  const { id, fieldId, body, geometry, createdBy, createdByName } = row;
  return {
    id,
    fieldId,
    text: body,
    geometry,
    lengthM: geometry.type === "Point" ? null : measureShape(geometry).lengthM,
    createdBy: createdBy !== null && createdByName !== null ? { id: createdBy, name: createdByName } : null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}
