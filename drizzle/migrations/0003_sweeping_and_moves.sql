grant update (unended_take_ups) on measuring_runs to masswright_app;
--> statement-breakpoint

-- The worker sweeps uploads that nobody came back to; which ones there are, it must see before it knows whose.
create policy relay on uploads for select using (is_relay());
--> statement-breakpoint

-- A session that moves to another organisation is announced, so that its event stream doesn't stay behind.
create function announce_session_move() returns trigger language plpgsql as $$
begin
  perform pg_notify('masswright_session_moves', new.id::text);
  return null;
end $$;
--> statement-breakpoint
create trigger announce_session_move after update of organisation_id on sessions
  for each row when (old.organisation_id is distinct from new.organisation_id) execute function announce_session_move();
