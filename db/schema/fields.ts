import { doublePrecision, index, jsonb, pgTable, primaryKey, text, timestamp } from "drizzle-orm/pg-core";
import { organisations } from "@/db/schema/organisations";
import type { Machine } from "@/lib/machines/machine";
import type { Boundary } from "@/lib/schemas/geometry";

const instant = () => timestamp({ withTimezone: true, mode: "date" }).notNull().defaultNow();

export const fields = pgTable(
  "fields",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    name: text().notNull(),
    farm: text(),
    landowner: text(),
    boundary: jsonb().$type<Boundary>(),
    areaM2: doublePrecision(),
    createdAt: instant(),
    updatedAt: instant(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    index("fields_name_index").on(table.organisationId, table.name),
  ],
);

export const machines = pgTable(
  "machines",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    kind: text().$type<"seeder" | "combine">().notNull(),
    name: text().notNull(),
    /** The whole machine as `MachineInput` (lib/machines/machine.ts). */
    body: jsonb().$type<Machine>().notNull(),
    createdAt: instant(),
    updatedAt: instant(),
  },
  (table) => [primaryKey({ columns: [table.organisationId, table.id] })],
);
