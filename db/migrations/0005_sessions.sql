ALTER TABLE "users" ADD COLUMN "session_salt" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "users" ADD COLUMN "ended_sessions" jsonb DEFAULT '[]'::jsonb NOT NULL;