import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- How far an upload's sample times were shifted, so that the logger's own times can always be had back.
alter table upload add column shift_seconds double precision not null default 0;
create index upload_shifted on upload (logger_id, received_at) where shift_seconds <> 0;

-- From when on a system's rows no longer follow from its dated facts; null = they do.
alter table system_state add column refold_from timestamptz;
create index system_state_to_refold on system_state (system_id) where refold_from is not null or rebuild_wanted;

-- The mark is set where the fact is written, so that no writer can forget it.
create function want_refold(p_system bigint, p_from timestamptz) returns void
language sql security definer set search_path = public as $$
  insert into system_state as s (system_id, refold_from) values (p_system, p_from)
  on conflict (system_id) do update set refold_from = least(s.refold_from, excluded.refold_from)
$$;

create function mark_setting() returns trigger language plpgsql security definer set search_path = public as $$
declare
  changed timestamptz := least(old.in_force_from, new.in_force_from);
begin
  -- The first figures told stand for the time before them too.
  if not exists (select 1 from setting where system_id = coalesce(new.system_id, old.system_id) and in_force_from < changed) then
    changed := '-infinity';
  end if;
  if exists (select 1 from system where id = coalesce(new.system_id, old.system_id)) then
    perform want_refold(coalesce(new.system_id, old.system_id), changed);
  end if;
  return null;
end $$;
create trigger mark_refold after insert or update or delete on setting for each row execute function mark_setting();

create function mark_statement() returns trigger language plpgsql security definer set search_path = public as $$
declare
  of_system bigint := coalesce(new.system_id, old.system_id);
  changed timestamptz := least(old.from_at, new.from_at);
begin
  if tg_op = 'UPDATE' and (old.value, old.from_at) = (new.value, new.from_at) then
    if old.until_at is not distinct from new.until_at then return null; end if;
    changed := least(old.until_at, new.until_at);
  end if;
  if of_system is not null and exists (select 1 from system where id = of_system) then
    perform want_refold(of_system, changed);
  end if;
  return null;
end $$;
create trigger mark_refold after insert or update or delete on statement
  for each row execute function mark_statement();

create function mark_fitting() returns trigger language plpgsql security definer set search_path = public as $$
declare
  changed timestamptz := least(lower(old.span), lower(new.span));
begin
  if tg_op = 'UPDATE' and (old.system_id, old.logger_id, lower(old.span)) = (new.system_id, new.logger_id, lower(new.span)) then
    if old.span = new.span then return null; end if;
    changed := least(upper(old.span), upper(new.span));
  end if;
  perform want_refold(id, changed) from system where id in (old.system_id, new.system_id) order by id;
  return null;
end $$;
create trigger mark_refold after insert or update or delete on logger_fitting
  for each row execute function mark_fitting();

create function mark_calibration() returns trigger language plpgsql security definer set search_path = public as $$
declare
  changed timestamptz := least(old.in_force_from, new.in_force_from);
begin
  perform want_refold(f.system_id, greatest(changed, lower(f.span)))
  from logger_fitting f
  where f.logger_id in (old.logger_id, new.logger_id) and (upper(f.span) is null or upper(f.span) > changed)
  order by f.system_id;
  return null;
end $$;
create trigger mark_refold after insert or update or delete on calibration
  for each row execute function mark_calibration();

create function mark_logger() returns trigger language plpgsql security definer set search_path = public as $$
begin
  perform want_refold(f.system_id, lower(f.span)) from logger_fitting f where f.logger_id = new.id order by f.system_id;
  return null;
end $$;
create trigger mark_refold after update of interval_seconds, channels on logger
  for each row when ((old.interval_seconds, old.channels) is distinct from (new.interval_seconds, new.channels))
  execute function mark_logger();

revoke execute on function want_refold(bigint, timestamptz) from public;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop trigger mark_refold on logger;
drop trigger mark_refold on calibration;
drop trigger mark_refold on logger_fitting;
drop trigger mark_refold on statement;
drop trigger mark_refold on setting;
drop function mark_logger(), mark_calibration(), mark_fitting(), mark_statement(), mark_setting(),
  want_refold(bigint, timestamptz);
alter table system_state drop column refold_from;
alter table upload drop column shift_seconds;
`)
}
