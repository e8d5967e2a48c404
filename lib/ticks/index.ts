import { database } from '@/db/knex'
import { asIngest } from '@/db/roles'
import { log } from '@/lib/log'
import { escalationTick } from '@/lib/ticks/escalation'
import { figuresTick } from '@/lib/ticks/figures'
import { housekeepingTick, partitionTick } from '@/lib/ticks/housekeeping'
import { morningTick } from '@/lib/ticks/morning'
import { nightTick } from '@/lib/ticks/night'
import { runTick, type Tick } from '@/lib/ticks/run-tick'
import { silenceTick } from '@/lib/ticks/silence'
import { stepsTick } from '@/lib/ticks/steps'

/** What is asked every minute, most pressing first. */
export const MINUTE_TICKS: Tick[] = [nightTick, escalationTick, silenceTick, morningTick, figuresTick]
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
      const done =
        tick.role === 'owner'
          ? await database().transaction((trx) => runTick(trx, tick, now))
          : await asIngest((trx) => runTick(trx, tick, now))
      if (done !== null && Object.values(done).some((count) => count > 0)) {
        log.info({ tick: tick.name, ...done }, 'tick')
      }
    } catch (error) {
      failed += 1
      log.error({ tick: tick.name, error: String(error) }, 'tick failed')
    }
  }
  return failed
}
