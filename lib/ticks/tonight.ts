import type { Trx } from '@/db/roles'
import { systemsToForetell, writeOutlook } from '@/db/queries/outlooks'
import { nightWindows } from '@/db/queries/zones'
import { log } from '@/lib/log'
import { outlookAt } from '@/lib/outlook/outlook-at'
import type { Tick } from '@/lib/ticks/run-tick'

const HOUR_MS = 3_600_000
const FRESH_MS = 2 * HOUR_MS
/** By day the coming night is looked at every few hours; what counts is said in the evening. */
const AGAIN_AFTER_MS = 4 * HOUR_MS
const EVENING_MS = 2 * HOUR_MS
const BATCH = 40

/** Keeps a word on the coming night for the fleet's page, until the evening says it for good. */
export const tonightTick: Tick = { name: 'tonight', role: 'service', work: foretell }

export async function foretell(trx: Trx, now: Date): Promise<Record<string, number>> {
  const ago = (milliseconds: number) => new Date(now.getTime() - milliseconds)
  const systems = await systemsToForetell(trx, ago(FRESH_MS), ago(AGAIN_AFTER_MS), now, BATCH)
  const windows = await nightWindows(trx, [...new Set(systems.map((system) => system.vesselId))], now)
  let foretold = 0
  for (const { systemId, vesselId } of systems) {
    const window = windows.find((one) => one.vesselId === vesselId)
    if (window === undefined || now.getTime() >= window.from.getTime() - EVENING_MS) continue
    try {
      await trx.transaction(async (inner) => {
        const outlook = await outlookAt(inner, systemId, now)
        if (outlook === null) return
        await writeOutlook(inner, {
          systemId,
          night: window.night,
          givenAt: now,
          quietFrom: window.from,
          quietTo: window.to,
          chance: outlook.chance,
          chanceIfFlushedLast: outlook.chanceIfFlushedLast,
          expectedRuns: outlook.expectedRuns,
          aboard: outlook.aboard,
          detail: { ...outlook, reason: 'provisional' },
        })
      })
      foretold += 1
    } catch (error) {
      log.error({ systemId, error: String(error) }, 'no outlook for this system')
    }
  }
  return { foretold }
}
