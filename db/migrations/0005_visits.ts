import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
create table visit (
  id bigint generated always as identity primary key,
  vessel_id bigint not null references vessel on delete cascade,
  system_id bigint references system on delete cascade,
  shop_id bigint not null references shop,
  status text not null default 'asked' check (status in ('asked', 'planned', 'under-way', 'proving', 'closed')),
  complaint text not null default '',
  asked_by bigint references person,
  asked_at timestamptz not null default now(),
  planned_for timestamptz,
  assigned_to bigint references person,
  started_at timestamptz,
  finished_at timestamptz check (finished_at is null or started_at is null or finished_at >= started_at),
  closed_at timestamptz,
  verdict text check (verdict in ('held', 'better-under-limit', 'no-change', 'worse', 'too-early')),
  summary text
);
create index visit_of_vessel on visit (vessel_id, asked_at);
create index visit_of_shop on visit (shop_id) where status <> 'closed';

create table visit_entry (
  id uuid primary key,
  visit_id bigint not null references visit on delete cascade,
  at timestamptz not null,
  entered_by bigint references person,
  kind text not null,
  body jsonb not null default '{}'
);

create table gauge_test (
  id uuid primary key,
  visit_id bigint not null references visit on delete cascade,
  system_id bigint not null references system on delete cascade,
  started_at timestamptz not null,
  ended_at timestamptz not null check (ended_at > started_at),
  part_keys text[] not null check (cardinality(part_keys) > 0),
  start_pa double precision not null,
  end_pa double precision not null,
  resolution_pa double precision,
  air_start_c real,
  air_end_c real,
  barometer_start_pa real,
  barometer_end_pa real,
  entered_by bigint references person
);

create table part_change (
  id uuid primary key,
  visit_id bigint not null references visit on delete cascade,
  part_key text not null,
  at timestamptz not null,
  action text not null check (action in ('cleaned', 'tightened', 'adjusted', 'replaced')),
  detail text
);

create table photo (
  id uuid primary key,
  visit_id bigint not null references visit on delete cascade,
  at timestamptz not null,
  media_type text not null check (media_type in ('image/jpeg', 'image/png', 'image/webp')),
  bytes bytea not null check (length(bytes) <= 8388608),
  caption text
);

create table report_version (
  id bigint generated always as identity primary key,
  visit_id bigint not null references visit on delete cascade,
  version integer not null,
  made_at timestamptz not null,
  body jsonb not null,
  signed_by bigint references person,
  signed_at timestamptz,
  unique (visit_id, version)
);
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table report_version, photo, part_change, gauge_test, visit_entry, visit cascade;
`)
}
