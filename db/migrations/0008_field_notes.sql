CREATE TABLE "field_notes" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"field_id" text NOT NULL,
	"body" text NOT NULL,
	"geometry" jsonb NOT NULL,
	"created_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "field_notes_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
ALTER TABLE "field_notes" ADD CONSTRAINT "field_notes_organisation_id_field_id_fields_organisation_id_id_fk" FOREIGN KEY ("organisation_id","field_id") REFERENCES "public"."fields"("organisation_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "field_notes_field_index" ON "field_notes" USING btree ("organisation_id","field_id","created_at");--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON "field_notes" TO coulterbook_app;--> statement-breakpoint
ALTER TABLE "field_notes" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "field_notes" FORCE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE POLICY own_organisation ON "field_notes"
	USING (organisation_id = current_setting('app.organisation_id', true))
	WITH CHECK (organisation_id = current_setting('app.organisation_id', true));
