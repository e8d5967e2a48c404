import knex, { type Knex } from 'knex'
import pg from 'pg'

// Timestamps as epoch milliseconds in our own types would hide the type; Date objects are what the driver gives.
// Dates without a time stay text: a night belongs to the boat's calendar, not to this process's zone.
pg.types.setTypeParser(pg.types.builtins.DATE, (text) => text)

/** Makes a pool on the database. Nothing is set on the session, so that a transaction pooler may stand between. */
export function connect(url: string, pool: { min?: number; max?: number } = {}): Knex {
  return knex({
    client: 'pg',
    connection: url,
    pool: { min: 0, max: 10, ...pool },
    acquireConnectionTimeout: 10_000,
  })
}

const held = globalThis as { middlewatchDatabase?: Knex }

/** The process's one pool on DATABASE_URL. */
export function database(): Knex {
  const url = process.env.DATABASE_URL
  if (url === undefined || url === '') throw new Error('DATABASE_URL is not set')
  held.middlewatchDatabase ??= connect(url)
  return held.middlewatchDatabase
}

export type { Knex }
