import { sql } from "drizzle-orm";
import {
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  timestamp,
  uniqueIndex,
} from "drizzle-orm/pg-core";
import { organisations } from "@/db/schema/organisations";
import type { LogFormatId } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Machine } from "@/lib/machines/machine";

const instant = () => timestamp({ withTimezone: true, mode: "date" });

/** Column meanings a person confirmed, offered to the next file with the same header. Deleting only marks: logs name it. */
export const recipes = pgTable(
  "recipes",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    name: text().notNull(),
    /** The newest version. */
    version: integer().notNull().default(1),
    createdBy: text(),
    createdAt: instant().notNull().defaultNow(),
    usedAt: instant(),
    deletedAt: instant(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    uniqueIndex("recipes_name_index")
      .on(table.organisationId, table.name)
      .where(sql`deleted_at is null`),
  ],
);

/** What a recipe said at one time; rows are added, never changed. */
export const recipeVersions = pgTable(
  "recipe_versions",
  {
    organisationId: text().notNull(),
    recipeId: text().notNull(),
    version: integer().notNull(),
    format: text().$type<LogFormatId>().notNull(),
    columnNames: jsonb().$type<string[]>().notNull(),
    headerSignature: text().notNull(),
    mapping: jsonb().$type<LogMapping>().notNull(),
    machine: jsonb().$type<Machine>(),
    note: text(),
    createdBy: text(),
    createdAt: instant().notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.recipeId, table.version] }),
    foreignKey({
      columns: [table.organisationId, table.recipeId],
      foreignColumns: [recipes.organisationId, recipes.id],
    }),
    // A header of thousands of columns is longer than an index entry may be: its digest is indexed.
    index("recipe_versions_signature_index").on(table.organisationId, sql`md5(${table.headerSignature})`),
  ],
);
