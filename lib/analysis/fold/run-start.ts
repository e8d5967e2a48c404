import { FLUSH_PA, INHG, SECOND } from './constants'
import { fallPa, noiseFloorPa, settleFall, settlingPa } from './fall'
import { endHold, offLinePa } from './hold'
import { leakSlope } from './leg'
import { learnedCutInPa } from './rings'
import type { FoldState } from './state'
import type { Instant, Row } from './types'

export interface Start {
  at: Instant
  seen: boolean
  startPa: number | null
  spacingMs: number
  edgeUncertaintySeconds: number
  /** Time of the item that shows it. */
  knownAt: Instant
}

/** The pump was seen to start (or found running): ends the hold, begins a run. */
export function startRun(state: FoldState, start: Start, rows: Row[]): void {
  settleEarlierFall(state, start, rows)
  const { hold } = state
  const before = vacuumBefore(state)
  const beforePa = before?.pa ?? null
  const fallen = start.seen ? suddenFallPa(state, start, before) : null
  const sudden = fallen?.sudden ?? null
  const line = offLinePa(state)
  const isLow = start.startPa !== null && start.startPa < line
  const fellSuddenly = sudden !== null && sudden > Math.max(FLUSH_PA, noiseFloorPa(state))
  const wasLow =
    state.offSince !== null || (isLow && (state.lowSince !== null || hold === null || !start.seen))
  const fromOff = wasLow && !(fellSuddenly && state.offSince === null)
  if (fromOff && state.lowSince === null && hold !== null && isLow) state.lowSince = start.at
  endHold(state, start.at, start.startPa ?? beforePa, start.knownAt, rows)
  state.offSince = null
  state.turn = null
  state.run = {
    startedAt: start.at,
    startSeen: start.seen,
    startPa: start.startPa,
    fallPa: sudden,
    bareFallPa: fallen?.bare ?? null,
    beforePa,
    fromOff,
    setAside: state.statement !== null,
    startSpacingMs: start.spacingMs,
    edgeUncertaintySeconds: start.edgeUncertaintySeconds,
    lowPa: start.startPa,
    fall: null,
    fellMidRun: false,
    onCurve: false,
    topPa: start.startPa,
    topAt: start.startPa === null ? null : start.at,
    underAt: null,
    underPa: null,
    crossedAt: null,
    risingAt: start.at,
    risingPa: start.startPa,
    supplyV: null,
  }
}

/** A fall that had ended over the cut-in well before the start did not cause it. */
function settleEarlierFall(state: FoldState, start: Start, rows: Row[]): void {
  const { fall, hold } = state
  if (fall === null || hold === null || start.at - fall.lowAt <= 10 * SECOND) return
  if (fall.lowPa < learnedCutInPa(state) + 0.1 * INHG) return
  settleFall(state, hold, start.knownAt, rows)
  hold.lastAt = fall.lowAt
  hold.lastPa = fall.lowPa
}

/** Vacuum before the start: where a fall in progress came from, the last of the hold, or the stop before it. */
function vacuumBefore(state: FoldState): { at: Instant; pa: number } | null {
  const { hold, fall } = state
  if (fall !== null) return { at: fall.fromAt, pa: fall.fromPa }
  if (hold === null) return null
  if (hold.lastAt !== null && hold.lastPa !== null) return { at: hold.lastAt, pa: hold.lastPa }
  return hold.startSeen && hold.cutOutPa !== null ? { at: hold.startedAt, pa: hold.cutOutPa } : null
}

/** A leak may be so much faster than its slope was seen to be before it counts as a fall. */
export const LEAK_MARGIN = 1.3

/** Fall to the start beyond what leak and settling explain, Pa; null where either end is unknown. */
function suddenFallPa(
  state: FoldState,
  start: Start,
  before: { at: Instant; pa: number } | null,
): { bare: number; sudden: number } | null {
  if (before === null || start.startPa === null) return null
  const { hold, fall } = state
  const slope = fall?.slopePaPerSecond ?? leakSlope(state)
  const settled = hold === null ? 0 : settlingPa(hold, before.at, start.at)
  const bare = before.pa - start.startPa - slope * ((start.at - before.at) / SECOND) - settled
  const suddenPa = bare - (LEAK_MARGIN - 1) * slope * ((start.at - before.at) / SECOND)
  return { bare, sudden: fall === null ? suddenPa : Math.max(suddenPa, fallPa(fall)) }
}
