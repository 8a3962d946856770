CREATE TABLE "fields" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"name" text NOT NULL,
	"farm" text,
	"landowner" text,
	"boundary" jsonb,
	"area_m_2" double precision,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "fields_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "machines" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"body" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "machines_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "jobs" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"name" text NOT NULL,
	"subject" text NOT NULL,
	"payload" jsonb NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"ended_at" timestamp with time zone,
	CONSTRAINT "jobs_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "log_points" (
	"organisation_id" text NOT NULL,
	"log_id" text NOT NULL,
	"version" integer NOT NULL,
	"seq" integer NOT NULL,
	"pass" integer NOT NULL,
	"time" timestamp with time zone,
	"lon" double precision,
	"lat" double precision,
	"heading_deg" real,
	"speed_mps" real,
	"flags" integer NOT NULL,
	CONSTRAINT "log_points_organisation_id_log_id_version_seq_pk" PRIMARY KEY("organisation_id","log_id","version","seq")
) PARTITION BY HASH ("log_id");
--> statement-breakpoint
CREATE TABLE "log_results" (
	"organisation_id" text NOT NULL,
	"log_id" text NOT NULL,
	"version" integer NOT NULL,
	"kind" text NOT NULL,
	"body" jsonb NOT NULL,
	CONSTRAINT "log_results_organisation_id_log_id_version_kind_pk" PRIMARY KEY("organisation_id","log_id","version","kind")
);
--> statement-breakpoint
CREATE TABLE "logs" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"field_id" text NOT NULL,
	"machine_id" text,
	"machine_body" jsonb,
	"recipe_id" text,
	"mapping" jsonb,
	"name" text NOT NULL,
	"kind" text DEFAULT 'seeding' NOT NULL,
	"status" text DEFAULT 'queued' NOT NULL,
	"progress" real DEFAULT 0 NOT NULL,
	"stage" text DEFAULT 'Waiting for its turn' NOT NULL,
	"error" jsonb,
	"notes" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"counts" jsonb NOT NULL,
	"channels" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"started_at" timestamp with time zone,
	"ended_at" timestamp with time zone,
	"bbox" jsonb,
	"file_name" text NOT NULL,
	"file_bytes" bigint NOT NULL,
	"sha256" text NOT NULL,
	"version" integer DEFAULT 0 NOT NULL,
	"cancel_requested_at" timestamp with time zone,
	"uploaded_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "logs_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "pass_readings" (
	"organisation_id" text NOT NULL,
	"log_id" text NOT NULL,
	"version" integer NOT NULL,
	"pass" integer NOT NULL,
	"channel" text NOT NULL,
	"unit" text NOT NULL,
	"element" text NOT NULL,
	"first_seq" integer NOT NULL,
	"records" integer NOT NULL,
	"rows" integer NOT NULL,
	"west" double precision,
	"south" double precision,
	"east" double precision,
	"north" double precision,
	"values" "bytea" COMPRESSION lz4 NOT NULL,
	CONSTRAINT "pass_readings_organisation_id_log_id_version_channel_pass_first_seq_pk" PRIMARY KEY("organisation_id","log_id","version","channel","pass","first_seq")
) PARTITION BY HASH ("log_id");
--> statement-breakpoint
CREATE TABLE "recipes" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"name" text NOT NULL,
	"header_signature" text NOT NULL,
	"mapping" jsonb NOT NULL,
	"created_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "recipes_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"user_id" text,
	"action" text NOT NULL,
	"subject" text NOT NULL,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	CONSTRAINT "audit_entries_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "field_grants" (
	"organisation_id" text NOT NULL,
	"user_id" text NOT NULL,
	"field_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "field_grants_organisation_id_user_id_field_id_pk" PRIMARY KEY("organisation_id","user_id","field_id")
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"organisation_id" text NOT NULL,
	"user_id" text NOT NULL,
	"key" text NOT NULL,
	"route" text NOT NULL,
	"fingerprint" text NOT NULL,
	"status" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_organisation_id_user_id_route_key_pk" PRIMARY KEY("organisation_id","user_id","route","key")
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"user_id" text NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "organisations" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"slug" text NOT NULL,
	"is_demo" text DEFAULT 'no' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "organisations_slug_unique" UNIQUE("slug")
);
--> statement-breakpoint
CREATE TABLE "tokens" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"user_id" text NOT NULL,
	"name" text NOT NULL,
	"role" text NOT NULL,
	"token_hash" text NOT NULL,
	"expires_at" timestamp with time zone,
	"last_used_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "tokens_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"unit_system" text DEFAULT 'imperial' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" varchar(255) PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "shares" (
	"organisation_id" text NOT NULL,
	"id" text NOT NULL,
	"field_id" text NOT NULL,
	"log_id" text,
	"audience" text NOT NULL,
	"layers" jsonb NOT NULL,
	"token_hash" text NOT NULL,
	"passcode_hash" text,
	"allow_download" boolean DEFAULT false NOT NULL,
	"blur_location" boolean DEFAULT false NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"opened_count" integer DEFAULT 0 NOT NULL,
	"last_opened_at" timestamp with time zone,
	"created_by" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shares_organisation_id_id_pk" PRIMARY KEY("organisation_id","id")
);
--> statement-breakpoint
ALTER TABLE "fields" ADD CONSTRAINT "fields_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "logs" ADD CONSTRAINT "logs_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "logs" ADD CONSTRAINT "logs_organisation_id_field_id_fields_organisation_id_id_fk" FOREIGN KEY ("organisation_id","field_id") REFERENCES "public"."fields"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "recipes" ADD CONSTRAINT "recipes_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "field_grants" ADD CONSTRAINT "field_grants_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "field_grants" ADD CONSTRAINT "field_grants_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tokens" ADD CONSTRAINT "tokens_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tokens" ADD CONSTRAINT "tokens_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shares" ADD CONSTRAINT "shares_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shares" ADD CONSTRAINT "shares_organisation_id_field_id_fields_organisation_id_id_fk" FOREIGN KEY ("organisation_id","field_id") REFERENCES "public"."fields"("organisation_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "fields_name_index" ON "fields" USING btree ("organisation_id","name");--> statement-breakpoint
CREATE INDEX "jobs_subject_index" ON "jobs" USING btree ("organisation_id","subject");--> statement-breakpoint
CREATE INDEX "logs_field_index" ON "logs" USING btree ("organisation_id","field_id","created_at");--> statement-breakpoint
CREATE INDEX "logs_same_bytes_index" ON "logs" USING btree ("organisation_id","field_id","sha256");--> statement-breakpoint
CREATE INDEX "recipes_signature_index" ON "recipes" USING btree ("organisation_id","header_signature");--> statement-breakpoint
CREATE INDEX "audit_entries_at_index" ON "audit_entries" USING btree ("organisation_id","at");--> statement-breakpoint
CREATE UNIQUE INDEX "memberships_organisation_user_key" ON "memberships" USING btree ("organisation_id","user_id");--> statement-breakpoint
CREATE INDEX "memberships_user_index" ON "memberships" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "tokens_hash_index" ON "tokens" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "tokens_user_index" ON "tokens" USING btree ("organisation_id","user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_key" ON "users" USING btree ("email");--> statement-breakpoint
CREATE INDEX "shares_token_index" ON "shares" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "shares_field_index" ON "shares" USING btree ("organisation_id","field_id");