CREATE TABLE "attempts" (
	"kind" text NOT NULL,
	"key_hash" "bytea" NOT NULL,
	"count" integer NOT NULL,
	"window_ends_at" timestamp with time zone NOT NULL,
	CONSTRAINT "attempts_kind_key_hash_pk" PRIMARY KEY("kind","key_hash")
);
--> statement-breakpoint
CREATE TABLE "measurements" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"sha256" "bytea" NOT NULL,
	"measuring_version" text NOT NULL,
	"format" text NOT NULL,
	"facets" integer NOT NULL,
	"origin" double precision[] NOT NULL,
	"box_min" double precision[] NOT NULL,
	"box_max" double precision[] NOT NULL,
	"volume" double precision,
	"volume_centre_from_origin" double precision[],
	"volume_second" double precision[],
	"area" double precision NOT NULL,
	"area_centre_from_origin" double precision[] NOT NULL,
	"area_second" double precision[] NOT NULL,
	"closed" boolean NOT NULL,
	"oriented" boolean NOT NULL,
	"outward" boolean NOT NULL,
	"turned" boolean NOT NULL,
	"defensible" boolean NOT NULL,
	"boundary_edges" integer NOT NULL,
	"non_manifold_edges" integer NOT NULL,
	"degenerate_facets" integer NOT NULL,
	"duplicate_facets" integer NOT NULL,
	"findings" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "measurements_organisation_id_id_key" UNIQUE("organisation_id","id"),
	CONSTRAINT "measurements_file_key" UNIQUE("organisation_id","sha256","measuring_version")
);
--> statement-breakpoint
CREATE TABLE "measuring_runs" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"stage" text DEFAULT 'waiting' NOT NULL,
	"progress" double precision DEFAULT 0 NOT NULL,
	"fence" integer DEFAULT 0 NOT NULL,
	"measurement_id" uuid,
	"error_code" text,
	"error_message" text,
	"error_byte" bigint,
	"error_line" bigint,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	CONSTRAINT "measuring_runs_revision_key" UNIQUE("organisation_id","revision_id"),
	CONSTRAINT "measuring_runs_state_is_known" CHECK ("measuring_runs"."state" in ('queued', 'running', 'done', 'failed')),
	CONSTRAINT "measuring_runs_stage_is_known" CHECK ("measuring_runs"."stage" in ('waiting', 'reading', 'measuring', 'storing')),
	CONSTRAINT "measuring_runs_end_has_a_reason" CHECK (("measuring_runs"."state" = 'done') = ("measuring_runs"."measurement_id" is not null) and ("measuring_runs"."state" = 'failed') = ("measuring_runs"."error_code" is not null))
);
--> statement-breakpoint
CREATE TABLE "parts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"project_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "parts_organisation_id_id_key" UNIQUE("organisation_id","id"),
	CONSTRAINT "parts_number_key" UNIQUE("organisation_id","project_id","number")
);
--> statement-breakpoint
CREATE TABLE "projects" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"name" text NOT NULL,
	"next_part_number" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	CONSTRAINT "projects_organisation_id_id_key" UNIQUE("organisation_id","id")
);
--> statement-breakpoint
CREATE TABLE "revisions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"upload_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	CONSTRAINT "revisions_organisation_id_id_key" UNIQUE("organisation_id","id"),
	CONSTRAINT "revisions_ordinal_key" UNIQUE("organisation_id","part_id","ordinal"),
	CONSTRAINT "revisions_upload_key" UNIQUE("organisation_id","upload_id")
);
--> statement-breakpoint
CREATE TABLE "settings" (
	"revision_id" uuid PRIMARY KEY NOT NULL,
	"organisation_id" uuid NOT NULL,
	"length_unit" text,
	"density_kg_m3" double precision,
	"axis" jsonb NOT NULL,
	"drive_speed_rad_per_s" double precision,
	"drive_time_s" double precision,
	"version" integer DEFAULT 1 NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "settings_density_is_positive" CHECK ("settings"."density_kg_m3" > 0)
);
--> statement-breakpoint
CREATE TABLE "uploads" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"project_id" uuid NOT NULL,
	"file_name" text NOT NULL,
	"size_bytes" bigint NOT NULL,
	"part_size_bytes" integer NOT NULL,
	"object_key" text NOT NULL,
	"multipart_id" text NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"sha256" "bytea",
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	"stored_at" timestamp with time zone,
	CONSTRAINT "uploads_organisation_id_id_key" UNIQUE("organisation_id","id"),
	CONSTRAINT "uploads_object_key_key" UNIQUE("object_key"),
	CONSTRAINT "uploads_state_is_known" CHECK ("uploads"."state" in ('open', 'stored', 'cancelled'))
);
--> statement-breakpoint
CREATE TABLE "invitations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"token_hash" "bytea" NOT NULL,
	"invited_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "invitations_role_is_known" CHECK ("invitations"."role" in ('administrator', 'engineer', 'reviewer', 'reader'))
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"organisation_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_organisation_id_user_id_pk" PRIMARY KEY("organisation_id","user_id"),
	CONSTRAINT "memberships_role_is_known" CHECK ("memberships"."role" in ('administrator', 'engineer', 'reviewer', 'reader'))
);
--> statement-breakpoint
CREATE TABLE "organisations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "password_resets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"token_hash" "bytea" NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"token_hash" "bytea" NOT NULL,
	"user_id" uuid NOT NULL,
	"organisation_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"idle_ends_at" timestamp with time zone NOT NULL,
	"absolute_ends_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_is_lower_case" CHECK ("users"."email" = lower("users"."email"))
);
--> statement-breakpoint
CREATE TABLE "audit_events" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid,
	"actor_id" uuid,
	"action" text NOT NULL,
	"subject_type" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"before" jsonb,
	"after" jsonb,
	"request_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" bigserial PRIMARY KEY NOT NULL,
	"organisation_id" uuid,
	"job" text NOT NULL,
	"payload" jsonb NOT NULL,
	"request_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"due_at" timestamp with time zone DEFAULT now() NOT NULL,
	"handed_out" integer DEFAULT 0 NOT NULL,
	"done_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "measurements" ADD CONSTRAINT "measurements_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measuring_runs" ADD CONSTRAINT "measuring_runs_revision_fkey" FOREIGN KEY ("organisation_id","revision_id") REFERENCES "public"."revisions"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "measuring_runs" ADD CONSTRAINT "measuring_runs_measurement_fkey" FOREIGN KEY ("organisation_id","measurement_id") REFERENCES "public"."measurements"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_project_fkey" FOREIGN KEY ("organisation_id","project_id") REFERENCES "public"."projects"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "projects" ADD CONSTRAINT "projects_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_part_fkey" FOREIGN KEY ("organisation_id","part_id") REFERENCES "public"."parts"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_upload_fkey" FOREIGN KEY ("organisation_id","upload_id") REFERENCES "public"."uploads"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_creator_fkey" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_changed_by_users_id_fk" FOREIGN KEY ("changed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_revision_fkey" FOREIGN KEY ("organisation_id","revision_id") REFERENCES "public"."revisions"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_project_fkey" FOREIGN KEY ("organisation_id","project_id") REFERENCES "public"."projects"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_invited_by_users_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "password_resets" ADD CONSTRAINT "password_resets_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_membership_fkey" FOREIGN KEY ("organisation_id","user_id") REFERENCES "public"."memberships"("organisation_id","user_id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "projects_name_key" ON "projects" USING btree ("organisation_id",lower("name"));--> statement-breakpoint
CREATE UNIQUE INDEX "invitations_token_hash_key" ON "invitations" USING btree ("token_hash");--> statement-breakpoint
CREATE UNIQUE INDEX "invitations_open_email_key" ON "invitations" USING btree ("organisation_id","email") WHERE accepted_at is null and withdrawn_at is null;--> statement-breakpoint
CREATE INDEX "memberships_user_id_index" ON "memberships" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "password_resets_token_hash_key" ON "password_resets" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "password_resets_user_id_index" ON "password_resets" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "sessions_token_hash_key" ON "sessions" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "sessions_membership_index" ON "sessions" USING btree ("organisation_id","user_id");--> statement-breakpoint
CREATE INDEX "sessions_user_id_index" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_key" ON "users" USING btree ("email");--> statement-breakpoint
CREATE INDEX "audit_events_subject_index" ON "audit_events" USING btree ("organisation_id","subject_id","created_at");--> statement-breakpoint
CREATE INDEX "outbox_open_index" ON "outbox" USING btree ("due_at") WHERE done_at is null;