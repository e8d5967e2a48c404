import { conditionOf, currentOf, learned, openRows, type FoldState } from '../fold'
import type { FiguresInput, LearnedFigures } from './types'

/**
 * What `figuresOf` takes, out of a system's fold state (its head, or folded to `at`) and what the state does not
 * hold. A switch point that nothing taught and nobody set stays null, where the fold itself takes a usual one.
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

function learnedFigures(state: FoldState): LearnedFigures {
  const { counts, cutOutPa, cutInPa, settledPa, rechargePaPerSecond } = learned(state)
  return {
    cutOutPa: counts.cutOut > 0 || state.settings.cutOutPa !== null ? cutOutPa : null,
    cutInPa: counts.cutIn > 0 || state.settings.cutInPa !== null ? cutInPa : null,
    settledPa: counts.settled > 0 ? settledPa : null,
    rechargePaPerSecond,
  }
}
