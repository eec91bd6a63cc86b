ALTER TABLE "measuring_runs" DROP CONSTRAINT "measuring_runs_stage_is_known";--> statement-breakpoint
ALTER TABLE "measuring_runs" DROP CONSTRAINT "measuring_runs_end_has_a_reason";--> statement-breakpoint
ALTER TABLE "measurements" ALTER COLUMN "closed" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ALTER COLUMN "boundary_edges" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ALTER COLUMN "non_manifold_edges" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ALTER COLUMN "degenerate_facets" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ALTER COLUMN "duplicate_facets" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "declared_unit" text;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "declared_materials" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "examined" text DEFAULT 'whole' NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "volume_error_bound" double precision DEFAULT 1e-13 NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "area_error_bound" double precision DEFAULT 1e-12 NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "non_manifold_vertices" integer;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "shells" integer;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "cavities" integer;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "self_intersections" integer;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "listed_shells" jsonb;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "openings" jsonb;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "polygon_volume" double precision DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "measurements" ADD COLUMN "facet_doubt" jsonb;--> statement-breakpoint
ALTER TABLE "measurements" ADD CONSTRAINT "measurements_examined_is_known" CHECK ("measurements"."examined" in ('integrals', 'whole', 'limited'));--> statement-breakpoint
ALTER TABLE "measuring_runs" ADD CONSTRAINT "measuring_runs_stage_is_known" CHECK ("measuring_runs"."stage" in ('waiting', 'hashing', 'reading', 'measuring', 'examining', 'storing'));--> statement-breakpoint
ALTER TABLE "measuring_runs" ADD CONSTRAINT "measuring_runs_end_has_a_reason" CHECK (("measuring_runs"."state" <> 'done' or "measuring_runs"."measurement_id" is not null) and ("measuring_runs"."state" <> 'failed' or "measuring_runs"."measurement_id" is null) and ("measuring_runs"."state" = 'failed') = ("measuring_runs"."error_code" is not null));--> statement-breakpoint
-- A measurement of which only the integrals stand is completed once; one that was examined never changes.
grant update (examined, closed, oriented, outward, turned, defensible, boundary_edges, non_manifold_edges, non_manifold_vertices, degenerate_facets, duplicate_facets, shells, cavities, self_intersections, findings,
  volume, volume_centre_from_origin, volume_second, volume_error_bound, listed_shells, openings, facet_doubt) on measurements to masswright_app;--> statement-breakpoint
create policy measurements_examined_never_change on measurements as restrictive for update using (examined = 'integrals') with check (true);
