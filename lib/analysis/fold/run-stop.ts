import { CLOSE_SAMPLES_MS, INHG, SECOND, START_FALL_PA } from './constants'
import { pushFlush } from './fall'
import { openHold, pushHold } from './hold'
import { learnedCutInPa, learnedCutOutPa, ringMedian } from './rings'
import { learnFromRun } from './run-learning'
import { endRunFall } from './run-sample'
import type { EndedHold, FoldState, OpenRun } from './state'
import { decideTrigger, isOverLong } from './trigger'
import type { Ending, Instant, Row, Trigger } from './types'

export interface Stop {
  at: Instant
  stopPa: number | null
  spacingMs: number
  edgeUncertaintySeconds: number
  knownAt: Instant
}

/** The pump was seen to stop: settles what began the run, teaches the rings, begins a hold. */
export function stopRun(state: FoldState, stop: Stop, rows: Row[]): void {
  const { run, ended } = state
  if (run === null) return
  const seconds = (stop.at - run.startedAt) / SECOND
  const uncertainty = Math.max(run.edgeUncertaintySeconds, stop.edgeUncertaintySeconds)
  const end = { seconds, uncertaintySeconds: uncertainty }
  const { trigger, only } = decideTrigger(state, run, end)
  endRunFall(state, run, stop.knownAt, rows)
  const peakPa = peakOf(run, stop.stopPa)
  const recharge = trigger === 'unknown' && !run.startSeen ? null : rechargeOf(state, run, stop, peakPa)
  if (ended !== null) pushEnded(state, ended, run, trigger, stop.knownAt, rows)
  rows.push({
    table: 'run',
    row: {
      startedAt: run.startedAt,
      stoppedAt: stop.at,
      trigger,
      vacuumAtStartPa: run.startPa,
      vacuumAtStopPa: peakPa,
      rechargePaPerSecond: recharge,
      supplyV: run.supplyV,
      edgeUncertaintySeconds: uncertainty,
      interrupted: false,
      knownAt: stop.knownAt,
    },
  })
  pushStartFlush(state, run, trigger, seconds, peakPa, stop.knownAt, rows)
  if (!run.setAside) {
    const overLong = isOverLong(state, end)
    learnFromRun(state, run, stop, { trigger, only, overLong, seconds, peakPa, recharge })
  }
  state.run = null
  state.ended = null
  const depth = peakPa === null || run.lowPa === null ? 0 : peakPa - run.lowPa
  const usualDepth = Math.max(0.5 * INHG, learnedCutOutPa(state) - learnedCutInPa(state))
  if (state.settings.kind !== 'on-demand') {
    openHold(state, stop.at, {
      seen: true,
      peakPa,
      depth: depth / usualDepth,
      edgeUncertaintySeconds: stop.edgeUncertaintySeconds,
    })
  }
}

/** Missing data ends a run at the last sample before it. */
export function interruptRun(state: FoldState, lastAt: Instant, knownAt: Instant, rows: Row[]): void {
  const { run, ended } = state
  if (run === null) return
  const { trigger } = decideTrigger(state, run, { seconds: null, uncertaintySeconds: 0 })
  endRunFall(state, run, knownAt, rows)
  if (ended !== null) pushEnded(state, ended, run, trigger, knownAt, rows)
  rows.push({
    table: 'run',
    row: {
      startedAt: run.startedAt,
      stoppedAt: Math.max(lastAt, run.startedAt),
      trigger,
      vacuumAtStartPa: run.startPa,
      vacuumAtStopPa: run.topPa,
      rechargePaPerSecond: null,
      supplyV: run.supplyV,
      edgeUncertaintySeconds: run.edgeUncertaintySeconds,
      interrupted: true,
      knownAt,
    },
  })
  pushStartFlush(state, run, trigger, null, null, knownAt, rows)
  state.run = null
  state.ended = null
}

function pushEnded(
  state: FoldState,
  ended: EndedHold,
  run: OpenRun,
  trigger: Trigger,
  knownAt: Instant,
  rows: Row[],
): void {
  const whole = {
    ...ended,
    edgeUncertaintySeconds: Math.max(ended.edgeUncertaintySeconds, run.edgeUncertaintySeconds),
  }
  pushHold(state, whole, endingOf(ended, run, trigger), knownAt, rows)
}

function endingOf(ended: EndedHold, run: OpenRun, trigger: Trigger): Ending {
  if (!ended.startSeen || trigger === 'startup') return 'interrupted'
  const hasVacuum = run.startPa !== null || run.fallPa !== null || run.topPa !== null
  return hasVacuum ? trigger : 'unknown'
}

function peakOf(run: OpenRun, stopPa: number | null): number | null {
  if (run.topPa === null) return stopPa
  return stopPa === null ? run.topPa : Math.max(run.topPa, stopPa)
}

/** Rise over the band between cut-in and cut-out by the time it took, Pa/s; null where it cannot be told. */
function rechargeOf(state: FoldState, run: OpenRun, stop: Stop, peakPa: number | null): number | null {
  if (peakPa === null || (stop.spacingMs > CLOSE_SAMPLES_MS && stop.edgeUncertaintySeconds > 2)) return null
  const cutIn = learnedCutInPa(state)
  let from: number | null = null
  let fromPa = cutIn
  if (run.crossedAt !== null) from = run.crossedAt
  else if (
    run.startPa !== null &&
    run.edgeUncertaintySeconds <= 15 &&
    Math.abs(run.startPa - cutIn) < 0.4 * INHG
  ) {
    if (run.lowPa !== null && run.startPa - run.lowPa > START_FALL_PA) return null
    from = run.startedAt
    fromPa = run.startPa
  }
  if (from === null || stop.at - from < 3 * SECOND || peakPa - fromPa < 0.3 * INHG) return null
  return Math.round(((peakPa - fromPa) / ((stop.at - from) / SECOND)) * 100) / 100
}

/**
 * The flush that started a run; its drop from what was seen, or from how much the pump had to restore. Nought
 * where there is no vacuum channel to tell it.
 */
function pushStartFlush(
  state: FoldState,
  run: OpenRun,
  trigger: Trigger,
  seconds: number | null,
  peakPa: number | null,
  knownAt: Instant,
  rows: Row[],
): void {
  if (trigger !== 'flush') return
  const seen = run.beforePa !== null && run.lowPa !== null ? run.beforePa - run.lowPa : 0
  const usual = ringMedian(state.rings.rechargePaPerSecond)
  const restored =
    usual !== null && seconds !== null && peakPa !== null && run.beforePa !== null
      ? run.beforePa - (peakPa - usual * seconds)
      : 0
  const dropPa = Math.max(seen, restored, run.fallPa ?? 0, 0)
  pushFlush(state, { at: run.startedAt, dropPa, startedPump: true, knownAt }, rows)
}
