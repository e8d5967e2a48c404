import { PA_PER_INHG } from '@/shared/units'
import { conditionOf, currentOf, learned, openRows, type FoldState } from '../fold'
import { median } from '../statistics'
import type { FiguresInput, LearnedFigures } from './types'

/**
 * What `figuresOf` takes, out of a system's fold state (its head, or folded to `at`) and what the state does not
 * hold. A switch point that nothing taught stays null, where the fold itself takes a usual one.
 */
export function figuresInput(
  state: FoldState,
  rest: Pick<FiguresInput, 'at' | 'rows' | 'settings' | 'lastHeardAt'>,
): FiguresInput {
  const condition = conditionOf(state)
  const current = currentOf(state)
  return {
    ...rest,
    open: openRows(state),
    current: current.at === null ? null : { ...current, at: current.at },
    learned: learnedFigures(state),
    condition: { offSince: condition.offSince, runningOnSince: condition.runningOnSince },
    statement: condition.statement,
  }
}

/** Few readings count when they are about what the installer set; five count whatever was set. */
const ENOUGH = 5
const NEAR_SET_PA = 0.3 * PA_PER_INHG

function learnedFigures(state: FoldState): LearnedFigures {
  const { counts, settledPa, rechargePaPerSecond } = learned(state)
  const { rings, settings } = state
  return {
    cutOutPa: taught(rings.cutOutPa, settings.cutOutPa),
    cutInPa: taught(rings.cutInPa, settings.cutInPa),
    settledPa: counts.settled > 0 ? settledPa : null,
    rechargePaPerSecond,
    readings: { cutOut: counts.cutOut, cutIn: counts.cutIn },
    stepPa: state.stepPa,
  }
}

function taught(ring: readonly number[], setPa: number | null): number | null {
  const middle = median(ring)
  if (middle === null || ring.length >= ENOUGH) return middle
  if (setPa === null) return middle
  if (Math.abs(middle - setPa) > NEAR_SET_PA) return null
  // One reading scatters about as much as an installer rounds.
  return (ring.length * middle + 0.5 * setPa) / (ring.length + 0.5)
}
