CREATE TABLE "legends" (
	"organisation_id" text NOT NULL,
	"channel" text NOT NULL,
	"unit" text NOT NULL,
	"edges" double precision[] NOT NULL,
	"saved_by" text,
	"saved_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "legends_organisation_id_channel_pk" PRIMARY KEY("organisation_id","channel")
);
--> statement-breakpoint
ALTER TABLE "legends" ADD CONSTRAINT "legends_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON "legends" TO coulterbook_app;--> statement-breakpoint
ALTER TABLE "legends" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "legends" FORCE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE POLICY own_organisation ON "legends"
	USING (organisation_id = current_setting('app.organisation_id', true))
	WITH CHECK (organisation_id = current_setting('app.organisation_id', true));
