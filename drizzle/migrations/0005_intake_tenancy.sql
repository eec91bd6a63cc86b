do $$
declare name text;
begin
  foreach name in array array['materials', 'part_summaries', 'settings_changes', 'settings_change_items'] loop
    execute format('alter table %I enable row level security', name);
    execute format('alter table %I force row level security', name);
    execute format('create policy own_organisation on %I using (organisation_id = current_organisation_id()) with check (organisation_id = current_organisation_id())', name);
  end loop;
end $$;
--> statement-breakpoint

-- The worker forgets parts that were deleted thirty days ago, and summarises those of an older installation; which ones there are, it must see before it knows whose.
create policy relay on parts for select using (is_relay());
--> statement-breakpoint
create policy relay on part_summaries for select using (is_relay());
--> statement-breakpoint

-- What people did stays signed with their name, also what came with this migration.
drop policy people_of_the_organisation on users;
--> statement-breakpoint
create policy people_of_the_organisation on users for select using (
  exists (select 1 from memberships where memberships.user_id = users.id and memberships.organisation_id = current_organisation_id())
  or exists (select 1 from revisions where revisions.created_by = users.id)
  or exists (select 1 from settings where settings.changed_by = users.id or settings.unit_stated_by = users.id)
  or exists (select 1 from settings_changes where settings_changes.created_by = users.id)
);
--> statement-breakpoint

-- A unit that stands in a setting of before was stated for that file.
update settings set unit_stated_at = changed_at, unit_stated_by = changed_by where length_unit is not null;
--> statement-breakpoint

grant select, insert, update (name, group_name, density_kg_m3, density_spread_kg_m3, spread_basis, source, version, archived_at, changed_at, changed_by) on materials to masswright_app;
--> statement-breakpoint
grant select, insert, update, delete on part_summaries to masswright_app;
--> statement-breakpoint
grant select, insert on settings_changes to masswright_app;
--> statement-breakpoint
grant select, insert, delete on settings_change_items to masswright_app;
--> statement-breakpoint
grant update (unit_stated_at, unit_stated_by, density_spread_kg_m3, material_id, material_name, weighed_mass_kg, weighed_mass_uncertainty_kg), delete on settings to masswright_app;
--> statement-breakpoint
grant update (deleted_at, deleted_by), delete on parts to masswright_app;
--> statement-breakpoint
grant delete on revisions to masswright_app;
--> statement-breakpoint
grant delete on measuring_runs to masswright_app;
