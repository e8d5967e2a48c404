import { FALL_WINDOW_MS, FLUSH_PA, INHG, MINUTE, SECOND, TAP_PA } from './constants'
import { closeLeg, leakSlope, settleAgain } from './leg'
import { learnedCutInPa } from './rings'
import type { FoldState, OpenHold, PendingFall } from './state'
import type { FlushRow, Instant, Row } from './types'

/** Recent samples kept for the comparison are at least this far apart. */
const RECENT_APART_MS = 4 * SECOND
const RECENT_MOST = 8
/** How long a fall is given to end: longer where the pump must answer it. */
const FALL_ENDS_MS = 10 * SECOND

/** Least sudden fall that noise and the gauge's steps don't make, Pa. */
export function noiseFloorPa(state: FoldState): number {
  return Math.max(4 * state.sigmaPa, 1.2 * state.stepPa)
}

/** Part of the settling that may still fall between two instants, Pa: fades with a minute (judged). */
export function settlingPa(hold: OpenHold, from: Instant, to: Instant): number {
  if (!hold.startSeen) return 0
  const share = (at: Instant): number => Math.exp(-Math.max(0, at - hold.startedAt) / MINUTE)
  return hold.settlingPa * (share(from) - share(to))
}

/** The sharpest fall from the last half minute (or the last sample) to this one; null where there is none. */
export function findFall(
  state: FoldState,
  hold: OpenHold,
  at: Instant,
  vacuumPa: number,
): PendingFall | null {
  const floor = Math.max(TAP_PA, noiseFloorPa(state))
  const { recent } = state
  let fromAt = hold.lastAt
  let fromPa = hold.lastPa
  if (fromPa === null && hold.startSeen) {
    fromAt = hold.startedAt
    fromPa = hold.cutOutPa
  }
  let best: PendingFall | null = null
  if (fromAt !== null && fromPa !== null && fromPa - vacuumPa >= floor) {
    best = fallFrom(state, hold, fromAt, fromPa, at, vacuumPa, floor)
  }
  for (let i = 0; i + 1 < recent.length; i += 2) {
    const recentAt = recent[i] ?? 0
    const recentPa = recent[i + 1] ?? 0
    if (recentPa - vacuumPa < floor || at - recentAt > FALL_WINDOW_MS) continue
    const fall = fallFrom(state, hold, recentAt, recentPa, at, vacuumPa, floor)
    if (fall !== null && (best === null || fallPa(fall) > fallPa(best))) best = fall
  }
  return best
}

/** The fall between two readings where leak and settling don't explain it. */
function fallFrom(
  state: FoldState,
  hold: OpenHold,
  fromAt: Instant,
  fromPa: number,
  at: Instant,
  vacuumPa: number,
  floor: number,
): PendingFall | null {
  const slope = leakSlope(state)
  const seconds = (at - fromAt) / SECOND
  const excess = fromPa - vacuumPa - slope * seconds - settlingPa(hold, fromAt, at)
  if (excess < floor + 0.3 * slope * seconds) return null
  return { fromAt, fromPa, at, lowAt: at, lowPa: vacuumPa, slopePaPerSecond: slope }
}

/** Remembers an accepted sample for the next comparisons. */
export function rememberRecent(state: FoldState, at: Instant, vacuumPa: number): void {
  const { recent } = state
  const lastAt = recent[recent.length - 2]
  if (lastAt !== undefined && at - lastAt < RECENT_APART_MS) return
  recent.push(at, vacuumPa)
  while (recent.length > 2 * RECENT_MOST || at - (recent[0] ?? at) > FALL_WINDOW_MS) recent.splice(0, 2)
}

/** What a pending fall amounts to beyond the leak, Pa. */
export function fallPa(fall: PendingFall): number {
  return fall.fromPa - fall.lowPa - fall.slopePaPerSecond * ((fall.lowAt - fall.fromAt) / SECOND)
}

/** Whether a later sample shows that the fall was a blip: most of it came back by itself. */
export function cameBack(fall: PendingFall, vacuumPa: number): boolean {
  return vacuumPa > fall.lowPa + 0.6 * (fall.fromPa - fall.lowPa)
}

/** Whether a fall still goes on, or the pump may still answer it. Deepens it where it does. */
export function stillFalling(state: FoldState, fall: PendingFall, at: Instant, vacuumPa: number): boolean {
  if (at - fall.at <= FALL_WINDOW_MS && vacuumPa < fall.lowPa - Math.max(0.05 * INHG, 2 * state.sigmaPa)) {
    fall.lowPa = vacuumPa
    fall.lowAt = at
    return true
  }
  const mustStart = fall.lowPa < learnedCutInPa(state) + 0.1 * INHG
  return at - fall.lowAt < (mustStart ? FALL_WINDOW_MS : FALL_ENDS_MS)
}

/** A fall that stayed and did not start the pump: a flush from half an inch on, else a tap. Splits the leg. */
export function settleFall(state: FoldState, hold: OpenHold, knownAt: Instant, rows: Row[]): void {
  const { fall } = state
  state.fall = null
  if (fall === null) return
  const dropPa = fallPa(fall)
  closeLeg(state, knownAt, rows)
  settleAgain(hold, fall.lowAt)
  state.recent = []
  if (dropPa < Math.max(FLUSH_PA, noiseFloorPa(state))) return
  hold.flushes += 1
  pushFlush(state, { at: fall.at, dropPa, startedPump: false, knownAt }, rows)
}

/** Writes a flush, once an instant. The one that started a run may be known after one during it. */
export function pushFlush(state: FoldState, flush: FlushRow, rows: Row[]): void {
  if (flush.at === state.lastFlushAt) return
  rows.push({ table: 'flush', row: { ...flush, dropPa: Math.round(flush.dropPa * 10) / 10 } })
  state.lastFlushAt = Math.max(flush.at, state.lastFlushAt ?? flush.at)
}
