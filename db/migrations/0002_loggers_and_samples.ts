import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
create table logger (
  id integer generated always as identity primary key,
  serial text not null unique check (serial ~ '^[A-Za-z0-9][A-Za-z0-9._-]{1,63}$'),
  shop_id bigint references shop,
  interval_seconds integer not null check (interval_seconds between 1 and 3600),
  channels text[] not null check (channels <@ array['pump', 'vacuum', 'air', 'barometer', 'supply']
    and channels && array['pump', 'vacuum']),
  key_hash bytea unique check (length(key_hash) = 32),
  key_made_at timestamptz,
  retired_at timestamptz,
  last_heard_at timestamptz,
  clock_offset_seconds double precision,
  -- A finer rhythm asked for while somebody watches.
  fine_interval_seconds integer,
  fine_until timestamptz,
  created_at timestamptz not null default now()
);

create table logger_fitting (
  id bigint generated always as identity primary key,
  logger_id integer not null references logger,
  system_id bigint not null references system on delete cascade,
  span tstzrange not null check (not isempty(span) and lower_inc(span) and not upper_inc(span)),
  fitted_by bigint references person,
  exclude using gist (logger_id with =, span with &&),
  exclude using gist (system_id with =, span with &&)
);
create index logger_fitting_of_system on logger_fitting (system_id);

create table calibration (
  id bigint generated always as identity primary key,
  logger_id integer not null references logger,
  in_force_from timestamptz not null,
  vacuum_offset_pa real not null default 0,
  vacuum_gain real not null default 1 check (vacuum_gain between 0.5 and 2),
  done_by bigint references person,
  done_at timestamptz not null default now(),
  unique (logger_id, in_force_from)
);

create table device_claim (
  id bigint generated always as identity primary key,
  device_code_hash bytea not null unique,
  user_code text not null unique,
  serial text not null,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null,
  interval_seconds integer not null default 5,
  last_polled_at timestamptz,
  approved_by bigint references person,
  system_id bigint references system on delete cascade,
  logger_id integer references logger,
  denied_at timestamptz,
  granted_at timestamptz
);

create table upload (
  id integer generated always as identity primary key,
  logger_id integer not null references logger,
  received_at timestamptz not null,
  idempotency_key text,
  format text not null check (format in ('senml', 'csv', 'import')),
  first_at timestamptz,
  last_at timestamptz,
  received integer not null,
  stored integer not null,
  duplicate integer not null,
  conflicting integer not null,
  rejected integer not null,
  clock_offset_seconds double precision,
  shifted boolean not null default false,
  undone_at timestamptz,
  -- The answer as given, for the same question asked again.
  answer jsonb,
  imported_by bigint references person,
  check (received = stored + duplicate + conflicting + rejected)
);
create unique index upload_idempotency on upload (logger_id, idempotency_key) where idempotency_key is not null;
create index upload_of_logger on upload (logger_id, received_at);

-- No foreign keys on purpose: they halve the speed of loading. Months are attached by sample_partitions.
create table sample (
  logger_id integer not null,
  upload_id integer not null,
  at timestamptz not null,
  vacuum_pa real,
  air_c real,
  barometer_pa real,
  supply_v real,
  pump_on boolean,
  primary key (logger_id, at)
) partition by range (at);

create table sample_hour (
  logger_id integer not null,
  hour timestamptz not null,
  samples integer not null,
  vacuum_min_pa real,
  vacuum_max_pa real,
  vacuum_mean_pa real,
  air_min_c real,
  air_max_c real,
  air_mean_c real,
  supply_min_v real,
  supply_max_v real,
  supply_mean_v real,
  primary key (logger_id, hour)
);

-- Creates the partitions for the months from first to last (inclusive); attached, so that readers are not stopped.
create function sample_partitions(first date, last date) returns integer language plpgsql as $$
declare
  month date := date_trunc('month', first)::date;
  made integer := 0;
  name text;
begin
  while month <= last loop
    name := 'sample_' || to_char(month, 'YYYY_MM');
    if to_regclass(name) is null then
      execute format('create table %I (like sample including all)', name);
      execute format('alter table sample attach partition %I for values from (%L) to (%L)', name,
        month::timestamp at time zone 'UTC', (month + interval '1 month')::timestamp at time zone 'UTC');
      made := made + 1;
    end if;
    month := (month + interval '1 month')::date;
  end loop;
  return made;
end $$;

select sample_partitions((now() - interval '14 months')::date, (now() + interval '3 months')::date);
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table sample_hour, sample, upload, device_claim, calibration, logger_fitting, logger cascade;
drop function sample_partitions(date, date);
`)
}
