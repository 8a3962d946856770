import { doublePrecision, pgTable, primaryKey, text, timestamp } from "drizzle-orm/pg-core";
import { organisations } from "@/db/schema/organisations";

/** Class edges that everyone of an organisation sees a channel in, on every field. */
export const legends = pgTable(
  "legends",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    /** Logged or derived, as addresses name it. */
    channel: text().notNull(),
    /** SI unit of the edges; a log whose channel of that name has another is not drawn in them. */
    unit: text().notNull(),
    /** Inner edges, rising. */
    edges: doublePrecision().array().notNull(),
    savedBy: text(),
    savedAt: timestamp({ withTimezone: true, mode: "date" }).notNull().defaultNow(),
  },
  (table) => [primaryKey({ columns: [table.organisationId, table.channel] })],
);
