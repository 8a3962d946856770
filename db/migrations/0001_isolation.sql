-- Partitions, the application's role, its grants and row-level security. Written by hand.
-- A later migration that adds a table must grant and guard it too: nothing is granted by default, so that a forgotten
-- table is unreachable rather than open. tests/db/isolation.test.ts fails for a table left without a policy.

DO $$
DECLARE
  parent text;
  remainder int;
BEGIN
  FOREACH parent IN ARRAY ARRAY['log_points', 'pass_readings'] LOOP
    FOR remainder IN 0..7 LOOP
      EXECUTE format('CREATE TABLE %I PARTITION OF %I FOR VALUES WITH (MODULUS 8, REMAINDER %s)',
        parent || '_' || remainder, parent, remainder);
    END LOOP;
  END LOOP;
END $$;
--> statement-breakpoint
-- Roles belong to the whole cluster: two databases may be migrated at the same moment.
DO $$
BEGIN
  IF NOT EXISTS (SELECT FROM pg_roles WHERE rolname = 'coulterbook_app') THEN
    CREATE ROLE coulterbook_app LOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE NOBYPASSRLS NOINHERIT;
  END IF;
EXCEPTION WHEN duplicate_object OR unique_violation THEN
  NULL;
END $$;
--> statement-breakpoint
REVOKE ALL ON SCHEMA public FROM PUBLIC;
--> statement-breakpoint
ALTER DEFAULT PRIVILEGES IN SCHEMA public REVOKE ALL ON TABLES FROM PUBLIC;
--> statement-breakpoint
ALTER DEFAULT PRIVILEGES IN SCHEMA public REVOKE ALL ON FUNCTIONS FROM PUBLIC;
--> statement-breakpoint
GRANT USAGE ON SCHEMA public TO coulterbook_app;
--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON
  "fields", "machines", "jobs", "logs", "log_points", "pass_readings", "log_results", "recipes",
  "field_grants", "idempotency_keys", "memberships", "tokens", "shares"
TO coulterbook_app;
--> statement-breakpoint
-- What was done stays done: the application may add to the audit log and read it, never change it.
GRANT SELECT, INSERT ON "audit_entries" TO coulterbook_app;
--> statement-breakpoint
GRANT SELECT ON "organisations" TO coulterbook_app;
--> statement-breakpoint
-- Names of the organisation's own members, never a password hash.
GRANT SELECT ("id", "email", "name", "unit_system", "created_at") ON "users" TO coulterbook_app;
--> statement-breakpoint
-- Every table with organisation_id (partitions too: they get no grant, and no rows for anyone who reaches one directly).
DO $$
DECLARE
  guarded record;
BEGIN
  FOR guarded IN
    SELECT c.oid::regclass AS name
    FROM pg_class c
    JOIN pg_namespace n ON n.oid = c.relnamespace AND n.nspname = 'public'
    JOIN pg_attribute a ON a.attrelid = c.oid AND a.attname = 'organisation_id' AND NOT a.attisdropped
    WHERE c.relkind IN ('r', 'p')
  LOOP
    EXECUTE format('ALTER TABLE %s ENABLE ROW LEVEL SECURITY', guarded.name);
    EXECUTE format('ALTER TABLE %s FORCE ROW LEVEL SECURITY', guarded.name);
    EXECUTE format('CREATE POLICY own_organisation ON %s
      USING (organisation_id = current_setting(''app.organisation_id'', true))
      WITH CHECK (organisation_id = current_setting(''app.organisation_id'', true))', guarded.name);
  END LOOP;
END $$;
--> statement-breakpoint
ALTER TABLE "organisations" ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE "organisations" FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
CREATE POLICY own_organisation ON "organisations"
  USING ("id" = current_setting('app.organisation_id', true));
--> statement-breakpoint
ALTER TABLE "users" ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE "users" FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
-- The inner query runs under the policy of memberships, so it sees this organisation's members only.
CREATE POLICY fellow_members ON "users" FOR SELECT
  USING (EXISTS (SELECT FROM "memberships" m WHERE m."user_id" = "users"."id"));
