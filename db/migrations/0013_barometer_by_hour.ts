import type { Knex } from 'knex'

/** The barometer by the hour too, so that a long stretch of the record can show the weather beside the vacuum. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
alter table sample_hour
  add column barometer_min_pa real,
  add column barometer_max_pa real,
  add column barometer_mean_pa real;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(
    'alter table sample_hour drop column barometer_min_pa, drop column barometer_max_pa, drop column barometer_mean_pa',
  )
}
