import { inject } from 'vitest'
import { connect, type Knex } from '@/db/knex'

export interface TestDatabase {
  url: string
  /** As the owner of the tables: sees everything, for arranging and looking. */
  knex: Knex
  drop(): Promise<void>
}

let count = 0

/** A fresh clone of the template (schema, demo shops and people), for tests that must be alone with their rows. */
export async function testDatabase(): Promise<TestDatabase> {
  const { adminUrl } = inject('settings')
  count += 1
  const name = `mw_clone_${process.pid}_${count}`
  const admin = connect(adminUrl, { max: 1 })
  try {
    await admin.raw('create database ?? template mw_template', [name])
  } finally {
    await admin.destroy()
  }
  const url = new URL(adminUrl)
  url.pathname = `/${name}`
  const knex = connect(url.href, { max: 4 })
  return {
    url: url.href,
    knex,
    drop: async () => {
      await knex.destroy()
      const again = connect(adminUrl, { max: 1 })
      await again.raw('drop database ?? with (force)', [name]).finally(() => again.destroy())
    },
  }
}

/** The server's own database as its owner, for looking behind what the API answers. */
export function serverDatabase(): Knex {
  return connect(inject('settings').databaseUrl, { max: 2 })
}

/** Lets `database()`, `asPerson` and `asIngest` of this process work on a clone. Call before anything else uses them. */
export async function useDatabase(url: string): Promise<void> {
  const held = globalThis as { middlewatchDatabase?: Knex }
  await held.middlewatchDatabase?.destroy()
  delete held.middlewatchDatabase
  process.env.DATABASE_URL = url
}
