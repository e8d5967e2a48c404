import { gapLimitMs, isInRhythm, readsPump, takeWeather } from './channels'
import { markCheckpoint } from './checkpoint'
import { applyFact } from './facts'
import { checkVacuum } from './faults'
import { interrupt } from './interrupt'
import { pumpStep } from './pump-edges'
import type { FoldState } from './state'
import type { FoldItem, Row, Sample } from './types'
import { vacuumStep } from './vacuum-edges'

/**
 * One item of the fold: **changes the state passed in** and returns the rows that this item settled, with
 * `knownAt` its time. Pure otherwise: no clock, no look ahead, nothing kept outside the state. Items come in
 * order (`orderItems`); a sample no later than the one before is left out, an earlier fact counts from now.
 * @example const state = initialState(); const rows = items.flatMap((item) => step(state, item))
 */
export function step(state: FoldState, item: FoldItem): Row[] {
  const rows: Row[] = []
  if (item.type === 'sample') takeSample(state, item.sample, rows)
  else {
    state.checkpoint.due = false
    state.at = state.at === null ? item.fact.at : Math.max(state.at, item.fact.at)
    applyFact(state, { ...item.fact, at: state.at }, rows)
  }
  return rows
}

function takeSample(state: FoldState, sample: Sample, rows: Row[]): void {
  const { at } = sample
  const previousAt = state.sampleAt
  if (!Number.isFinite(at) || (previousAt !== null && at <= previousAt)) return
  if (previousAt !== null && at - previousAt > gapLimitMs(state)) {
    interrupt(state, at, rows)
    state.channels.pumpOn = null
    state.lastGap = { from: previousAt, to: at }
  }
  const holdBefore = state.hold
  const pumpBefore = state.channels.pumpOn
  takeWeather(state.channels, sample)
  state.at = at
  // Text knows no minus nought: what goes in must be what a parsed state would go on with.
  const measured = sample.vacuumPa !== null && Number.isFinite(sample.vacuumPa) ? sample.vacuumPa + 0 : null
  const vacuumPa = measured === null ? null : checkVacuum(state, at, measured, rows)
  if (readsPump(state, sample)) pumpStep(state, sample, vacuumPa, rows)
  else if (vacuumPa !== null) vacuumStep(state, sample, vacuumPa, rows)
  if (measured !== null) {
    state.channels.vacuumPa = measured
    state.channels.vacuumAt = at
  }
  if (sample.pumpOn !== null) {
    state.channels.pumpOn = sample.pumpOn
    state.channels.pumpAt = at
  }
  if (isInRhythm(state, at)) state.rhythmAt = at
  else if (sample.pumpOn !== null && sample.pumpOn !== pumpBefore) state.recordsEdges = true
  state.spacingMs = previousAt === null ? 0 : at - previousAt
  state.sampleAt = at
  const holdBegan = state.hold !== null && state.hold !== holdBefore && state.hold.startSeen
  markCheckpoint(state, at, previousAt, holdBegan)
}
