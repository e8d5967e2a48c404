import { CLOSE_SAMPLES_MS, INHG, MINUTE, RING_ENOUGH, SECOND } from './constants'
import { pushRing } from './rings'
import type { FoldState, OpenRun } from './state'
import type { Decision } from './trigger'
import type { Trigger } from './types'

/** What one run teaches, once its trigger is known. */
export interface Lesson {
  trigger: Trigger
  only: Decision['only']
  overLong: boolean
  seconds: number
  peakPa: number | null
  recharge: number | null
}

/** Feeds the rings: peaks and recharges of every run, levels and lengths of those that no flush started. */
export function learnFromRun(
  state: FoldState,
  run: OpenRun,
  stop: { spacingMs: number; edgeUncertaintySeconds: number },
  seen: Lesson,
): void {
  const { rings } = state
  const stopIsClose = stop.spacingMs <= CLOSE_SAMPLES_MS || stop.edgeUncertaintySeconds <= 1
  if (seen.peakPa !== null && stopIsClose) pushRing(rings.cutOutPa, seen.peakPa)
  if (seen.recharge !== null) pushRing(rings.rechargePaPerSecond, seen.recharge)
  const startIsClose = run.startSpacingMs <= CLOSE_SAMPLES_MS
  if (run.startSeen && seen.trigger === 'leak' && startIsClose && run.startPa !== null) {
    pushRing(rings.cutInPa, run.startPa)
  }
  if (run.fromOff && run.startSeen && run.startPa !== null) learnLowStart(state, run.startPa)
  if (run.startSeen && seen.trigger === 'leak' && !(startIsClose && run.startPa !== null))
    learnSparseStart(state, run)
  if (seen.only === 'level' && run.beforePa !== null) learnHighStart(state, run.beforePa)
  if (run.startPa === null) {
    if (run.startSeen) pushRing(rings.runSeconds, seen.seconds)
  } else if (seen.trigger === 'leak' && !seen.overLong) {
    pushRing(rings.runSeconds, seen.seconds)
    rings.longRunSeconds = []
  } else if (seen.only === 'length') learnLongRun(state, seen.seconds)
}

/** Through samples up to two minutes apart: the level half way to the next, where the leak is slow enough. */
function learnSparseStart(state: FoldState, run: OpenRun): void {
  if (run.beforePa === null || run.startSpacingMs > 2 * MINUTE) return
  const lostPa = state.slopePaPerSecond * (run.startSpacingMs / SECOND)
  if (lostPa < 0.4 * INHG) pushRing(state.rings.sparseStartPa, run.beforePa - lostPa / 2)
}

/** A breaker restarts anywhere, a switch at one level: five starts in a row alike are the switch moved. */
function learnLowStart(state: FoldState, startPa: number): void {
  const { rings } = state
  pushRing(rings.lowStartPa, startPa, RING_ENOUGH)
  if (rings.lowStartPa.length < RING_ENOUGH) return
  if (Math.max(...rings.lowStartPa) - Math.min(...rings.lowStartPa) > 0.2 * INHG) return
  rings.cutInPa = rings.lowStartPa
  rings.lowStartPa = []
}

/** Flushes come at any level: five starts in a row that look too high, all alike, are the switch moved up. */
function learnHighStart(state: FoldState, beforePa: number): void {
  const { rings } = state
  pushRing(rings.highStartPa, beforePa, RING_ENOUGH)
  if (rings.highStartPa.length < RING_ENOUGH) return
  if (Math.max(...rings.highStartPa) - Math.min(...rings.highStartPa) > 0.2 * INHG) return
  rings.cutInPa = rings.highStartPa
  rings.sparseStartPa = []
  rings.highStartPa = []
}

/** Flushes differ in length: five over-long runs in a row alike are a slower pump. */
function learnLongRun(state: FoldState, seconds: number): void {
  const { rings } = state
  pushRing(rings.longRunSeconds, seconds, RING_ENOUGH)
  if (rings.longRunSeconds.length < RING_ENOUGH) return
  if (Math.max(...rings.longRunSeconds) > 1.08 * Math.min(...rings.longRunSeconds)) return
  rings.runSeconds = rings.longRunSeconds
  rings.longRunSeconds = []
}
