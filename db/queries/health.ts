import type { Trx } from '@/db/roles'

/** Names of the migrations that were run. */
export async function migrationsRun(trx: Trx): Promise<string[]> {
  const rows = await trx('knex_migrations').select<{ name: string }[]>('name')
  return rows.map((row) => row.name)
}

export async function lastTickAt(trx: Trx): Promise<Date | null> {
  const row = await trx('tick').first<{ at: Date | null }>(trx.raw('max(last_finished_at) as at'))
  return row.at
}

/** Whether the database's zone rules are of 2026 or later: since then Winnipeg keeps its summer clock. */
export async function zoneRulesOf2026(trx: Trx): Promise<boolean> {
  const { rows } = await trx.raw<{ rows: { hour: number }[] }>(
    `select extract(hour from timestamptz '2026-12-01T12:00:00Z' at time zone 'America/Winnipeg')::int as hour`,
  )
  return rows[0]?.hour === 7
}
