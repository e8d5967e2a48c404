import path from 'node:path'
import type { Knex } from 'knex'

export const MIGRATIONS_FOLDER = path.join(import.meta.dirname, 'migrations')

/** Brings the schema up to date; answers the names of what was run. Safe to run twice. */
export async function migrate(knex: Knex): Promise<string[]> {
  const [, names] = (await knex.migrate.latest({
    directory: MIGRATIONS_FOLDER,
    loadExtensions: ['.ts'],
  })) as [number, string[]]
  return names
}
