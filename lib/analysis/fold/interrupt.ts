import { settleFall } from './fall'
import { pushHold } from './hold'
import { closeLeg } from './leg'
import { interruptRun } from './run-stop'
import type { FoldState } from './state'
import type { Instant, Row } from './types'

/** Data is missing, or is another logger's from here: what is open ends at the last sample. */
export function interrupt(state: FoldState, knownAt: Instant, rows: Row[]): void {
  const lastAt = state.sampleAt
  if (lastAt === null) return
  interruptRun(state, lastAt, knownAt, rows)
  const { hold } = state
  if (hold !== null) {
    if (state.fall !== null) settleFall(state, hold, knownAt, rows)
    closeLeg(state, knownAt, rows)
    const endedAt = state.lowSince ?? lastAt
    pushHold(state, { ...hold, endedAt, endPa: hold.lastPa }, 'interrupted', knownAt, rows)
  }
  state.hold = null
  state.leg = null
  state.fall = null
  state.recent = []
  state.turn = null
  state.lowSince = null
}
