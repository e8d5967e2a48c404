import { movingOlderThan, repairedAt, writeMoving } from '@/db/queries/moving'
import { readDayRates, readLegRates, readShortHolds } from '@/db/queries/trend'
import type { Trx } from '@/db/roles'
import { findSteps } from '@/lib/analysis/steps'
import { movingOf } from '@/lib/fleet/moving'
import { log } from '@/lib/log'
import { withShortHolds } from '@/lib/reading/daily-rates'
import type { Tick } from '@/lib/ticks/run-tick'

const DAY_MS = 86_400_000
const AGAIN_MS = DAY_MS / 4
const LOOK_BACK_MS = 28 * DAY_MS
const MOST_LEGS = 400
const BATCH = 30

/** Judges how the leak of each system moves, for the fleet; a few times a day is often enough for weeks. */
export const movingTick: Tick = { name: 'moving', role: 'service', work: judgeMoving }

export async function judgeMoving(trx: Trx, now: Date): Promise<Record<string, number>> {
  const systemIds = await movingOlderThan(trx, new Date(now.getTime() - AGAIN_MS), BATCH)
  for (const systemId of systemIds) {
    try {
      await trx.transaction((inner) => judgeOne(inner, systemId, now))
    } catch (error) {
      log.error({ systemId, error: String(error) }, 'how this system moves could not be judged')
    }
  }
  return { judged: systemIds.length }
}

async function judgeOne(trx: Trx, systemId: string, now: Date): Promise<void> {
  const from = new Date(now.getTime() - LOOK_BACK_MS)
  const span = { from, to: now, at: now, limit: MOST_LEGS }
  const short = await readShortHolds(trx, systemId, span)
  const moving = movingOf({
    days: withShortHolds(await readDayRates(trx, systemId, span), short),
    steps: findSteps([...(await readLegRates(trx, systemId, span)), ...short]),
    repairedAt: await repairedAt(trx, systemId, from),
    at: now.getTime(),
  })
  await writeMoving(trx, systemId, moving, now)
}
