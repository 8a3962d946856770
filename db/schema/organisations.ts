import { index, jsonb, pgTable, primaryKey, text, timestamp, uniqueIndex } from "drizzle-orm/pg-core";
import type { Role } from "@/lib/access/permissions";
import type { OwnUnits } from "@/lib/units/display-unit";

const createdAt = () => timestamp({ withTimezone: true, mode: "date" }).notNull().defaultNow();

export interface EndedSession {
  id: string;
  /** ISO 8601. */
  until: string;
}

export const organisations = pgTable("organisations", {
  id: text().primaryKey(),
  name: text().notNull(),
  /** Short name in addresses. */
  slug: text().notNull().unique(),
  isDemo: text().$type<"yes" | "no">().notNull().default("no"),
  createdAt: createdAt(),
});

/** People. Not scoped to an organisation: one person may belong to several. */
export const users = pgTable(
  "users",
  {
    id: text().primaryKey(),
    email: text().notNull(),
    name: text().notNull(),
    passwordHash: text().notNull(),
    unitSystem: text().$type<"metric" | "imperial">().notNull().default("imperial"),
    /** Units chosen one by one over the system's. */
    unitPreferences: jsonb().$type<OwnUnits>().notNull().default({}),
    contrast: text().$type<"device" | "more">().notNull().default("device"),
    /** Part of every session's stamp: another salt ends them all. */
    sessionSalt: text().notNull().default(""),
    /** Sessions signed out before their time, kept until they would have run out by themselves. */
    endedSessions: jsonb().$type<EndedSession[]>().notNull().default([]),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex("users_email_key").on(table.email)],
);

export const memberships = pgTable(
  "memberships",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    userId: text()
      .notNull()
      .references(() => users.id),
    role: text().$type<Role>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    uniqueIndex("memberships_organisation_user_key").on(table.organisationId, table.userId),
    index("memberships_user_index").on(table.userId),
  ],
);

/** Fields given to a viewer, or to an operator for harvest logs. */
export const fieldGrants = pgTable(
  "field_grants",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    userId: text()
      .notNull()
      .references(() => users.id),
    fieldId: text().notNull(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.organisationId, table.userId, table.fieldId] })],
);

export const tokens = pgTable(
  "tokens",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    userId: text()
      .notNull()
      .references(() => users.id),
    name: text().notNull(),
    role: text().$type<Role>().notNull(),
    /** SHA-256 of the token, hexadecimal. */
    tokenHash: text().notNull(),
    expiresAt: timestamp({ withTimezone: true, mode: "date" }),
    lastUsedAt: timestamp({ withTimezone: true, mode: "date" }),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    index("tokens_hash_index").on(table.tokenHash),
    index("tokens_user_index").on(table.organisationId, table.userId),
  ],
);

export const auditEntries = pgTable(
  "audit_entries",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    id: text().notNull(),
    at: createdAt(),
    userId: text(),
    action: text().notNull(),
    subject: text().notNull(),
    detail: jsonb().$type<Record<string, unknown>>().notNull().default({}),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.id] }),
    index("audit_entries_at_index").on(table.organisationId, table.at),
  ],
);

/** Replies to requests that carried an Idempotency-Key. */
export const idempotencyKeys = pgTable(
  "idempotency_keys",
  {
    organisationId: text()
      .notNull()
      .references(() => organisations.id),
    userId: text().notNull(),
    key: text().notNull(),
    route: text().notNull(),
    /** SHA-256 of the request's body; the same key with another body is a mistake of the caller's. */
    fingerprint: text().notNull(),
    /** The reply, its body sealed with the key itself; null while the first request is at work. */
    status: jsonb().$type<{ status: number; location: string | null; body: string } | null>(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.organisationId, table.userId, table.route, table.key] })],
);
