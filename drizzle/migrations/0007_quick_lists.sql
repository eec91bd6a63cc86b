CREATE INDEX "part_summaries_deleted_index" ON "part_summaries" USING btree ("organisation_id","project_id") WHERE "part_summaries"."deleted_at" is not null;--> statement-breakpoint
-- On tables that the relay may read too, the two policies are joined by "or", which is tested row by row. As sub-selects the settings are read once a
-- statement and not once a row. (For an index to be used, a query says itself of which organisation it is: `isOfThisOrganisation`.)
do $$
declare name text;
begin
  foreach name in array array['uploads', 'parts', 'part_summaries'] loop
    execute format('alter policy own_organisation on %I using (organisation_id = (select current_organisation_id())) with check (organisation_id = (select current_organisation_id()))', name);
    execute format('alter policy relay on %I using ((select is_relay()))', name);
  end loop;
end $$;
