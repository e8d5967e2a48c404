import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- A cup of water went into one bowl: which, and when. What the leak did then is read from the record itself, so
-- that readings that come late still count. Taken back is kept, since "as of then" must find what was believed then.
create table cup_test (
  id bigint generated always as identity primary key,
  system_id bigint not null references system on delete cascade,
  part_key text,
  head_name text not null check (length(head_name) between 1 and 120),
  water_at timestamptz not null,
  said_by bigint not null references person,
  said_at timestamptz not null check (said_at >= water_at),
  -- Set when the next one begins: two wet bowls cannot be told apart.
  ended_at timestamptz check (ended_at >= water_at),
  taken_back_at timestamptz check (taken_back_at >= said_at)
);
create unique index cup_test_open on cup_test (system_id) where ended_at is null and taken_back_at is null;
create index cup_test_of_system on cup_test (system_id, water_at desc);

grant select, insert, update, delete on cup_test to mw_ingest;
grant select on cup_test to mw_person;
grant usage, select on all sequences in schema public to mw_ingest, mw_person;
alter table cup_test enable row level security;
create policy ingest_all on cup_test to mw_ingest using (true) with check (true);
-- It tells that somebody was up and which bowl was used: it belongs to the full record, as flushes do.
create policy see on cup_test for select to mw_person using (system_id = any (array(select full_record_systems())));
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table cup_test')
}
