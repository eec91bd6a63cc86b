CREATE TABLE "materials" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"name" text NOT NULL,
	"group_name" text NOT NULL,
	"density_kg_m3" double precision NOT NULL,
	"density_spread_kg_m3" double precision NOT NULL,
	"spread_basis" text NOT NULL,
	"source" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"archived_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "materials_organisation_id_id_key" UNIQUE("organisation_id","id"),
	CONSTRAINT "materials_density_is_positive" CHECK ("materials"."density_kg_m3" > 0),
	CONSTRAINT "materials_spread_is_not_negative" CHECK ("materials"."density_spread_kg_m3" >= 0)
);
--> statement-breakpoint
CREATE TABLE "part_summaries" (
	"part_id" uuid PRIMARY KEY NOT NULL,
	"organisation_id" uuid NOT NULL,
	"project_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"name_key" text NOT NULL,
	"file_key" text NOT NULL,
	"material_key" text NOT NULL,
	"search_text" text NOT NULL,
	"state" text NOT NULL,
	"deleted_at" timestamp with time zone,
	"changed_at" timestamp with time zone NOT NULL,
	"length_unit_m" double precision,
	"size_m" double precision,
	"volume_m3" double precision,
	"mass_kg" double precision,
	"moment_1_kg_m2" double precision,
	"moment_2_kg_m2" double precision,
	"moment_3_kg_m2" double precision
);
--> statement-breakpoint
CREATE TABLE "settings_change_items" (
	"organisation_id" uuid NOT NULL,
	"change_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"before" jsonb NOT NULL,
	"version_after" integer NOT NULL,
	CONSTRAINT "settings_change_items_organisation_id_change_id_revision_id_pk" PRIMARY KEY("organisation_id","change_id","revision_id")
);
--> statement-breakpoint
CREATE TABLE "settings_changes" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"organisation_id" uuid NOT NULL,
	"project_id" uuid NOT NULL,
	"reverses" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	CONSTRAINT "settings_changes_organisation_id_id_key" UNIQUE("organisation_id","id"),
	CONSTRAINT "settings_changes_reverses_key" UNIQUE("organisation_id","reverses")
);
--> statement-breakpoint
ALTER TABLE "measuring_runs" DROP CONSTRAINT "measuring_runs_stage_is_known";--> statement-breakpoint
ALTER TABLE "uploads" DROP CONSTRAINT "uploads_state_is_known";--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "compression" text;--> statement-breakpoint
ALTER TABLE "parts" ADD COLUMN "deleted_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "parts" ADD COLUMN "deleted_by" uuid;--> statement-breakpoint
ALTER TABLE "revisions" ADD COLUMN "reason" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "unit_stated_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "unit_stated_by" uuid;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "density_spread_kg_m3" double precision;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "material_id" text;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "material_name" text;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "weighed_mass_kg" double precision;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "weighed_mass_uncertainty_kg" double precision;--> statement-breakpoint
ALTER TABLE "uploads" ADD COLUMN "folder" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "materials" ADD CONSTRAINT "materials_organisation_id_organisations_id_fk" FOREIGN KEY ("organisation_id") REFERENCES "public"."organisations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "materials" ADD CONSTRAINT "materials_changed_by_users_id_fk" FOREIGN KEY ("changed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_summaries" ADD CONSTRAINT "part_summaries_part_fkey" FOREIGN KEY ("organisation_id","part_id") REFERENCES "public"."parts"("organisation_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings_change_items" ADD CONSTRAINT "settings_change_items_change_fkey" FOREIGN KEY ("organisation_id","change_id") REFERENCES "public"."settings_changes"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings_change_items" ADD CONSTRAINT "settings_change_items_revision_fkey" FOREIGN KEY ("organisation_id","revision_id") REFERENCES "public"."revisions"("organisation_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings_changes" ADD CONSTRAINT "settings_changes_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings_changes" ADD CONSTRAINT "settings_changes_project_fkey" FOREIGN KEY ("organisation_id","project_id") REFERENCES "public"."projects"("organisation_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "materials_name_key" ON "materials" USING btree ("organisation_id",lower("name"));--> statement-breakpoint
CREATE INDEX "part_summaries_project_index" ON "part_summaries" USING btree ("organisation_id","project_id","number");--> statement-breakpoint
CREATE INDEX "part_summaries_file_index" ON "part_summaries" USING btree ("organisation_id","project_id","file_key");--> statement-breakpoint
CREATE INDEX "settings_change_items_revision_index" ON "settings_change_items" USING btree ("organisation_id","revision_id");--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_deleted_by_users_id_fk" FOREIGN KEY ("deleted_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_unit_stated_by_users_id_fk" FOREIGN KEY ("unit_stated_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "parts_deleted_index" ON "parts" USING btree ("deleted_at") WHERE "parts"."deleted_at" is not null;--> statement-breakpoint
CREATE INDEX "settings_material_index" ON "settings" USING btree ("organisation_id","material_id");--> statement-breakpoint
CREATE INDEX "uploads_sha256_index" ON "uploads" USING btree ("organisation_id","sha256");--> statement-breakpoint
CREATE INDEX "uploads_size_index" ON "uploads" USING btree ("organisation_id","size_bytes");--> statement-breakpoint
CREATE INDEX "uploads_open_index" ON "uploads" USING btree ("organisation_id","project_id","created_by") WHERE "uploads"."state" = 'open';--> statement-breakpoint
ALTER TABLE "measuring_runs" ADD CONSTRAINT "measuring_runs_stage_is_known" CHECK ("measuring_runs"."stage" in ('waiting', 'hashing', 'reading', 'measuring', 'storing'));--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_material_has_a_name" CHECK (("settings"."material_id" is null) = ("settings"."material_name" is null));--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_weighing_is_whole" CHECK (("settings"."weighed_mass_kg" is null) = ("settings"."weighed_mass_uncertainty_kg" is null));--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_unit_stated_is_whole" CHECK (("settings"."unit_stated_at" is null) = ("settings"."unit_stated_by" is null));--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_state_is_known" CHECK ("uploads"."state" in ('open', 'stored', 'cancelled', 'discarded'));