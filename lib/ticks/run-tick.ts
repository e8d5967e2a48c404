import { beginTick, finishTick } from '@/db/queries/ticks'
import type { Trx } from '@/db/roles'

/** What a tick does, and how much it did: numbers by name, for the log. */
export interface Tick {
  name: string
  /** `service`: the service's role; `owner`: the owner of the tables, for partitions. */
  role: 'service' | 'owner'
  work: (trx: Trx, now: Date) => Promise<Record<string, number>>
}

/**
 * Runs a tick in the caller's transaction, alone among all workers.
 * @returns null when another worker is in it.
 */
export async function runTick(trx: Trx, tick: Tick, now: Date): Promise<Record<string, number> | null> {
  if (!(await beginTick(trx, tick.name, now))) return null
  const done = await tick.work(trx, now)
  await finishTick(trx, tick.name, now)
  return done
}
