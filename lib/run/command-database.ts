import path from 'node:path'
import { connect } from '@/db/knex'
import { startLocalServer } from '@/db/local-server'

const ROOT = path.resolve(import.meta.dirname, '../..')
const NAME = 'middlewatch'

/**
 * Gives a command its database: that of DATABASE_URL, else the private one of this folder, started if it does not
 * run. Afterwards DATABASE_URL is set. @returns ends what was started here.
 */
export async function commandDatabase(): Promise<() => Promise<void>> {
  if (process.env.DATABASE_URL) return () => Promise.resolve()
  const server = await startLocalServer({ dataFolder: path.join(ROOT, '.data', 'postgres') })
  const admin = connect(server.url, { max: 1 })
  try {
    const { rowCount } = await admin.raw<{ rowCount: number }>(
      'select 1 from pg_database where datname = ?',
      [NAME],
    )
    if (rowCount === 0) await admin.raw('create database ??', [NAME])
  } finally {
    await admin.destroy()
  }
  process.env.DATABASE_URL = server.urlOf(NAME)
  process.env.MODE ??= 'demo'
  return () => server.stop()
}
