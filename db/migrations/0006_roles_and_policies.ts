import type { Knex } from 'knex'

/** Tables a person may read where the system is visible to them, by leak figures alone. */
const BY_SYSTEM = ['part', 'setting', 'system_state', 'leg', 'fault', 'system_day', 'outlook']
/** Tables of the worker and ingest alone: people reach them through functions or not at all. */
const CLOSED = [
  'sample',
  'sample_hour',
  'checkpoint',
  'token',
  'tick',
  'device_claim',
  'delivery_attempt',
  'upload',
]
const OPEN_TO_INGEST = [
  'shop',
  'person',
  'session',
  'membership',
  'vessel',
  'vessel_owner',
  'shop_access',
  'system',
  'statement',
  'contact',
  'invitation',
  'audit_entry',
  'logger',
  'logger_fitting',
  'calibration',
  'run',
  'hold',
  'flush',
  'notice',
  'notice_event',
  'message',
  'message_subject',
  'visit',
  'visit_entry',
  'gauge_test',
  'part_change',
  'photo',
  'report_version',
  ...BY_SYSTEM,
]

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- Roles belong to the whole server, so another database of it may have made them already.
do $$ begin
  create role mw_person nologin;
exception when duplicate_object or unique_violation then null; end $$;
do $$ begin
  create role mw_ingest nologin;
exception when duplicate_object or unique_violation then null; end $$;
do $$ begin execute format('grant mw_person, mw_ingest to %I', current_user); end $$;
grant usage on schema public to mw_person, mw_ingest;
grant select, insert, update, delete on all tables in schema public to mw_ingest;
grant usage, select on all sequences in schema public to mw_ingest, mw_person;

create function current_person() returns bigint language sql stable as
  $$ select nullif(current_setting('app.person_id', true), '')::bigint $$;

create function my_shops() returns setof bigint language sql stable security definer set search_path = public as
  $$ select shop_id from membership where person_id = current_person() and ended_at is null $$;

create function owned_vessels() returns setof bigint language sql stable security definer set search_path = public as
  $$ select vessel_id from vessel_owner where person_id = current_person() and ended_at is null $$;

-- Leak figures: own boats, boats whose owner lets one's shop, boats one's shop keeps until an owner accepts.
create function visible_vessels() returns setof bigint language sql stable security definer set search_path = public as $$
  select owned_vessels()
  union select vessel_id from shop_access where withdrawn_at is null and shop_id in (select my_shops())
  union select id from vessel where kept_by_shop_id in (select my_shops())
$$;

-- The full record: the owner, the second consent, or a visit under way with the first.
create function full_record_vessels() returns setof bigint language sql stable security definer set search_path = public as $$
  select owned_vessels()
  union select vessel_id from shop_access where withdrawn_at is null and level = 'full' and shop_id in (select my_shops())
  union select v.vessel_id from visit v join shop_access a on a.vessel_id = v.vessel_id and a.shop_id = v.shop_id
    where a.withdrawn_at is null and v.status in ('under-way', 'proving') and v.shop_id in (select my_shops())
  union select id from vessel where kept_by_shop_id in (select my_shops())
$$;

create function visible_systems() returns setof bigint language sql stable security definer set search_path = public as
  $$ select id from system where vessel_id in (select visible_vessels()) $$;

create function full_record_systems() returns setof bigint language sql stable security definer set search_path = public as
  $$ select id from system where vessel_id in (select full_record_vessels()) $$;

-- People one may know of: oneself, the staff of one's shops, owners of and shops' staff on the vessels one sees.
create function visible_people() returns setof bigint language sql stable security definer set search_path = public as $$
  select current_person()
  union select person_id from membership where shop_id in (select my_shops())
  union select person_id from vessel_owner where vessel_id in (select visible_vessels()) and ended_at is null
$$;

create function visible_shops() returns setof bigint language sql stable security definer set search_path = public as $$
  select my_shops()
  union select shop_id from shop_access where vessel_id in (select owned_vessels())
  union select kept_by_shop_id from vessel where id in (select owned_vessels()) and kept_by_shop_id is not null
  union select shop_id from visit where vessel_id in (select owned_vessels())
$$;
${['current_person', 'my_shops', 'owned_vessels', 'visible_vessels', 'full_record_vessels', 'visible_systems', 'full_record_systems', 'visible_people', 'visible_shops'].map((name) => `revoke execute on function ${name}() from public; grant execute on function ${name}() to mw_person, mw_ingest;`).join('\n')}

-- A role in a shop, for checks that policies cannot say in one line.
create function has_role(shop bigint, roles text[]) returns boolean language sql stable security definer set search_path = public as $$
  select exists (select 1 from membership
    where person_id = current_person() and shop_id = shop and role = any (roles) and ended_at is null)
$$;

-- Samples are read through one check, not through a policy on each row.
create function system_samples(p_system bigint, p_from timestamptz, p_to timestamptz)
returns table (at timestamptz, vacuum_pa real, air_c real, barometer_pa real, supply_v real, pump_on boolean)
language plpgsql stable security definer set search_path = public as $$
begin
  if current_person() is not null and p_system not in (select full_record_systems()) then
    return;
  end if;
  return query
    select s.at, s.vacuum_pa, s.air_c, s.barometer_pa, s.supply_v, s.pump_on
    from logger_fitting f
    join sample s on s.logger_id = f.logger_id
      and s.at >= greatest(p_from, lower(f.span)) and s.at < least(p_to, coalesce(upper(f.span), 'infinity'))
    where f.system_id = p_system and f.span && tstzrange(p_from, p_to)
    order by s.at;
end $$;

create function system_sample_hours(p_system bigint, p_from timestamptz, p_to timestamptz)
returns setof sample_hour language plpgsql stable security definer set search_path = public as $$
begin
  if current_person() is not null and p_system not in (select full_record_systems()) then
    return;
  end if;
  return query
    select h.* from logger_fitting f
    join sample_hour h on h.logger_id = f.logger_id and h.hour >= p_from - interval '1 hour' and h.hour < p_to
      and h.hour + interval '1 hour' > lower(f.span) and h.hour < coalesce(upper(f.span), 'infinity')
    where f.system_id = p_system
    order by h.hour;
end $$;
revoke execute on function system_samples(bigint, timestamptz, timestamptz) from public;
revoke execute on function system_sample_hours(bigint, timestamptz, timestamptz) from public;
revoke execute on function has_role(bigint, text[]) from public;
grant execute on function system_samples(bigint, timestamptz, timestamptz) to mw_person, mw_ingest;
grant execute on function system_sample_hours(bigint, timestamptz, timestamptz) to mw_person, mw_ingest;
grant execute on function has_role(bigint, text[]) to mw_person, mw_ingest;
`)

  for (const table of [...OPEN_TO_INGEST, ...CLOSED]) {
    // Samples are closed by grants alone: policies on them cost ten times.
    if (table === 'sample' || table === 'sample_hour') continue
    await knex.raw(`alter table ${table} enable row level security`)
    await knex.raw(`create policy ingest_all on ${table} to mw_ingest using (true) with check (true)`)
  }
  for (const table of BY_SYSTEM) {
    await knex.raw(`grant select on ${table} to mw_person`)
    await knex.raw(
      `create policy see on ${table} for select to mw_person using (system_id = any (array(select visible_systems())))`,
    )
  }

  await knex.raw(`
grant select on shop, person, membership, vessel, vessel_owner, shop_access, system, statement, contact, invitation,
  audit_entry, logger, logger_fitting, calibration, run, hold, flush, notice, notice_event, message, message_subject,
  visit, visit_entry, gauge_test, part_change, photo, report_version, session to mw_person;
-- Secrets stay behind: a person reads neither password hashes nor keys, their own included.
revoke select on person, logger, invitation from mw_person;
grant select (id, email, name, email_confirmed_at, units, created_at, deleted_at) on person to mw_person;
grant select (id, serial, shop_id, interval_seconds, channels, key_made_at, retired_at, last_heard_at,
  clock_offset_seconds, fine_interval_seconds, fine_until, created_at) on logger to mw_person;
grant select (id, email, shop_id, role, vessel_id, invited_by, created_at, expires_at, accepted_at, withdrawn_at)
  on invitation to mw_person;

create policy see on shop for select to mw_person using (id = any (array(select visible_shops())));
create policy see on person for select to mw_person using (id = any (array(select visible_people())));
create policy see on session for select to mw_person using (person_id = current_person());
create policy stop on session for update to mw_person using (person_id = current_person()) with check (person_id = current_person());
create policy see on membership for select to mw_person
  using (person_id = current_person() or shop_id = any (array(select my_shops())));
create policy see on vessel for select to mw_person using (id = any (array(select visible_vessels())));
create policy see on vessel_owner for select to mw_person using (vessel_id = any (array(select visible_vessels())));
create policy see on shop_access for select to mw_person
  using (vessel_id = any (array(select owned_vessels())) or shop_id = any (array(select my_shops())));
create policy see on system for select to mw_person using (vessel_id = any (array(select visible_vessels())));
-- Presence belongs to the full record; what is said of the plant to the figures.
create policy see on statement for select to mw_person using (
  case when system_id is null then vessel_id = any (array(select full_record_vessels()))
    else vessel_id = any (array(select visible_vessels())) end);
create policy see on contact for select to mw_person using (person_id = current_person());
create policy see on invitation for select to mw_person
  using (shop_id = any (array(select my_shops())) or vessel_id = any (array(select owned_vessels())));
create policy see on audit_entry for select to mw_person
  using (vessel_id = any (array(select owned_vessels())) or has_role(shop_id, array['manager']) or person_id = current_person());
create policy see on logger for select to mw_person using (
  shop_id = any (array(select my_shops()))
  or id in (select logger_id from logger_fitting where system_id = any (array(select visible_systems()))));
create policy see on logger_fitting for select to mw_person using (system_id = any (array(select visible_systems())));
create policy see on calibration for select to mw_person using (
  logger_id in (select logger_id from logger_fitting where system_id = any (array(select visible_systems()))));
-- Runs by leak are figures; runs after a flush tell when somebody was up.
create policy see on run for select to mw_person using (
  case when trigger = 'flush' then system_id = any (array(select full_record_systems()))
    else system_id = any (array(select visible_systems())) end);
create policy see on hold for select to mw_person using (
  case when ending = 'flush' or flushes > 0 then system_id = any (array(select full_record_systems()))
    else system_id = any (array(select visible_systems())) end);
create policy see on flush for select to mw_person using (system_id = any (array(select full_record_systems())));
create policy see on notice for select to mw_person using (vessel_id = any (array(select visible_vessels())));
create policy see on notice_event for select to mw_person
  using (notice_id in (select id from notice where vessel_id = any (array(select visible_vessels()))));
create policy see on message for select to mw_person using (
  person_id = current_person()
  or person_id in (select person_id from membership m where m.shop_id = any (array(select my_shops()))
    and has_role(m.shop_id, array['manager']))
  or id in (select ms.message_id from message_subject ms join notice_event e on e.id = ms.notice_event_id
    join notice n on n.id = e.notice_id join shop_access a on a.vessel_id = n.vessel_id and a.withdrawn_at is null
    where has_role(a.shop_id, array['manager'])));
create policy see on message_subject for select to mw_person using (message_id in (select id from message));
-- A shop keeps the visits it did, whoever's boat it is now; the owner sees those of the own boat.
create policy see on visit for select to mw_person
  using (shop_id = any (array(select my_shops())) or vessel_id = any (array(select owned_vessels())));
${['visit_entry', 'gauge_test', 'part_change', 'photo', 'report_version'].map((t) => `create policy see on ${t} for select to mw_person using (visit_id in (select id from visit));`).join('\n')}

-- What people write themselves. Everything else is written by the service under its own role.
grant insert, update on statement, visit, visit_entry, gauge_test, part_change, photo, setting, part, audit_entry, contact,
  shop_access, session to mw_person;
grant update (acknowledged_at, acknowledged_by, acknowledged_note, snoozed_until) on notice to mw_person;
grant insert on notice_event to mw_person;
grant update (name, time_zone, harbour, berth, altitude_m, quiet_start, quiet_end) on vessel to mw_person;
grant update (name, units) on person to mw_person;
create policy say on statement for insert to mw_person with check (vessel_id = any (array(select visible_vessels())));
create policy take_back on statement for update to mw_person using (vessel_id = any (array(select visible_vessels())));
create policy ask on visit for insert to mw_person with check (
  vessel_id = any (array(select owned_vessels())) or has_role(shop_id, array['technician', 'manager']));
create policy work on visit for update to mw_person using (has_role(shop_id, array['technician', 'manager']));
${['visit_entry', 'gauge_test', 'part_change', 'photo'].map((t) => `create policy write on ${t} for insert to mw_person with check (visit_id in (select id from visit where has_role(shop_id, array['technician', 'manager'])));`).join('\n')}
create policy set on setting for insert to mw_person with check (system_id = any (array(select visible_systems())));
create policy draw on part for insert to mw_person with check (system_id = any (array(select visible_systems())));
create policy redraw on part for update to mw_person using (system_id = any (array(select visible_systems())));
create policy note on audit_entry for insert to mw_person with check (person_id = current_person());
create policy write on contact for insert to mw_person with check (person_id = current_person());
create policy edit on contact for update to mw_person using (person_id = current_person());
create policy grant_access on shop_access for insert to mw_person with check (vessel_id = any (array(select owned_vessels())));
create policy withdraw on shop_access for update to mw_person using (vessel_id = any (array(select owned_vessels())));
create policy acknowledge on notice for update to mw_person using (vessel_id = any (array(select visible_vessels())));
create policy note on notice_event for insert to mw_person
  with check (notice_id in (select id from notice where vessel_id = any (array(select visible_vessels()))));
create policy set_quiet_hours on vessel for update to mw_person using (id = any (array(select owned_vessels()))
  or kept_by_shop_id = any (array(select my_shops())));
create policy edit on person for update to mw_person using (id = current_person());
`)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of [...OPEN_TO_INGEST, ...CLOSED]) {
    const policies = await knex('pg_policies')
      .where({ schemaname: 'public', tablename: table })
      .select('policyname')
    for (const { policyname } of policies) await knex.raw('drop policy ?? on ??', [policyname, table])
    await knex.raw(`alter table ${table} disable row level security`)
  }
  await knex.raw(`
drop function system_samples(bigint, timestamptz, timestamptz), system_sample_hours(bigint, timestamptz, timestamptz),
  has_role(bigint, text[]), visible_shops(), visible_people(), full_record_systems(), visible_systems(),
  full_record_vessels(), visible_vessels(), owned_vessels(), my_shops(), current_person();
revoke all on all tables in schema public from mw_person, mw_ingest;
revoke all on all sequences in schema public from mw_person, mw_ingest;
revoke all on schema public from mw_person, mw_ingest;
`)
}
