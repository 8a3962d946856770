CREATE TABLE "recipe_versions" (
	"organisation_id" text NOT NULL,
	"recipe_id" text NOT NULL,
	"version" integer NOT NULL,
	"format" text NOT NULL,
	"column_names" jsonb NOT NULL,
	"header_signature" text NOT NULL,
	"mapping" jsonb NOT NULL,
	"machine" jsonb,
	"note" text,
	"created_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "recipe_versions_organisation_id_recipe_id_version_pk" PRIMARY KEY("organisation_id","recipe_id","version")
);
--> statement-breakpoint
DROP INDEX "recipes_signature_index";--> statement-breakpoint
ALTER TABLE "logs" ADD COLUMN "recipe_version" integer;--> statement-breakpoint
ALTER TABLE "recipes" ADD COLUMN "version" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "recipes" ADD COLUMN "deleted_at" timestamp with time zone;--> statement-breakpoint
-- Recipes kept so far become versions: those of one name, the versions of the oldest of them.
CREATE TEMPORARY TABLE "ranked_recipes" ON COMMIT DROP AS
	SELECT "organisation_id", "id",
		first_value("id") OVER (PARTITION BY "organisation_id", "name" ORDER BY "created_at", "id") AS "kept_id",
		(row_number() OVER (PARTITION BY "organisation_id", "name" ORDER BY "created_at", "id"))::integer AS "version"
	FROM "recipes";--> statement-breakpoint
INSERT INTO "recipe_versions" ("organisation_id", "recipe_id", "version", "format", "column_names", "header_signature", "mapping", "created_by", "created_at")
	SELECT r."organisation_id", k."kept_id", k."version", r."header_signature"::jsonb ->> 0, r."header_signature"::jsonb - 0 - 0,
		r."header_signature", r."mapping", r."created_by", r."created_at"
	FROM "recipes" r JOIN "ranked_recipes" k USING ("organisation_id", "id");--> statement-breakpoint
UPDATE "logs" l SET "recipe_id" = k."kept_id", "recipe_version" = k."version"
	FROM "ranked_recipes" k WHERE k."organisation_id" = l."organisation_id" AND k."id" = l."recipe_id";--> statement-breakpoint
UPDATE "recipes" r SET "version" = n."newest"
	FROM (SELECT "organisation_id", "kept_id", max("version") AS "newest" FROM "ranked_recipes" GROUP BY 1, 2) n
	WHERE n."organisation_id" = r."organisation_id" AND n."kept_id" = r."id";--> statement-breakpoint
DELETE FROM "recipes" r USING "ranked_recipes" k
	WHERE k."organisation_id" = r."organisation_id" AND k."id" = r."id" AND k."kept_id" <> k."id";--> statement-breakpoint
DROP TABLE "ranked_recipes";--> statement-breakpoint
ALTER TABLE "recipe_versions" ADD CONSTRAINT "recipe_versions_organisation_id_recipe_id_recipes_organisation_id_id_fk" FOREIGN KEY ("organisation_id","recipe_id") REFERENCES "public"."recipes"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "recipe_versions_signature_index" ON "recipe_versions" USING btree ("organisation_id",md5("header_signature"));--> statement-breakpoint
CREATE UNIQUE INDEX "recipes_name_index" ON "recipes" USING btree ("organisation_id","name") WHERE deleted_at is null;--> statement-breakpoint
ALTER TABLE "recipes" DROP COLUMN "header_signature";--> statement-breakpoint
ALTER TABLE "recipes" DROP COLUMN "mapping";--> statement-breakpoint
-- What a version said stays said: it may be added and read, never changed.
GRANT SELECT, INSERT ON "recipe_versions" TO coulterbook_app;--> statement-breakpoint
ALTER TABLE "recipe_versions" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "recipe_versions" FORCE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE POLICY own_organisation ON "recipe_versions"
	USING (organisation_id = current_setting('app.organisation_id', true))
	WITH CHECK (organisation_id = current_setting('app.organisation_id', true));
