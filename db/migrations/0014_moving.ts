import type { Knex } from 'knex'

/** How a system's leak moves over weeks, kept for the fleet and found anew every few hours. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
alter table system_state add column moving jsonb, add column moving_at timestamptz;
create index system_state_moving on system_state (moving_at nulls first) where head_at is not null;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
drop index system_state_moving;
alter table system_state drop column moving, drop column moving_at;
`)
}
