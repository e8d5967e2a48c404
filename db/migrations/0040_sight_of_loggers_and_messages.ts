import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- A logger goes with the boat it is fitted to: where that is out of sight, neither the shop whose stock it was nor the
-- people of a boat it was on before know when it was heard, or hold its key. Without a fitting it is its shop's.
create function visible_loggers() returns setof integer language sql stable security definer set search_path = public as $$
  with fitted as (select logger_id, system_id from logger_fitting where upper_inf(span)),
    out_of_sight as (select logger_id from fitted where system_id not in (select visible_systems()))
  select id from logger where shop_id in (select my_shops()) and id not in (select logger_id from out_of_sight)
  union
  select logger_id from logger_fitting
    where system_id in (select visible_systems()) and logger_id not in (select logger_id from out_of_sight)
$$;
revoke execute on function visible_loggers() from public;
grant execute on function visible_loggers() to mw_person, mw_ingest;

drop policy see on logger;
create policy see on logger for select to mw_person using (id = any (array(select visible_loggers())));
drop policy see on calibration;
create policy see on calibration for select to mw_person using (logger_id = any (array(select visible_loggers())));

create or replace function logger_health() returns table (logger_id integer, supply_v real, supply_at timestamptz,
  low_supply_v real, silence_seconds integer) language sql stable security definer set search_path = public as $$
  select l.id, h.supply_mean_v, h.hour, g.low_supply_v, g.silence_seconds
  from logger l
  left join logger_fitting f on f.logger_id = l.id and upper_inf(f.span)
  left join lateral (select s.low_supply_v, s.silence_seconds from setting s
    where s.system_id = f.system_id order by s.in_force_from desc limit 1) g on true
  left join lateral (select h.supply_mean_v, h.hour from sample_hour h
    where h.logger_id = l.id and h.supply_mean_v is not null
      and h.hour > coalesce(l.last_heard_at, now()) - interval '2 days' order by h.hour desc limit 1) h on true
  where l.id in (select visible_loggers())
$$;

-- Messages a manager reads in the log: what was told about boats that the shop sees now, and what its staff were sent
-- that tells of no boat at all. What a colleague is told about a boat of their own is the colleague's.
create or replace function managed_messages() returns setof bigint
language sql stable security definer set search_path = public as $$
  with managed as (select shop_id from membership
      where person_id = current_person() and role = 'manager' and ended_at is null),
    seen as (select vessel_id from shop_access where withdrawn_at is null and shop_id in (select shop_id from managed)
      union select id from vessel where kept_by_shop_id in (select shop_id from managed))
  select s.message_id from message_subject s join notice_event e on e.id = s.notice_event_id
    join notice n on n.id = e.notice_id where n.vessel_id in (select vessel_id from seen)
  union
  select m.id from message m where not exists (select 1 from message_subject s where s.message_id = m.id)
    and m.person_id in (select person_id from membership
      where ended_at is null and shop_id in (select shop_id from managed))
$$;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
create or replace function managed_messages() returns setof bigint
language sql stable security definer set search_path = public as $$
  select x.id from message x where x.person_id in (select m.person_id from membership m
    where m.ended_at is null and has_role(m.shop_id, array['manager']))
  union select ms.message_id from message_subject ms join notice_event e on e.id = ms.notice_event_id
    join notice n on n.id = e.notice_id join shop_access a on a.vessel_id = n.vessel_id and a.withdrawn_at is null
    where has_role(a.shop_id, array['manager'])
$$;
create or replace function logger_health() returns table (logger_id integer, supply_v real, supply_at timestamptz,
  low_supply_v real, silence_seconds integer) language sql stable security definer set search_path = public as $$
  select l.id, h.supply_mean_v, h.hour, g.low_supply_v, g.silence_seconds
  from logger l
  left join logger_fitting f on f.logger_id = l.id and upper_inf(f.span)
  left join lateral (select s.low_supply_v, s.silence_seconds from setting s
    where s.system_id = f.system_id order by s.in_force_from desc limit 1) g on true
  left join lateral (select h.supply_mean_v, h.hour from sample_hour h
    where h.logger_id = l.id and h.supply_mean_v is not null
      and h.hour > coalesce(l.last_heard_at, now()) - interval '2 days' order by h.hour desc limit 1) h on true
  where l.shop_id in (select my_shops()) or f.system_id in (select visible_systems())
$$;
drop policy see on calibration;
create policy see on calibration for select to mw_person using (
  logger_id in (select logger_id from logger_fitting where system_id = any (array(select visible_systems()))));
drop policy see on logger;
create policy see on logger for select to mw_person using (
  shop_id = any (array(select my_shops()))
  or id in (select logger_id from logger_fitting where system_id = any (array(select visible_systems()))));
drop function visible_loggers();
`)
}
