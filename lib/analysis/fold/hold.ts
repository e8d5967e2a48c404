import {
  DEEP_SETTLING_SECONDS,
  HOUR,
  INHG,
  OFF_AFTER_MS,
  OFF_LINE_UNKNOWN_PA,
  OFF_UNDER_PA,
  SECOND,
  SETTLING_SECONDS,
} from './constants'
import { cameBack, findFall, rememberRecent, settleFall, stillFalling } from './fall'
import { pointFault } from './faults'
import { closeLeg, extendLeg } from './leg'
import { cutInIsKnown, learnedCutInPa, learnedCutOutPa, learnedSettledPa, pushRing } from './rings'
import type { EndedHold, FoldState, OpenHold } from './state'
import type { Ending, Instant, Row } from './types'

/** A recharge over this many differentials is deep. */
const DEEP_RECHARGE = 1.6

/**
 * Begins a hold. `peakPa` is the cut-out just seen; `depth` how many differentials were recharged: after a
 * deep one the gas settles for longer and further.
 */
export function openHold(
  state: FoldState,
  at: Instant,
  start: { seen: boolean; peakPa: number | null; depth: number; edgeUncertaintySeconds: number },
): OpenHold {
  const settling = start.depth > DEEP_RECHARGE ? DEEP_SETTLING_SECONDS : SETTLING_SECONDS
  const hasVacuum = readsVacuum(state)
  const usualSettlingPa = Math.max(0.2 * INHG, 1.5 * (learnedCutOutPa(state) - learnedSettledPa(state)))
  const hold: OpenHold = {
    startedAt: at,
    startSeen: start.seen,
    cutOutPa: start.peakPa,
    flushes: 0,
    learnedCutOutPa: hasVacuum ? learnedCutOutPa(state) : null,
    learnedSettledPa: hasVacuum ? learnedSettledPa(state) : null,
    learnedCutInPa: hasVacuum ? learnedCutInPa(state) : null,
    offLinePa: offLinePa(state),
    setAside: state.statement !== null,
    edgeUncertaintySeconds: start.edgeUncertaintySeconds,
    settlingPa: usualSettlingPa * Math.max(1, start.depth),
    settledAt: start.seen ? at + settling * SECOND : at,
    firstAt: null,
    firstPa: null,
    topAt: null,
    topPa: null,
    lastAt: null,
    lastPa: null,
  }
  state.hold = hold
  state.fall = null
  state.leg = null
  state.recent = []
  state.lowSince = null
  return hold
}

/** Whether vacuum has been heard lately or is expected: without it nothing about levels can be told. */
export function readsVacuum(state: FoldState): boolean {
  const { vacuumAt } = state.channels
  if (vacuumAt === null) return state.fitting?.vacuum === true
  return (state.at ?? 0) - vacuumAt <= HOUR
}

/** Vacuum under which a pump that does not start is off. */
export function offLinePa(state: FoldState): number {
  return cutInIsKnown(state) ? learnedCutInPa(state) - OFF_UNDER_PA : OFF_LINE_UNKNOWN_PA
}

/** Takes in a vacuum while the pump is off. */
export function holdSample(state: FoldState, at: Instant, vacuumPa: number, rows: Row[]): void {
  const { hold } = state
  if (hold === null) return
  learnStep(state, hold, vacuumPa)
  if (vacuumPa >= hold.offLinePa) state.lowSince = null
  else state.lowSince ??= at
  if (isSteady(state, hold, at, vacuumPa, rows)) accept(state, hold, at, vacuumPa)
  if (state.lowSince !== null && at - state.lowSince >= OFF_AFTER_MS) {
    endHoldByOff(state, hold, state.lowSince, at, rows)
  }
}

/** False while a fall is in progress or undecided; settles one that is over. */
function isSteady(state: FoldState, hold: OpenHold, at: Instant, vacuumPa: number, rows: Row[]): boolean {
  if (state.fall === null) {
    state.fall = findFall(state, hold, at, vacuumPa)
    return state.fall === null
  }
  if (cameBack(state.fall, vacuumPa)) {
    pointFault(state.fall, at, rows)
    state.fall = null
    return true
  }
  if (stillFalling(state, state.fall, at, vacuumPa)) return false
  settleFall(state, hold, at, rows)
  return true
}

function accept(state: FoldState, hold: OpenHold, at: Instant, vacuumPa: number): void {
  learnNoise(state, hold, at, vacuumPa)
  if (hold.firstAt === null) {
    hold.firstAt = at
    hold.firstPa = vacuumPa
  }
  if (hold.topAt === null && hold.flushes === 0 && hold.startSeen && at >= hold.startedAt + 60 * SECOND) {
    hold.topAt = at
    hold.topPa = vacuumPa
  }
  hold.lastAt = at
  hold.lastPa = vacuumPa
  rememberRecent(state, at, vacuumPa)
  extendLeg(state, hold, at, vacuumPa)
}

/** Step of the gauge: the least that neighbouring samples of a hold differ by. */
function learnStep(state: FoldState, hold: OpenHold, vacuumPa: number): void {
  if (hold.lastPa === null) return
  const raw = Math.abs(vacuumPa - hold.lastPa)
  if (raw > 0 && raw <= 0.3 * INHG) {
    state.stepPa = state.stepPa === 0 ? raw : Math.min(state.stepPa, raw)
  }
}

/** Noise of the gauge, from what neighbouring samples of a quiet hold differ by. */
function learnNoise(state: FoldState, hold: OpenHold, at: Instant, vacuumPa: number): void {
  if (hold.lastPa === null || hold.lastAt === null || at < hold.settledAt) return
  const seconds = (at - hold.lastAt) / SECOND
  if (seconds > 120) return
  const off = Math.abs(hold.lastPa - vacuumPa - state.slopePaPerSecond * seconds)
  const sigma = state.sigmaPa
  // 1.25 turns a mean absolute deviation into a standard one, a difference has twice the variance.
  const seen = (Math.min(off, 3 * sigma + 5) * 1.25) / Math.SQRT2
  state.sigmaPa = Math.max(0.1, sigma + (seen - sigma) / 64)
}

/** The vacuum has been far under the cut-in for ten minutes without a start: the hold ended where that began. */
function endHoldByOff(state: FoldState, hold: OpenHold, since: Instant, at: Instant, rows: Row[]): void {
  if (state.fall !== null) settleFall(state, hold, at, rows)
  closeLeg(state, at, rows)
  pushHold(state, { ...hold, endedAt: since, endPa: hold.lastPa }, 'interrupted', at, rows)
  state.hold = null
  state.lowSince = null
  state.offSince = since
}

/** A start ends the hold; it waits for the run's stop to say what ended it. */
export function endHold(
  state: FoldState,
  at: Instant,
  endPa: number | null,
  knownAt: Instant,
  rows: Row[],
): void {
  const { hold } = state
  if (hold === null) return
  closeLeg(state, knownAt, rows)
  const endedAt = state.lowSince !== null ? Math.min(state.lowSince, at) : at
  state.ended = { ...hold, endedAt, endPa }
  state.hold = null
  state.fall = null
  state.recent = []
  state.lowSince = null
}

/** Writes a hold. One that begins and ends at the same instant is none. */
export function pushHold(
  state: FoldState,
  hold: EndedHold,
  ending: Ending,
  knownAt: Instant,
  rows: Row[],
): void {
  if (hold.endedAt <= hold.startedAt) return
  const settledPa = settledTopPa(state, hold, ending)
  const setAside = hold.setAside || state.statement !== null
  const seconds = (hold.endedAt - hold.startedAt) / SECOND
  if (ending === 'leak' && hold.flushes === 0 && settledPa !== null && hold.endPa !== null) {
    state.slopePaPerSecond = Math.max(0, (settledPa - hold.endPa) / seconds)
  }
  if (settledPa !== null && !setAside && ending !== 'interrupted') pushRing(state.rings.settledPa, settledPa)
  rows.push({
    table: 'hold',
    row: {
      startedAt: hold.startedAt,
      endedAt: hold.endedAt,
      ending,
      flushes: hold.flushes,
      cutOutPa: hold.cutOutPa,
      settledPa,
      endPa: hold.endPa,
      learnedCutOutPa: hold.learnedCutOutPa,
      learnedSettledPa: hold.learnedSettledPa,
      learnedCutInPa: hold.learnedCutInPa,
      setAside,
      edgeUncertaintySeconds: hold.edgeUncertaintySeconds,
      knownAt,
    },
  })
}

/**
 * The settled top: the vacuum a minute after the stop, carried back to the stop by the hold's own slope (a
 * short-cycling system loses much of its differential in that minute).
 */
export function settledTopPa(state: FoldState, hold: OpenHold, ending: Ending | 'open'): number | null {
  if (hold.topPa === null || hold.topAt === null) return null
  let slope = state.slopePaPerSecond
  if (ending === 'leak' && hold.flushes === 0 && hold.lastAt !== null && hold.lastPa !== null) {
    const seconds = (hold.lastAt - hold.topAt) / SECOND
    if (seconds >= 30) slope = Math.max(0, (hold.topPa - hold.lastPa) / seconds)
  }
  const back = hold.topPa + slope * ((hold.topAt - hold.startedAt) / SECOND)
  return Math.round((hold.cutOutPa === null ? back : Math.min(back, hold.cutOutPa)) * 10) / 10
}
