import { INHG, RING_ENOUGH, START_FALL_PA } from './constants'
import { noiseFloorPa } from './fall'
import { cutInIsKnown, learnedCutInPa, ringMedian } from './rings'
import type { FoldState, OpenRun } from './state'
import type { Trigger } from './types'

/** A run over, as far as its trigger is concerned; `seconds` null where its stop was not seen. */
export interface RunEnd {
  seconds: number | null
  uncertaintySeconds: number
}

export interface Decision {
  trigger: Trigger
  /** The one thing that spoke for a flush at the start, where nothing was seen to fall. */
  only: 'level' | 'length' | null
}

/** What started a run: see each rule. */
export function decideTrigger(state: FoldState, run: OpenRun, end: RunEnd): Decision {
  const plain = (trigger: Trigger): Decision => ({ trigger, only: null })
  if (state.settings.kind === 'on-demand') return plain('flush')
  if (run.fromOff) return plain('startup')
  if (!run.startSeen) return plain('unknown')
  if (run.startPa === null && run.fallPa === null && run.topPa === null) {
    return plain(triggerByLengthAlone(state, end))
  }
  const floor = Math.max(START_FALL_PA, noiseFloorPa(state))
  if (run.fallPa !== null && run.fallPa > floor) return plain('flush')
  // A pump that is on raises the vacuum: what still falls is a flush that began before the start.
  if (run.startPa !== null && run.lowPa !== null && run.startPa - run.lowPa > floor) return plain('flush')
  if (startsTooHigh(state, run)) return { trigger: 'flush', only: 'level' }
  if (run.fellMidRun || run.onCurve) return plain('leak')
  if (isOverLong(state, end)) {
    return { trigger: likelierDuringRun(state, run) ? 'leak' : 'flush', only: 'length' }
  }
  return plain('leak')
}

/**
 * Samples too sparse to show the fall: the vacuum before the start was so far over the cut-in that no leak can
 * have brought it there.
 */
function startsTooHigh(state: FoldState, run: OpenRun): boolean {
  if (run.beforePa === null || state.recordsEdges || run.startSpacingMs < 20_000) return false
  if (!cutInIsKnown(state)) return false
  const leaked = 1.5 * state.slopePaPerSecond * (run.startSpacingMs / 1000)
  return run.beforePa - leaked > learnedCutInPa(state) + 0.35 * INHG
}

/** A fall so small is none. */
const NO_FALL_PA = 0.06 * INHG

/**
 * An over-long run whose start was seen at its very level, without a fall: either a flush came in the moments
 * when the vacuum stood so near the cut-in that its fall hid, or one came during the run, unseen between
 * samples. The longer of the two times is the likelier.
 */
function likelierDuringRun(state: FoldState, run: OpenRun): boolean {
  const usual = ringMedian(state.rings.runSeconds)
  if (usual === null || run.bareFallPa === null || run.edgeUncertaintySeconds > 2) return false
  const leaked = state.slopePaPerSecond * (run.startSpacingMs / 1000)
  return run.bareFallPa < NO_FALL_PA + 0.05 * leaked && state.slopePaPerSecond * usual > NO_FALL_PA
}

/** Longer than the tight cluster of leak recharges. */
export function isOverLong(state: FoldState, end: RunEnd): boolean {
  const ring = state.rings.runSeconds
  const usual = ringMedian(ring)
  if (end.seconds === null || usual === null || ring.length < RING_ENOUGH) return false
  const spread = 1.4826 * (ringMedian(ring.map((seconds) => Math.abs(seconds - usual))) ?? 0)
  if (spread > 0.1 * usual) return false
  return end.seconds - end.uncertaintySeconds > usual + Math.max(2, 0.12 * usual, 4 * spread)
}

/**
 * No vacuum channel: leak runs refill one differential and are all alike, and no run that a flush started is
 * shorter; so a tight cluster at the low end of the last lengths is theirs, and longer runs were flushes.
 * Unknown until eight runs, of which six (three in ten) lie within 5 % with next to none below them.
 */
function triggerByLengthAlone(state: FoldState, end: RunEnd): Trigger {
  const usual = leakRunSeconds(state.rings.runSeconds)
  if (end.seconds === null || usual === null || end.uncertaintySeconds > 0.1 * usual) return 'unknown'
  if (Math.abs(end.seconds - usual) <= 0.06 * usual + 1) return 'leak'
  return end.seconds > 1.12 * usual + 2 ? 'flush' : 'unknown'
}

/** Length of a leak run among all runs' lengths; null where no cluster tells it. */
export function leakRunSeconds(lengths: readonly number[]): number | null {
  if (lengths.length < 8) return null
  const sorted = [...lengths].sort((a, b) => a - b)
  const size = Math.max(6, Math.ceil(0.3 * sorted.length))
  const from = sorted.findIndex((low, i) => (sorted[i + size - 1] ?? Infinity) <= low * 1.05 + 0.5)
  const low = sorted[from]
  if (low === undefined || from > 0.1 * sorted.length) return null
  return ringMedian(sorted.filter((seconds) => seconds >= low && seconds <= low * 1.1 + 1))
}
