-- The second fence: every table of a clinic shows only the rows of the clinic that acts.
-- The roles espalier_app, espalier_gate and espalier_finder exist before any migration runs (server/db/roles.ts).
do $$
declare
  fenced text;
begin
  foreach fenced in array array[
    'people', 'person_roles', 'patients', 'operation_cards', 'care_team_members', 'plans', 'sign_offs',
    'check_ins', 'alerts', 'alert_mistakes', 'flags', 'findings', 'flag_events',
    'threads', 'messages', 'thread_participants', 'notifications', 'audit_entries'
  ] loop
    execute format('alter table %I enable row level security', fenced);
    execute format('alter table %I force row level security', fenced);
    execute format(
      'create policy clinic_fence on %I using (clinic_id = (select nullif(current_setting(''app.clinic_id'', true), '''')::uuid))',
      fenced
    );
  end loop;
end
$$;
--> statement-breakpoint
alter table clinics enable row level security;
--> statement-breakpoint
alter table clinics force row level security;
--> statement-breakpoint
create policy clinic_fence on clinics using (id = (select nullif(current_setting('app.clinic_id', true), '')::uuid));
--> statement-breakpoint

-- The application owns nothing. What people sent is never edited or deleted, and the audit is not even read.
grant usage on schema public to espalier_app, espalier_gate, espalier_finder;
--> statement-breakpoint
grant select on
  clinics, people, person_roles, patients, operation_cards, care_team_members, plans, sign_offs,
  check_ins, alerts, alert_mistakes, flags, findings, flag_events,
  threads, messages, thread_participants, notifications
to espalier_app;
--> statement-breakpoint
grant insert on
  check_ins, alerts, alert_mistakes, flags, findings, flag_events,
  threads, messages, thread_participants, notifications, audit_entries
to espalier_app;
--> statement-breakpoint
grant update (evaluated_at) on check_ins, alerts to espalier_app;
--> statement-breakpoint
grant update on flags, findings, threads, thread_participants, notifications to espalier_app;
--> statement-breakpoint

-- The gate: ways in, sessions, throttling and heartbeats; nothing of a patient's record.
grant select, insert, update, delete on
  credentials, browser_sessions, signed_in_sessions, sign_in_attempts, worker_heartbeats
to espalier_gate;
--> statement-breakpoint

-- The finder owns the few functions that look across clinics. They return ids only.
grant select (id) on clinics to espalier_finder;
--> statement-breakpoint
grant select (clinic_id, id, received_at, evaluated_at) on check_ins, alerts to espalier_finder;
--> statement-breakpoint
create policy finder_reads_ids on clinics for select to espalier_finder using (true);
--> statement-breakpoint
create policy finder_reads_ids on check_ins for select to espalier_finder using (true);
--> statement-breakpoint
create policy finder_reads_ids on alerts for select to espalier_finder using (true);
--> statement-breakpoint

-- The clinic that the sign-in page greets for; null where this server holds none or several.
create function only_clinic_id() returns uuid
  language sql stable security definer set search_path = pg_catalog, public
  as $$ select case when count(*) = 1 then (array_agg(id))[1] end from public.clinics $$;
--> statement-breakpoint
-- Check-ins and alerts that were received before an instant and that no rule has seen yet.
create function unevaluated_before(before timestamptz)
  returns table (clinic_id uuid, kind text, id uuid)
  language sql stable security definer set search_path = pg_catalog, public
  as $$
    select waiting.clinic_id, waiting.kind, waiting.id
    from (
      select c.clinic_id, 'check-in' as kind, c.id, c.received_at
      from public.check_ins c where c.evaluated_at is null and c.received_at < before
      union all
      select a.clinic_id, 'alert', a.id, a.received_at
      from public.alerts a where a.evaluated_at is null and a.received_at < before
    ) waiting
    order by waiting.received_at
    limit 100
  $$;
--> statement-breakpoint
grant create on schema public to espalier_finder;
--> statement-breakpoint
alter function only_clinic_id() owner to espalier_finder;
--> statement-breakpoint
alter function unevaluated_before(timestamptz) owner to espalier_finder;
--> statement-breakpoint
revoke create on schema public from espalier_finder;
--> statement-breakpoint
revoke execute on function only_clinic_id(), unevaluated_before(timestamptz) from public;
--> statement-breakpoint
grant execute on function only_clinic_id(), unevaluated_before(timestamptz) to espalier_app;
