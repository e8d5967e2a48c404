import { MINUTE, SECOND, SETTLING_SECONDS } from './constants'
import { addToLeg, binCount, binsOf, openLeg } from './leg-bins'
import { leastSquaresSlope, legRate } from './leg-rate'
import type { FoldState, OpenHold } from './state'
import type { Instant, LegRow, Row } from './types'

/** Adds an accepted vacuum of a hold to its leg; begins one once the gas has settled. */
export function extendLeg(state: FoldState, hold: OpenHold, at: Instant, vacuumPa: number): void {
  if (at < hold.settledAt || state.lowSince !== null) return
  if (state.leg === null) {
    const since = state.lastFlushAt === null ? null : (at - state.lastFlushAt) / SECOND
    state.leg = openLeg(at, since, state.statement !== null)
  }
  addToLeg(state.leg, at, vacuumPa, state.channels)
}

/** Ends the leg in progress. A leg of a single bin says nothing about a rate and makes no row. */
export function closeLeg(state: FoldState, knownAt: Instant, rows: Row[]): void {
  const { leg, hold } = state
  state.leg = null
  if (leg === null || hold === null || binCount(leg) < 2) return
  const bins = binsOf(leg)
  const row: LegRow = {
    holdStartedAt: hold.startedAt,
    startedAt: leg.startedAt,
    endedAt: leg.endedAt,
    sinceFlushSeconds: leg.sinceFlushSeconds,
    bins,
    rate: legRate(bins),
    setAside: leg.setAside,
    knownAt,
  }
  rows.push({ table: 'leg', row })
  if (row.rate !== null && row.rate.paPerHour > 0) state.slopePaPerSecond = row.rate.paPerHour / 3600
}

/** A flush or a tap at `at`: the next leg waits until the gas has settled again. */
export function settleAgain(hold: OpenHold, at: Instant): void {
  hold.settledAt = Math.max(hold.settledAt, at + SETTLING_SECONDS * SECOND)
}

/**
 * How fast the leak lets the vacuum fall now, Pa/s, never negative: the slope of the leg in progress, else the
 * larger of the usual one and the hold's own so far. Only asked where something fell.
 */
export function leakSlope(state: FoldState): number {
  const { leg, hold } = state
  if (leg !== null && leg.count.length >= 4 && leg.endedAt - leg.startedAt >= 2 * MINUTE) {
    return Math.max(0, -leastSquaresSlope(leg.offsetSeconds, leg.vacuumPa))
  }
  let soFar = 0
  if (hold !== null && hold.firstPa !== null && hold.lastPa !== null) {
    const elapsed = ((hold.lastAt ?? 0) - (hold.firstAt ?? 0)) / SECOND
    if (elapsed >= 15 && hold.flushes === 0) soFar = (hold.firstPa - hold.lastPa) / elapsed
  }
  return Math.max(0, state.slopePaPerSecond, soFar)
}
