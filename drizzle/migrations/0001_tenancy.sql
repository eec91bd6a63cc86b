-- Rows of one organisation are out of reach of another, whatever a query says. DEVELOPERS.md, "Tenancy", tells the whole story.
-- The wrapper in src/tenancy sets these for the length of one transaction; unset they are '' or null, and then nothing matches.
create function current_organisation_id() returns uuid language sql stable parallel safe
  as $$ select nullif(current_setting('masswright.organisation_id', true), '')::uuid $$;
--> statement-breakpoint
create function current_user_id() returns uuid language sql stable parallel safe
  as $$ select nullif(current_setting('masswright.user_id', true), '')::uuid $$;
--> statement-breakpoint
create function current_token_hash() returns bytea language sql stable parallel safe
  as $$ select decode(nullif(current_setting('masswright.token_hash', true), ''), 'hex') $$;
--> statement-breakpoint
create function current_email() returns text language sql stable parallel safe
  as $$ select nullif(current_setting('masswright.email', true), '') $$;
--> statement-breakpoint
create function is_relay() returns boolean language sql stable parallel safe
  as $$ select coalesce(current_setting('masswright.scope', true), '') = 'relay' $$;
--> statement-breakpoint

-- Tables whose rows belong to one organisation and are read only inside it.
do $$
declare name text;
begin
  foreach name in array array['projects', 'uploads', 'parts', 'revisions', 'settings', 'measurements', 'measuring_runs'] loop
    execute format('alter table %I enable row level security', name);
    execute format('alter table %I force row level security', name);
    execute format('create policy own_organisation on %I using (organisation_id = current_organisation_id()) with check (organisation_id = current_organisation_id())', name);
  end loop;
end $$;
--> statement-breakpoint

-- Tables that must be read before the organisation is known, each with its own rule.
alter table organisations enable row level security;
--> statement-breakpoint
alter table organisations force row level security;
--> statement-breakpoint
create policy own_organisation on organisations using (id = current_organisation_id()) with check (id = current_organisation_id());
--> statement-breakpoint
create policy organisations_of_the_person on organisations for select
  using (exists (select 1 from memberships where memberships.organisation_id = organisations.id and memberships.user_id = current_user_id()));
--> statement-breakpoint

alter table memberships enable row level security;
--> statement-breakpoint
alter table memberships force row level security;
--> statement-breakpoint
create policy own_organisation on memberships using (organisation_id = current_organisation_id()) with check (organisation_id = current_organisation_id());
--> statement-breakpoint
create policy memberships_of_the_person on memberships for select using (user_id = current_user_id());
--> statement-breakpoint

alter table users enable row level security;
--> statement-breakpoint
alter table users force row level security;
--> statement-breakpoint
create policy own_account on users using (id = current_user_id()) with check (id = current_user_id());
--> statement-breakpoint
create policy account_by_email on users for select using (email = current_email());
--> statement-breakpoint
-- Names of colleagues, and of those who once were: what they did stays signed with their name.
create policy people_of_the_organisation on users for select using (
  exists (select 1 from memberships where memberships.user_id = users.id and memberships.organisation_id = current_organisation_id())
  or exists (select 1 from revisions where revisions.created_by = users.id)
  or exists (select 1 from settings where settings.changed_by = users.id)
);
--> statement-breakpoint

alter table sessions enable row level security;
--> statement-breakpoint
alter table sessions force row level security;
--> statement-breakpoint
create policy session_by_token on sessions using (token_hash = current_token_hash()) with check (token_hash = current_token_hash());
--> statement-breakpoint
create policy sessions_of_the_person on sessions using (user_id = current_user_id()) with check (user_id = current_user_id());
--> statement-breakpoint
create policy sessions_in_the_organisation on sessions for select using (organisation_id = current_organisation_id());
--> statement-breakpoint
create policy end_sessions_in_the_organisation on sessions for delete using (organisation_id = current_organisation_id());
--> statement-breakpoint

alter table invitations enable row level security;
--> statement-breakpoint
alter table invitations force row level security;
--> statement-breakpoint
create policy own_organisation on invitations using (organisation_id = current_organisation_id()) with check (organisation_id = current_organisation_id());
--> statement-breakpoint
create policy invitation_by_token on invitations for select using (token_hash = current_token_hash());
--> statement-breakpoint

alter table password_resets enable row level security;
--> statement-breakpoint
alter table password_resets force row level security;
--> statement-breakpoint
create policy own_resets on password_resets using (user_id = current_user_id()) with check (user_id = current_user_id());
--> statement-breakpoint
create policy reset_by_token on password_resets for select using (token_hash = current_token_hash());
--> statement-breakpoint

alter table audit_events enable row level security;
--> statement-breakpoint
alter table audit_events force row level security;
--> statement-breakpoint
create policy own_organisation on audit_events using (organisation_id = current_organisation_id()) with check (organisation_id = current_organisation_id());
--> statement-breakpoint
create policy own_account on audit_events using (organisation_id is null and actor_id = current_user_id()) with check (organisation_id is null and actor_id = current_user_id());
--> statement-breakpoint

-- Anyone may leave work for the worker, in their own organisation or in none; only the relay reads it.
alter table outbox enable row level security;
--> statement-breakpoint
alter table outbox force row level security;
--> statement-breakpoint
create policy leave_work on outbox for insert with check (organisation_id is null or organisation_id = current_organisation_id());
--> statement-breakpoint
create policy relay on outbox using (is_relay());
--> statement-breakpoint

-- Counters that name nobody and belong to no organisation.
alter table attempts enable row level security;
--> statement-breakpoint
alter table attempts force row level security;
--> statement-breakpoint
create policy everyone on attempts using (true) with check (true);
--> statement-breakpoint

-- The relay sleeps until there is work.
create function announce_work() returns trigger language plpgsql as $$
begin
  perform pg_notify('masswright_work', '');
  return null;
end $$;
--> statement-breakpoint
create trigger announce_work after insert on outbox for each statement execute function announce_work();
--> statement-breakpoint

-- A session that ends, however it ends, is announced, so that its event stream ends too.
create function announce_session_end() returns trigger language plpgsql as $$
begin
  perform pg_notify('masswright_sessions', old.id::text);
  return null;
end $$;
--> statement-breakpoint
create trigger announce_session_end after delete on sessions for each row execute function announce_session_end();
--> statement-breakpoint

-- What the application may do: no more than it does.
revoke all on schema public from public;
--> statement-breakpoint
-- Said outright: a database that is cloned or restored may have another owner, and foreign keys are checked as the tables' one.
grant usage, create on schema public to masswright_owner;
--> statement-breakpoint
grant usage on schema public to masswright_app;
--> statement-breakpoint
grant select, insert on organisations to masswright_app;
--> statement-breakpoint
grant select, insert, update (name, password_hash) on users to masswright_app;
--> statement-breakpoint
grant select, insert, update (role), delete on memberships to masswright_app;
--> statement-breakpoint
grant select, insert, update, delete on sessions to masswright_app;
--> statement-breakpoint
grant select, insert, update (accepted_at, withdrawn_at) on invitations to masswright_app;
--> statement-breakpoint
grant select, insert, update (used_at) on password_resets to masswright_app;
--> statement-breakpoint
grant select, insert, update, delete on attempts to masswright_app;
--> statement-breakpoint
grant select, insert, update (name, next_part_number) on projects to masswright_app;
--> statement-breakpoint
grant select, insert, update (state, sha256, stored_at) on uploads to masswright_app;
--> statement-breakpoint
grant select, insert, update (name) on parts to masswright_app;
--> statement-breakpoint
grant select, insert on revisions to masswright_app;
--> statement-breakpoint
grant select, insert, update (length_unit, density_kg_m3, axis, drive_speed_rad_per_s, drive_time_s, version, changed_at, changed_by) on settings to masswright_app;
--> statement-breakpoint
grant select, insert on measurements to masswright_app;
--> statement-breakpoint
grant select, insert, update (state, stage, progress, fence, measurement_id, error_code, error_message, error_byte, error_line, started_at, finished_at) on measuring_runs to masswright_app;
--> statement-breakpoint
grant select, insert on audit_events to masswright_app;
--> statement-breakpoint
grant insert, select, update (due_at, handed_out, done_at), delete on outbox to masswright_app;
--> statement-breakpoint
grant usage on sequence outbox_id_seq to masswright_app;
