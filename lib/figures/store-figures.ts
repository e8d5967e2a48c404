import { writeFigures } from '@/db/queries/system-state'
import type { Trx } from '@/db/roles'
import { figuresOf, type AboardWord, type Figures } from '@/lib/analysis/figures'
import type { Instant } from '@/lib/analysis/fold'
import { figuresBasis } from '@/lib/figures/figures-at'

/** What stands in `system_state.figures`: all that a fleet page reads of a system. */
export type StoredFigures = Figures & { aboard: AboardWord }

/**
 * Computes a system's figures as of `at` and keeps them on its state row. Called at each commit of new samples and
 * by the tick, since a state such as `unheard` comes with time alone.
 * @returns the figures, or null when there is no such system.
 */
export async function storeFigures(trx: Trx, systemId: string, at: Instant): Promise<StoredFigures | null> {
  const basis = await figuresBasis(trx, systemId, at)
  if (basis === null) return null
  const figures = { ...figuresOf(basis.input), aboard: basis.aboard }
  await writeFigures(trx, systemId, figures, new Date(at))
  return figures
}
