import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- One row a system: the head of the fold, and the figures last computed from it (all that a fleet page reads).
create table system_state (
  system_id bigint primary key references system on delete cascade,
  deriver_version integer not null default 0,
  head_at timestamptz,
  head jsonb,
  last_heard_at timestamptz,
  sealed_until timestamptz,
  rebuild_wanted boolean not null default false,
  figures jsonb,
  figures_at timestamptz
);

create table checkpoint (
  system_id bigint not null references system on delete cascade,
  at timestamptz not null,
  block timestamptz not null,
  state jsonb not null,
  primary key (system_id, at)
);

create table run (
  system_id bigint not null references system on delete cascade,
  started_at timestamptz not null,
  stopped_at timestamptz not null,
  trigger text not null check (trigger in ('leak', 'flush', 'startup', 'unknown')),
  vacuum_at_start_pa double precision,
  vacuum_at_stop_pa double precision,
  recharge_pa_per_second double precision,
  supply_v double precision,
  edge_uncertainty_seconds double precision not null,
  interrupted boolean not null default false,
  known_at timestamptz not null,
  primary key (system_id, started_at),
  check (stopped_at >= started_at),
  check (known_at >= stopped_at)
);
create index run_known on run (system_id, known_at);

create table hold (
  system_id bigint not null references system on delete cascade,
  started_at timestamptz not null,
  ended_at timestamptz not null,
  ending text not null check (ending in ('leak', 'flush', 'unknown', 'interrupted')),
  flushes integer not null,
  cut_out_pa double precision,
  settled_pa double precision,
  end_pa double precision,
  learned_cut_out_pa double precision,
  learned_settled_pa double precision,
  learned_cut_in_pa double precision,
  set_aside boolean not null default false,
  edge_uncertainty_seconds double precision not null,
  known_at timestamptz not null,
  primary key (system_id, started_at),
  check (ended_at >= started_at)
);
create index hold_known on hold (system_id, known_at);

create table leg (
  system_id bigint not null references system on delete cascade,
  started_at timestamptz not null,
  hold_started_at timestamptz not null,
  ended_at timestamptz not null,
  since_flush_seconds double precision,
  bins jsonb not null,
  rate_pa_per_hour double precision,
  rate_low double precision,
  rate_high double precision,
  compensated boolean,
  set_aside boolean not null default false,
  known_at timestamptz not null,
  primary key (system_id, started_at),
  check (ended_at >= started_at)
);
create index leg_known on leg (system_id, known_at);

create table flush (
  system_id bigint not null references system on delete cascade,
  at timestamptz not null,
  drop_pa double precision not null,
  started_pump boolean not null,
  known_at timestamptz not null,
  primary key (system_id, at)
);
create index flush_known on flush (system_id, known_at);

create table fault (
  system_id bigint not null references system on delete cascade,
  kind text not null check (kind in ('stuck', 'off-scale', 'jump', 'zero-drift', 'swapped-sign')),
  started_at timestamptz not null,
  ended_at timestamptz not null,
  detail text not null,
  known_at timestamptz not null,
  primary key (system_id, kind, started_at)
);
create index fault_known on fault (system_id, known_at);

-- A day of a system (UTC date of its start), for weeks and months at a glance; derived from the rows above.
create table system_day (
  system_id bigint not null references system on delete cascade,
  day date not null,
  leak_runs integer not null,
  flush_runs integer not null,
  flushes integer not null,
  run_seconds double precision not null,
  observed_seconds double precision not null,
  leak_pa_per_hour double precision,
  leak_sigma_pa_per_hour double precision,
  hold_seconds double precision,
  recharge_pa_per_second double precision,
  primary key (system_id, day)
);

-- What was foretold, when, and how it came out.
create table outlook (
  id bigint generated always as identity primary key,
  system_id bigint not null references system on delete cascade,
  night date not null,
  given_at timestamptz not null,
  quiet_from timestamptz not null,
  quiet_to timestamptz not null check (quiet_to > quiet_from),
  chance real check (chance between 0 and 1),
  chance_if_flushed_last real check (chance_if_flushed_last between 0 and 1),
  expected_runs real,
  aboard text not null check (aboard in ('aboard', 'away', 'unknown')),
  detail jsonb not null,
  outcome text check (outcome in ('hit', 'false', 'missed', 'quiet', 'unknown')),
  runs integer,
  scored_at timestamptz,
  unique (system_id, night)
);
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table outlook, system_day, fault, flush, leg, hold, run, checkpoint, system_state cascade;
`)
}
