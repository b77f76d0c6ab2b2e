-- What the database itself refuses, whoever asks.

-- No unit is taken twice at a time.
alter table allocation
  add constraint allocation_unit_free
  exclude using gist (unit_id with =, during with &&) where (live)
  deferrable initially immediate;
--> statement-breakpoint
-- A chamber has one set temperature at a time.
alter table load_phase
  add constraint load_phase_one_temperature
  exclude using gist (chamber_id with =, set_temp_mdegc with <>, during with &&) where (live)
  deferrable initially immediate;
--> statement-breakpoint
-- Nothing that disturbs falls into a still phase.
alter table load_phase
  add constraint load_phase_still
  exclude using gist (chamber_id with =, still with <>, during with &&)
  where (live and still is not null)
  deferrable initially immediate;
--> statement-breakpoint

-- Counters may be lost in a crash.
alter table rate_limit set unlogged;
--> statement-breakpoint

-- The audit trail only grows: a row is sealed once and otherwise stays as it was written.
create function audit_event_only_grows() returns trigger language plpgsql as $$
begin
  if tg_op = 'UPDATE' and old.seal_no is null and new.seal_no is not null
    and (to_jsonb(new) - array['seal_no', 'prev_hash', 'hash'])
      = (to_jsonb(old) - array['seal_no', 'prev_hash', 'hash'])
  then
    return new;
  end if;
  raise exception 'The audit trail cannot be changed.'
    using errcode = 'check_violation', table = 'audit_event', constraint = 'audit_event_only_grows';
end
$$;
--> statement-breakpoint
create trigger audit_event_only_grows
  before update or delete on audit_event
  for each row execute function audit_event_only_grows();
--> statement-breakpoint
create trigger audit_event_never_emptied
  before truncate on audit_event
  for each statement execute function audit_event_only_grows();
--> statement-breakpoint

-- An approved calibration is never edited; all that may follow is that another replaces it.
create function calibration_approved_is_final() returns trigger language plpgsql as $$
begin
  if old.state not in ('approved', 'replaced') then
    return coalesce(new, old);
  end if;
  if tg_op = 'UPDATE' and old.state = 'approved' and new.state in ('approved', 'replaced')
    and (to_jsonb(new) - array['state', 'version', 'updated_at'])
      = (to_jsonb(old) - array['state', 'version', 'updated_at'])
  then
    return new;
  end if;
  raise exception 'Calibration % is approved: record a new one that replaces it.', old.id
    using errcode = 'check_violation', table = 'calibration',
      constraint = 'calibration_approved_is_final';
end
$$;
--> statement-breakpoint
create trigger calibration_approved_is_final
  before update or delete on calibration
  for each row execute function calibration_approved_is_final();
--> statement-breakpoint
-- Nor is its scope, except by the transaction that wrote the record whole.
create function calibration_scope_is_final() returns trigger language plpgsql as $$
declare
  touched_id integer;
  fixed boolean;
begin
  foreach touched_id in array case tg_op
    when 'INSERT' then array[new.calibration_id]
    when 'DELETE' then array[old.calibration_id]
    else array[old.calibration_id, new.calibration_id] end
  loop
    select state in ('approved', 'replaced')
        and xmin::text::bigint <> (pg_current_xact_id()::text::bigint & 4294967295)
      into fixed from calibration where id = touched_id;
    if fixed then
      raise exception 'Calibration % is approved: record a new one that replaces it.', touched_id
        using errcode = 'check_violation', table = 'calibration_scope',
          constraint = 'calibration_approved_is_final';
    end if;
  end loop;
  return coalesce(new, old);
end
$$;
--> statement-breakpoint
create trigger calibration_scope_is_final
  before insert or update or delete on calibration_scope
  for each row execute function calibration_scope_is_final();
--> statement-breakpoint

-- The relay is woken by the commit, never by a change that was rolled back.
create function outbox_wake_relay() returns trigger language plpgsql as $$
begin
  perform pg_notify('millpond_outbox', '');
  return null;
end
$$;
--> statement-breakpoint
create trigger outbox_wake_relay
  after insert on outbox
  for each statement execute function outbox_wake_relay();
--> statement-breakpoint

-- What the running application may do; the owner alone changes tables.
grant usage on schema public to millpond_app;
--> statement-breakpoint
grant select, insert, update on
  allocation, booking, booking_cell, calibration, calibration_scope, cell, cell_type, chamber_load,
  chamber_position, chamber_spec, channel, channel_pair, deviation, digest, duty, idempotency_key,
  instrument, limitation, load_phase, meter_range, notification, other_work, outage,
  outage_instrument, outbox, panel, panel_member, person, project, project_member, provider,
  rate_limit, request, request_lot, request_lot_cell, role_grant, room, run, session, setting, site,
  site_calendar_exception, source_spec, stability_assessment, unattended_permission, unavailability,
  unit
  to millpond_app;
--> statement-breakpoint
-- Written once, read ever after.
grant select, insert on check_result, file, file_chunk, run_event to millpond_app;
--> statement-breakpoint
grant select, insert, update (seal_no, prev_hash, hash) on audit_event to millpond_app;
--> statement-breakpoint
-- Rows that are rewritten with their parent, revoked, or only kept for a while.
grant delete on
  allocation, booking_cell, calibration_scope, channel_pair, idempotency_key, load_phase,
  meter_range, outage_instrument, outbox, panel_member, project_member, rate_limit, request_lot,
  request_lot_cell, role_grant, session, setting, site_calendar_exception, source_spec
  to millpond_app;
