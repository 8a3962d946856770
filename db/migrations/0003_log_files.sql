CREATE TABLE "log_files" (
	"organisation_id" text NOT NULL,
	"log_id" text NOT NULL,
	"part" integer NOT NULL,
	"file_name" text NOT NULL,
	"file_bytes" bigint NOT NULL,
	"sha256" text NOT NULL,
	"copies" jsonb DEFAULT '[]'::jsonb NOT NULL,
	CONSTRAINT "log_files_organisation_id_log_id_part_pk" PRIMARY KEY("organisation_id","log_id","part")
);
--> statement-breakpoint
CREATE INDEX "log_files_bytes_index" ON "log_files" USING btree ("organisation_id","sha256");--> statement-breakpoint
-- Logs kept so far came in one file each. Their rows are read past the policy: a migration belongs to no organisation.
ALTER TABLE "logs" NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
INSERT INTO "log_files" ("organisation_id", "log_id", "part", "file_name", "file_bytes", "sha256")
	SELECT "organisation_id", "id", 0, "file_name", "file_bytes", "sha256" FROM "logs";--> statement-breakpoint
ALTER TABLE "logs" FORCE ROW LEVEL SECURITY;--> statement-breakpoint
-- What was uploaded stays as it was: added, read and removed with its log, never changed.
GRANT SELECT, INSERT, DELETE ON "log_files" TO coulterbook_app;--> statement-breakpoint
ALTER TABLE "log_files" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "log_files" FORCE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE POLICY own_organisation ON "log_files"
	USING (organisation_id = current_setting('app.organisation_id', true))
	WITH CHECK (organisation_id = current_setting('app.organisation_id', true));
