import { bigint, index, integer, jsonb, pgTable, primaryKey, text } from "drizzle-orm/pg-core";

/** The files that a log was uploaded as, one row each; the bytes lie in the object store under their hash. */
export const logFiles = pgTable(
  "log_files",
  {
    organisationId: text().notNull(),
    logId: text().notNull(),
    /** In the order sent, from 0. */
    part: integer().notNull(),
    fileName: text().notNull(),
    fileBytes: bigint({ mode: "number" }).notNull(),
    sha256: text().notNull(),
    /** Names of further files of the same upload with these very bytes. */
    copies: jsonb().$type<string[]>().notNull().default([]),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.logId, table.part] }),
    index("log_files_bytes_index").on(table.organisationId, table.sha256),
  ],
);
