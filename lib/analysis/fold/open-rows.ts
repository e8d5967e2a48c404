import { settledTopPa } from './hold'
import { binsOf } from './leg-bins'
import { legRate } from './leg-rate'
import type { FoldState } from './state'
import type { OpenRows } from './types'

/**
 * What is open at the head, shaped like the rows it will become. The leg's own rate is worked out here, at
 * the cost of a Theil–Sen over at most 40 points; the state is not changed.
 */
export function openRows(state: FoldState): OpenRows {
  return { run: openRun(state), hold: openHoldRow(state), leg: openLegRow(state) }
}

function openRun(state: FoldState): OpenRows['run'] {
  const { run } = state
  if (run === null) return null
  return {
    startedAt: run.startedAt,
    trigger: run.fromOff ? 'startup' : 'unknown',
    vacuumAtStartPa: run.startPa,
    vacuumAtStopPa: null,
    rechargePaPerSecond: null,
    supplyV: run.supplyV,
    edgeUncertaintySeconds: run.edgeUncertaintySeconds,
    interrupted: false,
  }
}

function openHoldRow(state: FoldState): OpenRows['hold'] {
  const { hold } = state
  if (hold === null) return null
  return {
    startedAt: hold.startedAt,
    flushes: hold.flushes,
    cutOutPa: hold.cutOutPa,
    settledPa: settledTopPa(state, hold, 'open'),
    endPa: hold.lastPa,
    learnedCutOutPa: hold.learnedCutOutPa,
    learnedSettledPa: hold.learnedSettledPa,
    learnedCutInPa: hold.learnedCutInPa,
    setAside: hold.setAside,
    edgeUncertaintySeconds: hold.edgeUncertaintySeconds,
  }
}

function openLegRow(state: FoldState): OpenRows['leg'] {
  const { leg, hold } = state
  if (leg === null || hold === null) return null
  const bins = binsOf(leg)
  return {
    holdStartedAt: hold.startedAt,
    startedAt: leg.startedAt,
    sinceFlushSeconds: leg.sinceFlushSeconds,
    bins,
    rate: legRate(bins),
    setAside: leg.setAside,
  }
}
