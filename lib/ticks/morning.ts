import type { Trx } from '@/db/roles'
import { addEvent, closeNotice } from '@/db/queries/notice-writes'
import { unscoredOutlooks, writeScore, type UnscoredOutlook } from '@/db/queries/outlooks'
import { endedNightWarnings, newestSampleAt } from '@/db/queries/night-record'
import { holdsKnown, runsKnown } from '@/db/queries/record-rows'
import { scoreNight } from '@/lib/analysis/outlook'
import { log } from '@/lib/log'
import type { Tick } from '@/lib/ticks/run-tick'

const HOUR_MS = 3_600_000
/** A night is scored when its end was heard of, or when that has become unlikely. */
const WAIT_MS = 36 * HOUR_MS
const WEEK_MS = 7 * 24 * HOUR_MS
const FORETOLD_CHANCE = 0.5
const BATCH = 200

/** Ends the warnings of nights that are over, and writes down how each outlook came out. */
export const morningTick: Tick = { name: 'morning', role: 'service', work: lookBack }

export async function lookBack(trx: Trx, now: Date): Promise<Record<string, number>> {
  const over = await endedNightWarnings(trx, now)
  for (const notice of over) {
    await closeNotice(trx, notice.id, now)
    // Written down, and told to nobody: that the night is over is no news.
    await addEvent(trx, notice.id, 'ended', { at: now, reason: 'The night is over' })
  }
  const ready = await unscoredOutlooks(trx, now, new Date(now.getTime() - WAIT_MS), BATCH)
  for (const outlook of ready) {
    try {
      await trx.transaction((inner) => score(inner, outlook, now))
    } catch (error) {
      log.error({ systemId: outlook.systemId, error: String(error) }, 'a night could not be scored')
    }
  }
  return { ended: over.length, scored: ready.length }
}

async function score(trx: Trx, outlook: UnscoredOutlook, now: Date): Promise<void> {
  const to = outlook.quietTo.getTime()
  // A week before the night tells the runs of a leak from those of a flush where the logger does not.
  const span = { fromMs: outlook.quietFrom.getTime() - WEEK_MS, atMs: now.getTime() }
  const { outcome, runs: count } = scoreNight({
    night: { from: outlook.quietFrom.getTime(), to },
    runs: await runsKnown(trx, outlook.systemId, span),
    holds: await holdsKnown(trx, outlook.systemId, span),
    foretold: outlook.warned || (outlook.chance ?? 0) > FORETOLD_CHANCE,
    heardUntil: (await newestSampleAt(trx, outlook.systemId)).getTime(),
  })
  await writeScore(trx, outlook.id, { outcome, runs: count }, now)
}
