import { foreignKey, index, jsonb, pgTable, primaryKey, text, timestamp } from "drizzle-orm/pg-core";
import { fields } from "@/db/schema/fields";
import type { NoteGeometry } from "@/lib/schemas/notes";

const instant = () => timestamp({ withTimezone: true, mode: "date" }).notNull().defaultNow();

/** What people wrote down about places of a field; it goes with its field. */
export const fieldNotes = pgTable(
  "field_notes",
  {
    organisationId: text().notNull(),
    id: text().notNull(),
    fieldId: text().notNull(),
    body: text().notNull(),
    /** Point or line, WGS 84. */
    geometry: jsonb().$type<NoteGeometry>().notNull(),
    createdBy: text(),
    createdAt: instant(),
    updatedAt: instant(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    foreignKey({
      columns: [table.organisationId, table.fieldId],
      foreignColumns: [fields.organisationId, fields.id],
    }).onDelete("cascade"),
    index("field_notes_field_index").on(table.organisationId, table.fieldId, table.createdAt),
  ],
);
