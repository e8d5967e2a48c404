import { database } from '@/db/knex'
import { asIngest } from '@/db/roles'
import { log } from '@/lib/log'
import { escalationTick } from '@/lib/ticks/escalation'
import { figuresTick } from '@/lib/ticks/figures'
import { housekeepingTick, partitionTick } from '@/lib/ticks/housekeeping'
import { morningTick } from '@/lib/ticks/morning'
import { movingTick } from '@/lib/ticks/moving'
import { nightTick } from '@/lib/ticks/night'
import { runTick, type Tick } from '@/lib/ticks/run-tick'
import { silenceTick } from '@/lib/ticks/silence'
import { stepsTick } from '@/lib/ticks/steps'
import { tonightTick } from '@/lib/ticks/tonight'

/** What is asked every minute, most pressing first. */
export const MINUTE_TICKS: Tick[] = [
  nightTick,
  escalationTick,
  silenceTick,
  morningTick,
  figuresTick,
  tonightTick,
  movingTick,
]
/** What is asked every hour. */
export const HOUR_TICKS: Tick[] = [partitionTick, stepsTick, housekeepingTick]

/**
 * Runs ticks one after the other, each in a transaction of its own; one that fails does not stop the next.
 * @returns how many failed.
 */
export async function runTicks(ticks: Tick[], now: Date): Promise<number> {
  let failed = 0
  for (const tick of ticks) {
    try {
      for (let left = true; left;) {
        const done = await inTransaction(tick, now)
        // One transaction takes a batch; what is left is taken at once by the next.
        left = (done?.left ?? 0) > 0
        if (done !== null && Object.values(done).some((count) => count > 0)) {
          log.info({ tick: tick.name, ...done }, 'tick')
        }
      }
    } catch (error) {
      failed += 1
      log.error({ tick: tick.name, error: String(error) }, 'tick failed')
    }
  }
  return failed
}

const inTransaction = (tick: Tick, now: Date): Promise<Record<string, number> | null> =>
  tick.role === 'owner'
    ? database().transaction((trx) => runTick(trx, tick, now))
    : asIngest((trx) => runTick(trx, tick, now))
