import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- One fitting of one logger, from the code typed in to the record signed off. It can be left and taken up again.
create table commissioning (
  id bigint generated always as identity primary key,
  started_by bigint not null references person,
  shop_id bigint references shop,
  started_at timestamptz not null,
  -- claim: the logger fetches its key itself (RFC 8628); key: shown once; known: it has its key already.
  way text not null check (way in ('claim', 'key', 'known')),
  serial text not null check (serial ~ '^[A-Za-z0-9][A-Za-z0-9._-]{1,63}$'),
  user_code text,
  system_id bigint references system on delete cascade,
  logger_id integer references logger,
  fitted_at timestamptz,
  set_aside_at timestamptz,
  finished_at timestamptz,
  finished_by bigint references person,
  passed boolean,
  note text check (length(note) <= 2000),
  check ((finished_at is null) = (finished_by is null)),
  check (logger_id is null or system_id is not null)
);
create index commissioning_of_logger on commissioning (logger_id, started_at desc);
create index commissioning_of_system on commissioning (system_id);
create index commissioning_of_person on commissioning (started_by) where finished_at is null;

-- Every attempt stays: what failed first is part of the record. The newest of a kind counts.
create table commissioning_check (
  id bigint generated always as identity primary key,
  commissioning_id bigint not null references commissioning on delete cascade,
  kind text not null check (kind in ('first-reading', 'leak-down-before', 'zero', 'two-point', 'pump-channel',
    'breaker-off', 'leak-down-after')),
  began_at timestamptz not null,
  done_at timestamptz check (done_at >= began_at),
  done_by bigint references person,
  outcome text check (outcome in ('passed', 'failed', 'cannot-tell', 'left-out')),
  -- What the hand gauge said, what the server made of it, and why, in the words shown then.
  given jsonb not null default '{}',
  figures jsonb not null default '[]',
  reason text not null default '',
  check ((done_at is null) = (outcome is null))
);
create index commissioning_check_of on commissioning_check (commissioning_id, id);

grant select, insert, update, delete on commissioning, commissioning_check to mw_ingest;
grant select on commissioning, commissioning_check to mw_person;
grant usage, select on all sequences in schema public to mw_ingest, mw_person;
alter table commissioning enable row level security;
alter table commissioning_check enable row level security;
create policy ingest_all on commissioning to mw_ingest using (true) with check (true);
create policy ingest_all on commissioning_check to mw_ingest using (true) with check (true);

-- A system's record goes with sight of the system; before one is chosen it is its starter's and the shop's managers'.
create policy see on commissioning for select to mw_person using (
  case when system_id is null
    then started_by = current_person() or has_role(shop_id, array['installer', 'manager'])
    else system_id = any (array(select visible_systems())) end);
create policy see on commissioning_check for select to mw_person using (
  commissioning_id in (select id from commissioning));

-- Who may write: the owner of the boat, installers and managers of a shop that may see it.
create function fits_loggers(p_system bigint) returns boolean
language sql stable security definer set search_path = public as $$
  select exists (select 1 from system s join vessel v on v.id = s.vessel_id
    where s.id = p_system and (v.id in (select owned_vessels())
      or has_role(v.kept_by_shop_id, array['installer', 'manager'])
      or exists (select 1 from shop_access a where a.vessel_id = v.id and a.withdrawn_at is null
        and has_role(a.shop_id, array['installer', 'manager']))))
$$;
revoke execute on function fits_loggers(bigint) from public;
grant execute on function fits_loggers(bigint) to mw_person, mw_ingest;
grant insert, update on commissioning, commissioning_check to mw_person;
create policy begin on commissioning for insert to mw_person with check (
  started_by = current_person() and (system_id is null or fits_loggers(system_id)));
create policy go_on on commissioning for update to mw_person
  using (case when system_id is null then started_by = current_person() else fits_loggers(system_id) end)
  with check (system_id is null or fits_loggers(system_id));
create policy check_it on commissioning_check for insert to mw_person with check (
  commissioning_id in (select id from commissioning where fits_loggers(system_id) and finished_at is null));
create policy conclude on commissioning_check for update to mw_person using (
  commissioning_id in (select id from commissioning where fits_loggers(system_id) and finished_at is null));

-- The newest supply voltage of loggers one sees, and the figures they are judged by. Samples are not granted to people.
create function logger_health() returns table (logger_id integer, supply_v real, supply_at timestamptz,
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
revoke execute on function logger_health() from public;
grant execute on function logger_health() to mw_person;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table commissioning_check, commissioning;
drop function fits_loggers(bigint);
drop function logger_health();
`)
}
