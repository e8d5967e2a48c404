import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
create extension if not exists btree_gist;
create extension if not exists citext;

create table shop (
  id bigint generated always as identity primary key,
  name text not null check (length(name) between 1 and 120),
  harbour text,
  time_zone text not null default 'Etc/UTC',
  created_at timestamptz not null default now()
);

create table person (
  id bigint generated always as identity primary key,
  email citext not null unique check (email like '%_@_%'),
  name text not null check (length(name) between 1 and 120),
  password_hash text,
  email_confirmed_at timestamptz,
  totp_secret text,
  units jsonb not null default '{}',
  created_at timestamptz not null default now(),
  deleted_at timestamptz
);

create table session (
  id uuid primary key,
  person_id bigint not null references person on delete cascade,
  created_at timestamptz not null default now(),
  last_seen_at timestamptz not null default now(),
  expires_at timestamptz not null check (expires_at > created_at),
  ended_at timestamptz,
  user_agent text
);
create index session_of_person on session (person_id);

create table membership (
  id bigint generated always as identity primary key,
  shop_id bigint not null references shop on delete cascade,
  person_id bigint not null references person on delete cascade,
  role text not null check (role in ('technician', 'installer', 'manager')),
  since timestamptz not null default now(),
  ended_at timestamptz check (ended_at is null or ended_at >= since)
);
create unique index membership_once on membership (shop_id, person_id, role) where ended_at is null;
create index membership_of_person on membership (person_id) where ended_at is null;

create table vessel (
  id bigint generated always as identity primary key,
  name text not null check (length(name) between 1 and 120),
  time_zone text not null,
  harbour text,
  berth text,
  altitude_m real not null default 0 check (altitude_m between -430 and 5000),
  quiet_start time not null default '22:00',
  quiet_end time not null default '07:00',
  -- The shop that made it keeps it until an owner accepts.
  kept_by_shop_id bigint references shop,
  created_at timestamptz not null default now(),
  check (quiet_start <> quiet_end)
);

create table vessel_owner (
  vessel_id bigint not null references vessel on delete cascade,
  person_id bigint not null references person on delete cascade,
  since timestamptz not null default now(),
  ended_at timestamptz,
  primary key (vessel_id, person_id, since)
);
create index vessel_owner_of_person on vessel_owner (person_id) where ended_at is null;

-- An owner's consent: which shop may see the boat, and how much. Withdrawn rows stay as history.
create table shop_access (
  id bigint generated always as identity primary key,
  vessel_id bigint not null references vessel on delete cascade,
  shop_id bigint not null references shop on delete cascade,
  level text not null check (level in ('figures', 'full')),
  granted_by bigint references person,
  granted_at timestamptz not null default now(),
  withdrawn_at timestamptz check (withdrawn_at is null or withdrawn_at >= granted_at)
);
create unique index shop_access_once on shop_access (vessel_id, shop_id) where withdrawn_at is null;
create index shop_access_of_shop on shop_access (shop_id) where withdrawn_at is null;

create table system (
  id bigint generated always as identity primary key,
  vessel_id bigint not null references vessel on delete cascade,
  name text not null default '',
  created_at timestamptz not null default now(),
  unique (vessel_id, name)
);

create table part (
  id bigint generated always as identity primary key,
  system_id bigint not null references system on delete cascade,
  key text not null,
  kind text not null check (kind in ('head', 'hose', 'tank', 'switch', 'pump')),
  name text not null,
  volume_m3 double precision check (volume_m3 is null or volume_m3 >= 0),
  parent_key text,
  unique (system_id, key)
);

-- The figures of a system from a moment on; the newest at or before an instant is in force.
create table setting (
  id bigint generated always as identity primary key,
  system_id bigint not null references system on delete cascade,
  in_force_from timestamptz not null,
  kind text not null default 'pass-through'
    check (kind in ('pass-through', 'collecting', 'unit', 'two-pumps', 'on-demand')),
  cut_out_pa real check (cut_out_pa between 0 and 101325),
  cut_in_pa real check (cut_in_pa between 0 and 101325),
  limit_seconds integer not null default 10800 check (limit_seconds > 0),
  aim_seconds integer not null default 28800 check (aim_seconds > 0),
  silence_seconds integer not null default 21600 check (silence_seconds > 0),
  pump_amps real check (pump_amps > 0),
  low_supply_v real,
  set_by bigint references person,
  set_at timestamptz not null default now(),
  unique (system_id, in_force_from),
  check (cut_out_pa is null or cut_in_pa is null or cut_out_pa > cut_in_pa),
  check (limit_seconds <= aim_seconds)
);

-- What people say: aboard or away (a vessel's matter), off, laid up, worked on (a system's).
create table statement (
  id bigint generated always as identity primary key,
  vessel_id bigint not null references vessel on delete cascade,
  system_id bigint references system on delete cascade,
  value text not null check (value in ('aboard', 'away', 'off', 'laid-up', 'worked-on')),
  from_at timestamptz not null,
  until_at timestamptz,
  said_by bigint references person,
  said_at timestamptz not null default now(),
  check ((system_id is null) = (value in ('aboard', 'away'))),
  check (until_at is null or until_at >= from_at)
);
create index statement_of_system on statement (system_id, from_at);
create index statement_of_vessel on statement (vessel_id, from_at);

-- How a person wants to be told.
create table contact (
  id bigint generated always as identity primary key,
  person_id bigint not null references person on delete cascade,
  channel text not null check (channel in ('email', 'sms')),
  address text not null,
  verified_at timestamptz,
  consented_at timestamptz,
  stopped_at timestamptz,
  settings jsonb not null default '{}',
  unique (person_id, channel, address)
);

create table invitation (
  id bigint generated always as identity primary key,
  email citext not null,
  shop_id bigint references shop on delete cascade,
  role text check (role in ('technician', 'installer', 'manager')),
  vessel_id bigint references vessel on delete cascade,
  token_hash bytea not null unique,
  invited_by bigint references person,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null,
  accepted_at timestamptz,
  withdrawn_at timestamptz,
  check ((shop_id is not null and role is not null) or vessel_id is not null)
);

-- One-time secrets sent to people: password resets, confirmations, links in messages.
create table token (
  hash bytea primary key,
  purpose text not null check (purpose in ('confirm-email', 'reset-password', 'verify-phone', 'message-link')),
  person_id bigint references person on delete cascade,
  subject text,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null,
  used_at timestamptz
);

create table audit_entry (
  id bigint generated always as identity primary key,
  at timestamptz not null default now(),
  person_id bigint references person,
  vessel_id bigint references vessel on delete cascade,
  shop_id bigint references shop on delete cascade,
  action text not null,
  detail jsonb not null default '{}'
);
create index audit_entry_of_vessel on audit_entry (vessel_id, at);
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table audit_entry, token, invitation, contact, statement, setting, part, system, shop_access, vessel_owner,
  vessel, membership, session, person, shop cascade;
`)
}
