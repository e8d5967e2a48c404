import type { Trx } from '@/db/roles'
import { figuresOf, type AboardWord, type Figures } from '@/lib/analysis/figures'
import type { Instant } from '@/lib/analysis/fold'
import { figuresBasis } from '@/lib/figures/figures-at'
import type { Summary } from '@/shared/schemas/figures'

/**
 * A system's summary as of `at`, from what was known then.
 * @param trx under the service's role; whether the asker may see the system is the caller's question.
 * @returns null when there is no such system.
 */
export async function summaryAt(trx: Trx, systemId: string, at: Instant): Promise<Summary | null> {
  const basis = await figuresBasis(trx, systemId, at)
  return basis === null ? null : toSummary(figuresOf(basis.input), basis.aboard)
}

/** Figures as they cross the wire. */
export function toSummary(figures: Figures, aboard: AboardWord): Summary {
  const { state, leakRate, holdTime, cutOutPa, settledPa, cutInPa, recharge, cause, current } = figures
  return {
    at: instant(figures.at),
    state,
    since: instantOrNull(figures.since),
    aboard,
    leakRate,
    holdTime,
    cutOutPa,
    settledPa,
    cutInPa,
    recharge,
    cause,
    current: current === null ? null : { ...current, at: instant(current.at) },
    lastHeardAt: instantOrNull(figures.lastHeardAt),
  }
}

const instant = (ms: Instant): string => new Date(ms).toISOString()
const instantOrNull = (ms: Instant | null): string | null => (ms === null ? null : instant(ms))
