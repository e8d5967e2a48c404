import type { Trx } from '@/db/roles'

/**
 * Takes the tick's lock for this transaction and notes that it began.
 * @returns false when another worker is in the same tick at this moment.
 */
export async function beginTick(trx: Trx, name: string, now: Date): Promise<boolean> {
  const { rows } = (await trx.raw('select pg_try_advisory_xact_lock(hashtext(?)) as taken', [
    `middlewatch tick ${name}`,
  ])) as { rows: { taken: boolean }[] }
  if (rows[0]?.taken !== true) return false
  await trx('tick').insert({ name, last_started_at: now }).onConflict('name').merge(['last_started_at'])
  return true
}

export async function finishTick(trx: Trx, name: string, now: Date): Promise<void> {
  await trx('tick').where({ name }).update({ last_finished_at: now })
}
