ALTER TABLE "users" ADD COLUMN "unit_preferences" jsonb DEFAULT '{}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "users" ADD COLUMN "contrast" text DEFAULT 'device' NOT NULL;