import {
  bigint,
  customType,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  real,
  text,
  timestamp,
} from "drizzle-orm/pg-core";
import { fields } from "@/db/schema/fields";
import { organisations } from "@/db/schema/organisations";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Machine } from "@/lib/machines/machine";
import type { Log } from "@/lib/schemas/logs";

const instant = () => timestamp({ withTimezone: true, mode: "date" });
const bytea = customType<{ data: Buffer }>({ dataType: () => "bytea" });

export const logs = pgTable(
  "logs",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    fieldId: text().notNull(),
    machineId: text(),
    /** The machine as it was when this version was built. */
    machineBody: jsonb().$type<Machine>(),
    recipeId: text(),
    /** The version of the recipe that this log was read with. */
    recipeVersion: integer(),
    mapping: jsonb().$type<LogMapping>(),
    name: text().notNull(),
    kind: text().$type<Log["kind"]>().notNull().default("seeding"),
    status: text().$type<Log["status"]>().notNull().default("queued"),
    progress: real().notNull().default(0),
    stage: text().notNull().default("Waiting for its turn"),
    error: jsonb().$type<Log["error"]>(),
    notes: jsonb().$type<Log["notes"]>().notNull().default([]),
    counts: jsonb().$type<Log["counts"]>().notNull(),
    channels: jsonb().$type<Log["channels"]>().notNull().default([]),
    startedAt: instant(),
    endedAt: instant(),
    bbox: jsonb().$type<Log["bbox"]>(),
    fileName: text().notNull(),
    fileBytes: bigint({ mode: "number" }).notNull(),
    sha256: text().notNull(),
    /** Version of the derived data that readers see; 0 before the first. */
    version: integer().notNull().default(0),
    /** Revision of the adjustments in force; 0 where they change no reading (see `log_adjustments`). */
    adjustmentRevision: integer().notNull().default(0),
    /** Set when a person asked to stop; the worker looks between stages. */
    cancelRequestedAt: instant(),
    uploadedBy: text(),
    createdAt: instant().notNull().defaultNow(),
    updatedAt: instant().notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    foreignKey({ columns: [table.organisationId, table.fieldId], foreignColumns: [fields.organisationId, fields.id] }),
    index("logs_field_index").on(table.organisationId, table.fieldId, table.createdAt),
    index("logs_same_bytes_index").on(table.organisationId, table.fieldId, table.sha256),
  ],
);

/** One row a record: plain SQL can read the points. Hash-partitioned by log (see the first migration). */
export const logPoints = pgTable(
  "log_points",
  {
    organisationId: text().notNull(),
    logId: text().notNull(),
    version: integer().notNull(),
    seq: integer().notNull(),
    pass: integer().notNull(),
    time: timestamp({ withTimezone: true, mode: "date" }),
    lon: doublePrecision(),
    lat: doublePrecision(),
    headingDeg: real(),
    speedMps: real(),
    flags: integer().notNull(),
  },
  (table) => [primaryKey({ columns: [table.organisationId, table.logId, table.version, table.seq] })],
);

/**
 * One row a pass and channel. `values` is packed little-endian Float32, or Float64 for the placing channels
 * (`time` in ms, `longitude`, `latitude`): row-major by record. Pass 0 holds the records that belong to no pass.
 * Hash-partitioned by log; lz4.
 */
export const passReadings = pgTable(
  "pass_readings",
  {
    organisationId: text().notNull(),
    logId: text().notNull(),
    version: integer().notNull(),
    pass: integer().notNull(),
    channel: text().notNull(),
    unit: text().notNull(),
    element: text().$type<"f4" | "f8" | "u4">().notNull(),
    firstSeq: integer().notNull(),
    records: integer().notNull(),
    rows: integer().notNull(),
    west: doublePrecision(),
    south: doublePrecision(),
    east: doublePrecision(),
    north: doublePrecision(),
    values: bytea().notNull(),
  },
  (table) => [
    primaryKey({
      columns: [table.organisationId, table.logId, table.version, table.channel, table.pass, table.firstSeq],
    }),
  ],
);

/** Derived answers of one version of a log: passes, row statistics by channel, coverage, verdict. */
export const logResults = pgTable(
  "log_results",
  {
    organisationId: text().notNull(),
    logId: text().notNull(),
    version: integer().notNull(),
    /** `passes`, `rows:<channel>`, `coverage`, `verdict`. */
    kind: text().notNull(),
    body: jsonb().$type<unknown>().notNull(),
  },
  (table) => [primaryKey({ columns: [table.organisationId, table.logId, table.version, table.kind] })],
);
