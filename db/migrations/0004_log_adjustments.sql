CREATE TABLE "log_adjustments" (
	"organisation_id" text NOT NULL,
	"log_id" text NOT NULL,
	"revision" integer NOT NULL,
	"delays_s" jsonb NOT NULL,
	"cleaning" jsonb NOT NULL,
	"is_as_read" boolean NOT NULL,
	"note" text,
	"reverted_to" integer,
	"created_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "log_adjustments_organisation_id_log_id_revision_pk" PRIMARY KEY("organisation_id","log_id","revision")
);
--> statement-breakpoint
ALTER TABLE "logs" ADD COLUMN "adjustment_revision" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "log_adjustments" ADD CONSTRAINT "log_adjustments_organisation_id_log_id_logs_organisation_id_id_fk" FOREIGN KEY ("organisation_id","log_id") REFERENCES "public"."logs"("organisation_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
-- A revision stays as it was made: added and read, never changed; it goes with its log.
GRANT SELECT, INSERT ON "log_adjustments" TO coulterbook_app;--> statement-breakpoint
ALTER TABLE "log_adjustments" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "log_adjustments" FORCE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE POLICY own_organisation ON "log_adjustments"
	USING (organisation_id = current_setting('app.organisation_id', true))
	WITH CHECK (organisation_id = current_setting('app.organisation_id', true));
