import { readdir, readFile } from 'node:fs/promises'
import path from 'node:path'
import { lastTickAt, migrationsRun, zoneRulesOf2026 } from '@/db/queries/health'
import { queueBacklog } from '@/db/queries/message-queue'
import { asIngest } from '@/db/roles'
import { log } from '@/lib/log'
import { Problem } from '@/lib/problem'
import type { Health } from '@/shared/schemas'

/**
 * Whether the service is ready: its database answers and its schema is current.
 * @throws Problem `busy`, carrying the same members, when it is not
 */
export async function getHealth(now: Date): Promise<Health> {
  const health = await look(now)
  if (health.database === 'ok' && health.migrations !== 'pending') return health
  const detail =
    health.database === 'ok'
      ? 'The database schema is older than the program.'
      : 'The database does not answer.'
  throw new Problem('busy', detail, { extensions: health, headers: { 'retry-after': '10' } })
}

async function look(now: Date): Promise<Health> {
  try {
    return await asIngest(async (trx) => {
      const { backlog, lagSeconds } = await queueBacklog(trx, now)
      return {
        database: 'ok',
        migrations: await migrationState(await migrationsRun(trx)),
        queueLagSeconds: Math.round(lagSeconds),
        lastTickAt: (await lastTickAt(trx))?.toISOString() ?? null,
        backlog,
        zoneData: await zoneData(await zoneRulesOf2026(trx)),
      }
    })
  } catch (error) {
    log.error({ err: error }, 'health')
    const none = { queueLagSeconds: null, lastTickAt: null, backlog: null, zoneData: null }
    // Tables that are not there yet are a matter of the schema, not of the connection.
    const missing = error instanceof Error && 'code' in error && error.code === '42P01'
    return missing
      ? { database: 'ok', migrations: 'pending', ...none }
      : { database: 'unreachable', migrations: 'unknown', ...none }
  }
}

async function migrationState(run: readonly string[]): Promise<Health['migrations']> {
  try {
    const files = await readdir(path.join(process.cwd(), 'db', 'migrations'))
    return files.filter((name) => name.endsWith('.ts')).every((name) => run.includes(name))
      ? 'current'
      : 'pending'
  } catch {
    return 'unknown'
  }
}

/** The version that the operating system's zone data give themselves, and what the database's own answer shows. */
async function zoneData(rulesOf2026: boolean): Promise<string> {
  const shown = rulesOf2026 ? 'rules of 2026' : 'rules older than 2026'
  try {
    const [first = ''] = (await readFile('/usr/share/zoneinfo/tzdata.zi', 'utf8')).split('\n', 1)
    const version = /^# version (\S+)/.exec(first)?.[1]
    return version === undefined ? shown : `${version} (${shown})`
  } catch {
    return shown
  }
}
