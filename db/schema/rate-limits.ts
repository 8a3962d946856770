import { bigint, integer, pgTable, varchar } from "drizzle-orm/pg-core";

/** Counters of sign-in, token and share guesses; the columns are those rate-limiter-flexible expects. Admin only. */
export const rateLimits = pgTable("rate_limits", {
  key: varchar({ length: 255 }).primaryKey(),
  points: integer().notNull().default(0),
  expire: bigint({ mode: "number" }),
});
