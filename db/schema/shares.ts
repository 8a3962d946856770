import { boolean, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, timestamp } from "drizzle-orm/pg-core";
import { fields } from "@/db/schema/fields";
import { organisations } from "@/db/schema/organisations";

const instant = () => timestamp({ withTimezone: true, mode: "date" });

export const shares = pgTable(
  "shares",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    fieldId: text().notNull(),
    logId: text(),
    audience: text().$type<"landowner" | "adviser" | "operator" | "public">().notNull(),
    layers: jsonb().$type<string[]>().notNull(),
    /** SHA-256 of the token in the address, hexadecimal; the token itself is never kept. */
    tokenHash: text().notNull(),
    passcodeHash: text(),
    allowDownload: boolean().notNull().default(false),
    blurLocation: boolean().notNull().default(false),
    expiresAt: instant().notNull(),
    revokedAt: instant(),
    openedCount: integer().notNull().default(0),
    lastOpenedAt: instant(),
    createdBy: text(),
    createdAt: instant().notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    foreignKey({
      columns: [table.organisationId, table.fieldId],
      foreignColumns: [fields.organisationId, fields.id],
    }).onDelete("cascade"),
    index("shares_token_index").on(table.tokenHash),
    index("shares_field_index").on(table.organisationId, table.fieldId),
  ],
);
