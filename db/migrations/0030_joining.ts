import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- Somebody asked for an account; the person comes to be when the link in the mail is acted on. Nothing typed at
-- asking counts as proof of anything, so the password is chosen afterwards.
create table sign_up (
  id bigint generated always as identity primary key,
  email citext not null,
  name text not null check (length(name) between 1 and 120),
  shop_name text check (length(shop_name) between 1 and 120),
  harbour text,
  time_zone text,
  token_hash bytea not null unique,
  created_at timestamptz not null,
  expires_at timestamptz not null check (expires_at > created_at),
  used_at timestamptz
);

-- The second factor. Secrets are sealed with a key of the server's, recovery codes kept as hashes.
alter table person
  add column totp_pending text,
  add column totp_on_since timestamptz,
  -- The newest time step whose code was taken: a code looked over somebody's shoulder is worth nothing.
  add column totp_last_step bigint;
create table recovery_code (
  person_id bigint not null references person on delete cascade,
  hash bytea not null,
  made_at timestamptz not null,
  used_at timestamptz,
  primary key (person_id, hash)
);

alter table token drop constraint token_purpose_check;
alter table token add constraint token_purpose_check check (purpose in
  ('confirm-email', 'change-email', 'confirm-contact', 'reset-password', 'verify-phone', 'message-link'));
alter table token add column tries integer not null default 0;
create index token_of_person on token (person_id, purpose) where used_at is null;

create index invitation_of_shop on invitation (shop_id) where accepted_at is null and withdrawn_at is null;
create index invitation_of_vessel on invitation (vessel_id) where accepted_at is null and withdrawn_at is null;
create index audit_entry_of_shop on audit_entry (shop_id, at);
create index audit_entry_of_person on audit_entry (person_id, at);

-- What a shop is told, when, and who is called when nobody takes up something urgent.
alter table shop
  add column told_kinds text[],
  add column quiet_start time not null default '22:00',
  add column quiet_end time not null default '07:00',
  add column on_call_id bigint references person on delete set null,
  add constraint shop_quiet_hours check (quiet_start <> quiet_end);

alter table sign_up enable row level security;
alter table recovery_code enable row level security;
create policy ingest_all on sign_up to mw_ingest using (true) with check (true);
create policy ingest_all on recovery_code to mw_ingest using (true) with check (true);
grant select, insert, update, delete on sign_up, recovery_code to mw_ingest;
grant usage, select on all sequences in schema public to mw_ingest;

-- Mails of the account carry one-time links: nobody reads them here, neither the manager nor, by a borrowed
-- session, the person themselves.
-- The policy asks a function, since one that reads message_subject meets that table's policy, which reads messages.
create function managed_messages() returns setof bigint
language sql stable security definer set search_path = public as $$
  select x.id from message x where x.person_id in (select m.person_id from membership m
    where m.ended_at is null and has_role(m.shop_id, array['manager']))
  union select ms.message_id from message_subject ms join notice_event e on e.id = ms.notice_event_id
    join notice n on n.id = e.notice_id join shop_access a on a.vessel_id = n.vessel_id and a.withdrawn_at is null
    where has_role(a.shop_id, array['manager'])
$$;
revoke execute on function managed_messages() from public;
grant execute on function managed_messages() to mw_person, mw_ingest;
drop policy see on message;
create policy see on message for select to mw_person using (purpose <> 'account'
  and (person_id = current_person() or id = any (array(select managed_messages()))));

drop policy see on invitation;
create policy see on invitation for select to mw_person using (
  shop_id = any (array(select my_shops())) or vessel_id = any (array(select owned_vessels()))
  or vessel_id in (select id from vessel where kept_by_shop_id = any (array(select my_shops()))));
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop policy see on invitation;
create policy see on invitation for select to mw_person
  using (shop_id = any (array(select my_shops())) or vessel_id = any (array(select owned_vessels())));
drop policy see on message;
create policy see on message for select to mw_person using (
  person_id = current_person()
  or person_id in (select person_id from membership m where m.shop_id = any (array(select my_shops()))
    and has_role(m.shop_id, array['manager']))
  or id in (select ms.message_id from message_subject ms join notice_event e on e.id = ms.notice_event_id
    join notice n on n.id = e.notice_id join shop_access a on a.vessel_id = n.vessel_id and a.withdrawn_at is null
    where has_role(a.shop_id, array['manager'])));
drop function managed_messages();
alter table shop drop constraint shop_quiet_hours, drop column on_call_id, drop column quiet_end,
  drop column quiet_start, drop column told_kinds;
drop index audit_entry_of_person, audit_entry_of_shop, invitation_of_vessel, invitation_of_shop, token_of_person;
alter table token drop column tries;
delete from token where purpose in ('change-email', 'confirm-contact');
alter table token drop constraint token_purpose_check;
alter table token add constraint token_purpose_check check (purpose in
  ('confirm-email', 'reset-password', 'verify-phone', 'message-link'));
drop table recovery_code, sign_up;
alter table person drop column totp_last_step, drop column totp_on_since, drop column totp_pending;
`)
}
