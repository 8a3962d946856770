import { index, integer, jsonb, pgTable, primaryKey, text, timestamp } from "drizzle-orm/pg-core";
import { organisations } from "@/db/schema/organisations";

const instant = () => timestamp({ withTimezone: true, mode: "date" });

/** What was asked of the worker and how it went; the queue itself is pg-boss's own schema. */
export const jobs = pgTable(
  "jobs",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    /** The queue's job id. */
    id: text().notNull(),
    name: text().notNull(),
    subject: text().notNull(),
    payload: jsonb().$type<Record<string, unknown>>().notNull(),
    state: text().$type<"queued" | "running" | "done" | "failed" | "cancelled">().notNull().default("queued"),
    attempts: integer().notNull().default(0),
    createdAt: instant().notNull().defaultNow(),
    startedAt: instant(),
    endedAt: instant(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    index("jobs_subject_index").on(table.organisationId, table.subject),
  ],
);
