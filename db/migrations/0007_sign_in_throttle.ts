import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- Failed sign-ins and other guesses counted for all web processes together; columns as the limiter's library wants them.
create table throttle (
  key varchar(255) primary key,
  points integer not null default 0,
  expire bigint
);
create index throttle_expiry on throttle (expire);
alter table throttle enable row level security;
create policy ingest_all on throttle to mw_ingest using (true) with check (true);
grant select, insert, update, delete on throttle to mw_ingest;

-- Staff see the full record by the owner's second consent or a visit under way; an installer only while fitting:
-- the day after making the key of a logger that they fitted. A boat without an owner belongs to the shop that keeps it.
create or replace function full_record_vessels() returns setof bigint
language sql stable security definer set search_path = public as $$
  select owned_vessels()
  union select a.vessel_id from shop_access a where a.withdrawn_at is null and a.level = 'full'
    and has_role(a.shop_id, array['technician', 'manager'])
  union select v.vessel_id from visit v join shop_access a on a.vessel_id = v.vessel_id and a.shop_id = v.shop_id
    where a.withdrawn_at is null and v.status in ('under-way', 'proving')
      and has_role(v.shop_id, array['technician', 'manager'])
  union select s.vessel_id from logger_fitting f join logger l on l.id = f.logger_id join system s on s.id = f.system_id
    where f.fitted_by = current_person() and upper_inf(f.span) and l.retired_at is null
      and l.key_made_at > now() - interval '24 hours' and s.vessel_id in (
        select a.vessel_id from shop_access a where a.withdrawn_at is null and has_role(a.shop_id, array['installer']))
  union select id from vessel where kept_by_shop_id in (select my_shops())
$$;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
create or replace function full_record_vessels() returns setof bigint
language sql stable security definer set search_path = public as $$
  select owned_vessels()
  union select vessel_id from shop_access where withdrawn_at is null and level = 'full' and shop_id in (select my_shops())
  union select v.vessel_id from visit v join shop_access a on a.vessel_id = v.vessel_id and a.shop_id = v.shop_id
    where a.withdrawn_at is null and v.status in ('under-way', 'proving') and v.shop_id in (select my_shops())
  union select id from vessel where kept_by_shop_id in (select my_shops())
$$;
drop table throttle;
`)
}
