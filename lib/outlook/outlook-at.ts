import type { Trx } from '@/db/roles'
import { outlookOf, type Outlook } from '@/lib/analysis/outlook'
import { outlookBasis } from '@/lib/outlook/outlook-input'

/** The outlook with the names that its instants have in the boat's zone. */
export interface NamedOutlook extends Outlook {
  /** Date of the evening, `2026-12-01`. */
  nightDate: string
  timeZone: string
}

/**
 * What the coming night (or the one under way) brings a system, from what was known at `at`.
 * @param trx under the service's role; whether the asker may see the system is the caller's question.
 * @returns null when there is no such system.
 * @example const outlook = await asIngest((trx) => outlookAt(trx, '7', new Date()))
 */
export async function outlookAt(trx: Trx, systemId: string, at: Date): Promise<NamedOutlook | null> {
  const basis = await outlookBasis(trx, systemId, at)
  if (basis === null) return null
  return { ...outlookOf(basis.input), nightDate: basis.night, timeZone: basis.timeZone }
}
