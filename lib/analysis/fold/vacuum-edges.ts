import { INHG, SECOND } from './constants'
import { leaveZero, watchZero } from './faults'
import { noiseFloorPa, pushFlush } from './fall'
import { holdSample, openHold } from './hold'
import { isOff } from './pump-edges'
import { learnedCutOutPa } from './rings'
import { runSample } from './run-sample'
import { startRun } from './run-start'
import { stopRun } from './run-stop'
import type { FoldState, OpenRun } from './state'
import type { Instant, Row, Sample } from './types'

/** A recharge rises by this within the window; weather does not (judged). */
const RISE_PA = 0.25 * INHG
const RISE_WINDOW_MS = 90 * SECOND
const RISE_WINDOW_SPACINGS = 2.5
/** Still level with a turning point, or with the top of a run. */
const LEVEL_PA = 0.03 * INHG
const TOP_RESTS_MS = 30 * SECOND

/** Edges as turning points of the vacuum: a run is a sustained rise to the cut-out. */
export function vacuumStep(state: FoldState, sample: Sample, vacuumPa: number, rows: Row[]): void {
  const { at } = sample
  const spacingMs = state.channels.vacuumAt === null ? 0 : at - state.channels.vacuumAt
  if (state.run !== null) {
    if (!topIsOver(state, state.run, at, vacuumPa, spacingMs, rows)) {
      if (sample.supplyV !== null) state.run.supplyV = sample.supplyV + 0
      return
    }
    finishRun(state, state.run, at, spacingMs, rows)
  }
  if (state.settings.kind !== 'on-demand' && state.hold === null && !isOff(state, vacuumPa)) {
    state.offSince = null
    openHold(state, at, { seen: false, peakPa: null, depth: 0, edgeUncertaintySeconds: 0 })
  }
  if (risesToRun(state, at, vacuumPa, spacingMs)) {
    beginRun(state, sample, vacuumPa, spacingMs, rows)
    return
  }
  const level = levelPa(state)
  const { turn } = state
  if (turn !== null && vacuumPa > turn.basePa + level) return
  if (state.hold !== null) holdSample(state, at, vacuumPa, rows)
  else watchZero(state, at, vacuumPa, rows)
}

const levelPa = (state: FoldState): number => Math.max(LEVEL_PA, 3 * state.sigmaPa)

/** Follows the lowest recent sample; true once the vacuum has risen from it as only a pump makes it. */
function risesToRun(state: FoldState, at: Instant, vacuumPa: number, spacingMs: number): boolean {
  const { turn, channels } = state
  const window = Math.max(RISE_WINDOW_MS, RISE_WINDOW_SPACINGS * spacingMs)
  if (turn !== null && vacuumPa - turn.basePa >= Math.max(RISE_PA, 1.5 * state.stepPa, 6 * state.sigmaPa)) {
    if (at - turn.baseAt <= window) return true
  }
  const beforeAt = channels.vacuumAt
  const beforePa = channels.vacuumPa
  if (turn === null || vacuumPa <= turn.basePa || at - turn.baseAt > window) {
    state.turn = { baseAt: at, basePa: vacuumPa, turnAt: at, turnPa: vacuumPa, beforeAt, beforePa }
  } else if (vacuumPa - turn.basePa <= levelPa(state)) {
    turn.turnAt = at
    turn.turnPa = vacuumPa
    turn.beforeAt = beforeAt
    turn.beforePa = beforePa
  }
  return false
}

function beginRun(state: FoldState, sample: Sample, vacuumPa: number, spacingMs: number, rows: Row[]): void {
  const { turn, hold } = state
  if (turn === null) return
  // A turning point before the hold itself would make it end before it began.
  const startedAt = hold === null ? turn.turnAt : Math.max(turn.turnAt, hold.startedAt)
  leaveZero(state, sample.at, rows)
  startRun(
    state,
    {
      at: startedAt,
      seen: turn.beforeAt !== null,
      startPa: turn.turnPa,
      spacingMs,
      edgeUncertaintySeconds: spacingMs / SECOND,
      knownAt: sample.at,
    },
    rows,
  )
  if (state.run !== null) runSample(state, state.run, sample.at, vacuumPa, sample.supplyV, rows)
}

/** Follows the top of a run; true once the vacuum rests at it or leaves it. */
function topIsOver(
  state: FoldState,
  run: OpenRun,
  at: Instant,
  vacuumPa: number,
  spacingMs: number,
  rows: Row[],
): boolean {
  const topPa = run.topPa ?? vacuumPa
  const topAt = run.topAt ?? run.startedAt
  if (run.topPa === null || vacuumPa > topPa + Math.max(0.01 * INHG, state.sigmaPa)) {
    runSample(state, run, at, vacuumPa, null, rows)
    return false
  }
  const fellPa = topPa - vacuumPa
  if (fellPa > Math.max(0.5 * INHG, noiseFloorPa(state)) && topPa < learnedCutOutPa(state) - 0.3 * INHG) {
    pushFlush(state, { at, dropPa: fellPa, startedPump: false, knownAt: at }, rows)
    run.topPa = vacuumPa
    run.topAt = at
    return false
  }
  return fellPa > levelPa(state) || at - topAt >= Math.max(TOP_RESTS_MS, 1.5 * spacingMs)
}

function finishRun(state: FoldState, run: OpenRun, knownAt: Instant, spacingMs: number, rows: Row[]): void {
  stopRun(
    state,
    {
      at: Math.max(run.topAt ?? run.startedAt, run.startedAt),
      stopPa: run.topPa,
      spacingMs,
      edgeUncertaintySeconds: spacingMs / SECOND,
      knownAt,
    },
    rows,
  )
}
