import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- An invited person has no account yet, and still gets mail.
alter table message alter column person_id drop not null;
alter table message
  add column purpose text not null default 'notice' check (purpose in ('notice', 'account', 'reply', 'report')),
  add column urgency text not null default 'day' check (urgency in ('day', 'evening', 'now')),
  -- After this instant the message would tell of a night long past; it is given up instead.
  add column useful_until timestamptz,
  -- Taken back before it was sent: what it told had ended.
  add column cancelled_at timestamptz,
  -- [{ filename, contentType, base64 }]
  add column attachments jsonb;
drop index message_waiting;
create index message_waiting on message (send_after)
  where accepted_at is null and failed_at is null and cancelled_at is null;
create index message_to_address on message (address, queued_at) where channel = 'sms';
create index message_subject_of_event on message_subject (notice_event_id);

-- Texts that people sent to the service's number; the service may hand one in twice.
create table inbound_text (
  service_id text primary key,
  at timestamptz not null,
  address text not null,
  word text,
  person_id bigint references person on delete set null,
  did text not null
);
alter table inbound_text enable row level security;
create policy ingest_all on inbound_text to mw_ingest using (true) with check (true);
grant select, insert, update, delete on inbound_text to mw_ingest;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop table inbound_text;
drop index message_subject_of_event;
drop index message_to_address;
drop index message_waiting;
delete from message where person_id is null;
alter table message drop column attachments, drop column cancelled_at, drop column useful_until,
  drop column urgency, drop column purpose;
alter table message alter column person_id set not null;
create index message_waiting on message (send_after) where accepted_at is null and failed_at is null;
`)
}
