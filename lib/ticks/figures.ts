import type { Trx } from '@/db/roles'
import { figuresOlderThan } from '@/db/queries/figures-due'
import { storeFigures } from '@/lib/figures'
import { log } from '@/lib/log'
import type { Tick } from '@/lib/ticks/run-tick'

/** A state such as `unheard` comes with time alone, so figures are computed again though nothing was heard. */
const REFRESH_MS = 15 * 60_000
const BATCH = 100

export const figuresTick: Tick = { name: 'figures', role: 'service', work: refreshFigures }

export async function refreshFigures(trx: Trx, now: Date): Promise<Record<string, number>> {
  const systemIds = await figuresOlderThan(trx, new Date(now.getTime() - REFRESH_MS), BATCH)
  for (const systemId of systemIds) {
    try {
      await trx.transaction((inner) => storeFigures(inner, systemId, now.getTime()))
    } catch (error) {
      log.error({ systemId, error: String(error) }, 'no figures for this system')
    }
  }
  return { refreshed: systemIds.length }
}
