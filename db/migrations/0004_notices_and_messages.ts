import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
create table notice (
  id bigint generated always as identity primary key,
  system_id bigint not null references system on delete cascade,
  vessel_id bigint not null references vessel on delete cascade,
  kind text not null check (kind in ('night-warning', 'short-hold', 'short-cycling', 'running-on', 'no-start',
    'slow-recharge', 'switch-drift', 'step', 'logger-silent', 'sensor-fault', 'low-supply', 'freeze')),
  opened_at timestamptz not null,
  closed_at timestamptz check (closed_at is null or closed_at >= opened_at),
  held_since timestamptz,
  severity double precision not null default 0,
  reason text not null,
  evidence jsonb not null default '{}',
  -- The night a night warning is about: one a system and night, however often the tick runs.
  night date,
  acknowledged_at timestamptz,
  acknowledged_by bigint references person,
  acknowledged_note text,
  snoozed_until timestamptz,
  check ((kind = 'night-warning') = (night is not null))
);
create unique index notice_open_once on notice (system_id, kind) where closed_at is null;
create unique index notice_night_once on notice (system_id, night) where night is not null;
create index notice_of_vessel on notice (vessel_id, opened_at);

create table notice_event (
  id bigint generated always as identity primary key,
  notice_id bigint not null references notice on delete cascade,
  at timestamptz not null,
  transition text not null check (transition in ('opened', 'worsened', 'ended', 'held', 'resumed', 'acknowledged',
    'snoozed', 'escalated')),
  sequence integer not null default 1,
  reason text not null,
  evidence jsonb not null default '{}',
  unique (notice_id, transition, sequence)
);

create table message (
  id bigint generated always as identity primary key,
  person_id bigint not null references person on delete cascade,
  channel text not null check (channel in ('email', 'sms')),
  address text not null,
  subject text,
  body_text text not null,
  body_html text,
  queued_at timestamptz not null,
  send_after timestamptz not null,
  accepted_at timestamptz,
  delivered_at timestamptz,
  failed_at timestamptz,
  failure text,
  service_id text,
  -- A short code for the link in a text.
  link_code text unique
);
create index message_waiting on message (send_after) where accepted_at is null and failed_at is null;
create index message_of_person on message (person_id, queued_at);

-- What a message tells: unique by notice, transition, channel and person, so that nothing is told twice.
create table message_subject (
  message_id bigint not null references message on delete cascade,
  notice_event_id bigint not null references notice_event on delete cascade,
  channel text not null,
  person_id bigint not null references person on delete cascade,
  primary key (message_id, notice_event_id),
  unique (notice_event_id, channel, person_id)
);

create table delivery_attempt (
  id bigint generated always as identity primary key,
  message_id bigint not null references message on delete cascade,
  at timestamptz not null,
  outcome text not null check (outcome in ('accepted', 'refused', 'failed', 'delivered', 'undelivered')),
  detail text
);
create index delivery_attempt_of_message on delivery_attempt (message_id);

-- When each tick last ran, for health and for two workers not to do one thing twice.
create table tick (
  name text primary key,
  last_started_at timestamptz,
  last_finished_at timestamptz
);
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table tick, delivery_attempt, message_subject, message, notice_event, notice cascade;
`)
}
