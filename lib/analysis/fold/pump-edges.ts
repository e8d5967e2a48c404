import { edgeUncertaintySeconds } from './channels'
import { INHG, SECOND } from './constants'
import { leaveZero, riseFault, watchStuckRun, watchZero } from './faults'
import { holdSample, offLinePa, openHold } from './hold'
import { runSample } from './run-sample'
import { startRun } from './run-start'
import { stopRun } from './run-stop'
import type { FoldState } from './state'
import type { Row, Sample } from './types'

/** Shorter than this between samples no run fits unseen. */
const HIDDEN_RUN_MS = 15 * SECOND
const HIDDEN_RISE_PA = 0.5 * INHG

/** Edges as the pump channel shows them. `vacuumPa` is null where not measured or not to be trusted. */
export function pumpStep(state: FoldState, sample: Sample, vacuumPa: number | null, rows: Row[]): void {
  const before = state.channels.pumpOn
  const on = sample.pumpOn ?? before
  if (on === true) pumpIsOn(state, sample, before, vacuumPa, rows)
  else if (on === false) pumpIsOff(state, sample, vacuumPa, rows)
}

function pumpIsOn(
  state: FoldState,
  sample: Sample,
  before: boolean | null,
  vacuumPa: number | null,
  rows: Row[],
): void {
  const { at, supplyV } = sample
  if (state.run === null) {
    leaveZero(state, at, rows)
    startRun(
      state,
      {
        at,
        seen: before === false,
        startPa: vacuumPa,
        spacingMs: state.sampleAt === null ? 0 : at - state.sampleAt,
        edgeUncertaintySeconds: edgeUncertaintySeconds(state, at),
        knownAt: at,
      },
      rows,
    )
  }
  if (state.run !== null) runSample(state, state.run, at, vacuumPa, supplyV, rows)
}

function pumpIsOff(state: FoldState, sample: Sample, vacuumPa: number | null, rows: Row[]): void {
  const { at } = sample
  if (state.run !== null) {
    watchStuckRun(state, state.run, at)
    stopRun(
      state,
      {
        at,
        stopPa: vacuumPa,
        spacingMs: state.sampleAt === null ? 0 : at - state.sampleAt,
        edgeUncertaintySeconds: edgeUncertaintySeconds(state, at),
        knownAt: at,
      },
      rows,
    )
    return
  }
  if (state.settings.kind === 'on-demand') return
  if (state.hold === null && !isOff(state, vacuumPa)) {
    state.offSince = null
    openHold(state, at, { seen: false, peakPa: null, depth: 0, edgeUncertaintySeconds: 0 })
  }
  if (vacuumPa === null) return
  if (state.hold === null) watchZero(state, at, vacuumPa, rows)
  else {
    hiddenRun(state, sample, vacuumPa, rows)
    holdSample(state, at, vacuumPa, rows)
  }
}

/** Still off: said so, or the vacuum has not come back. */
export function isOff(state: FoldState, vacuumPa: number | null): boolean {
  if (state.offSince === null) return false
  if (state.statement?.value === 'off') return true
  return vacuumPa === null || vacuumPa < offLinePa(state)
}

/**
 * The vacuum rose though the pump was off at both samples: a run between them that a logger without edge
 * records missed; where no run fits between them, a jump of the sensor.
 */
function hiddenRun(state: FoldState, sample: Sample, vacuumPa: number, rows: Row[]): void {
  const { hold, sampleAt } = state
  const lowPa = state.fall?.lowPa ?? hold?.lastPa ?? null
  if (hold === null || lowPa === null || sampleAt === null || vacuumPa - lowPa < HIDDEN_RISE_PA) return
  const spacingMs = sample.at - sampleAt
  if (state.recordsEdges || spacingMs < HIDDEN_RUN_MS || sampleAt <= hold.startedAt) {
    if (state.fall === null) riseFault(sampleAt, vacuumPa - lowPa, sample.at, rows)
    return
  }
  const uncertainty = spacingMs / SECOND
  startRun(
    state,
    {
      at: sampleAt,
      seen: true,
      startPa: lowPa,
      spacingMs,
      edgeUncertaintySeconds: uncertainty,
      knownAt: sample.at,
    },
    rows,
  )
  stopRun(
    state,
    { at: sample.at, stopPa: vacuumPa, spacingMs, edgeUncertaintySeconds: uncertainty, knownAt: sample.at },
    rows,
  )
}
