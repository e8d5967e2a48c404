import type { Trx } from '@/db/roles'
import { forgetAccountBodies } from '@/db/queries/joining'
import { env } from '@/lib/env'
import { forgetOldAnswers } from '@/db/queries/uploads'
import { attachMonths, clearExpired, expireNotices } from '@/db/queries/housekeeping'
import type { Tick } from '@/lib/ticks/run-tick'

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS
const MONTHS_AHEAD = 3
/** A step is old news after a while: the leak is simply what it is. */
const STEP_STANDS_MS = 14 * DAY_MS
/** Signed-out sessions and spent secrets are kept for a while, for the question "was that me?". */
const KEEP_MS = 30 * DAY_MS

/** Partitions for the months to come, attached by the owner of the tables. */
export const partitionTick: Tick = {
  name: 'partitions',
  role: 'owner',
  work: async (trx, now) => ({ attached: await attachMonths(trx, now, MONTHS_AHEAD) }),
}

/** Ends notices that only time ends, and clears sessions, secrets and claims that have run out. */
export const housekeepingTick: Tick = { name: 'housekeeping', role: 'service', work: tidy }

export async function tidy(trx: Trx, now: Date): Promise<Record<string, number>> {
  return {
    expired: await expireNotices(trx, 'step', new Date(now.getTime() - STEP_STANDS_MS), now),
    cleared: await clearExpired(trx, new Date(now.getTime() - KEEP_MS)),
    answers: await forgetOldAnswers(trx, now),
    // The outbox of demo and tests shows what was sent; elsewhere a one-time link has no business in a table.
    forgotten:
      env().mode === 'production' ? await forgetAccountBodies(trx, new Date(now.getTime() - HOUR_MS)) : 0,
  }
}
