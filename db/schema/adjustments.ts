import { boolean, foreignKey, integer, jsonb, pgTable, primaryKey, text, timestamp } from "drizzle-orm/pg-core";
import { logs } from "@/db/schema/logs";
import type { Adjustments } from "@/lib/adjustments/adjustments";

/**
 * How a log is read without touching it, revision by revision; the highest is in force, none means as read. A revision is
 * never changed and never deleted but with its log: going back makes a new one.
 */
export const logAdjustments = pgTable(
  "log_adjustments",
  {
    organisationId: text().notNull(),
    logId: text().notNull(),
    /** From 1; 0 stands for the log as read. */
    revision: integer().notNull(),
    delaysS: jsonb().$type<Adjustments["delaysS"]>().notNull(),
    cleaning: jsonb().$type<Adjustments["cleaning"]>().notNull(),
    /** True where it changes no reading: the same answers as without it. */
    isAsRead: boolean().notNull(),
    note: text(),
    /** The earlier revision that this one went back to. */
    revertedTo: integer(),
    createdBy: text(),
    createdAt: timestamp({ withTimezone: true, mode: "date" }).notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.logId, table.revision] }),
    foreignKey({
      columns: [table.organisationId, table.logId],
      foreignColumns: [logs.organisationId, logs.id],
    }).onDelete("cascade"),
  ],
);
