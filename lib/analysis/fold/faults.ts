import { formatVacuum } from '@/shared/units'
import { HOUR, INHG, SECOND } from './constants'
import type { FoldState, OpenRun, PendingFall } from './state'
import type { FaultKind, FaultRow, Instant, Row } from './types'

/** No vacuum toilet pump draws so deep: the sensor is at its rail (judged). */
const OFF_SCALE_PA = 25 * INHG
/** Under zero by so much is no zero error: the sign is swapped (judged). */
const SWAPPED_PA = -1 * INHG
/** Not a digit of change for so long; a coarse gauge may rest for longer. */
const STUCK_FINE_MS = 24 * HOUR
const STUCK_COARSE_MS = 72 * HOUR
const STUCK_RUNS = 2
const STUCK_RUN_MS = 10 * SECOND
/** A vented sensor rests; a sealed system moves with temperature and barometer. */
const ZERO_REST_MS = 6 * HOUR
const ZERO_OFF_PA = 0.3 * INHG
const ZERO_MOST_PA = 3 * INHG

/**
 * Names a reading that is none of the system's and holds it back: off-scale, swapped sign, stuck.
 * @returns the vacuum where it may be used, else null
 */
export function checkVacuum(state: FoldState, at: Instant, vacuumPa: number, rows: Row[]): number | null {
  const { fault } = state
  if (vacuumPa !== fault.samePa) {
    fault.samePa = vacuumPa
    fault.sameSince = at
    fault.sameRuns = 0
  }
  if (vacuumPa >= OFF_SCALE_PA) return held(state, 'off-scale', at, `reads ${inHg(vacuumPa)}`, rows)
  if (vacuumPa <= SWAPPED_PA) return held(state, 'swapped-sign', at, `reads ${inHg(vacuumPa)}`, rows)
  if (isStuck(state, at)) {
    return held(state, 'stuck', fault.sameSince ?? at, `rests at ${inHg(vacuumPa)}`, rows)
  }
  if (fault.kind !== null && fault.kind !== 'zero-drift') endFault(state, at, rows)
  return vacuumPa
}

const inHg = (pa: number): string => formatVacuum(pa, 'inHg', 2)

function isStuck(state: FoldState, at: Instant): boolean {
  const { fault } = state
  if (fault.sameSince === null) return false
  if (fault.sameRuns >= STUCK_RUNS) return true
  if (state.offSince !== null || state.statement !== null) return false
  const rest = state.stepPa > 0.05 * INHG || state.stepPa === 0 ? STUCK_COARSE_MS : STUCK_FINE_MS
  return at - fault.sameSince >= rest
}

/** A run over: did the vacuum move at all from its start to its stop? */
export function watchStuckRun(state: FoldState, run: OpenRun, stoppedAt: Instant): void {
  const { fault } = state
  if (fault.sameSince === null || run.startPa === null || stoppedAt - run.startedAt < STUCK_RUN_MS) return
  if (fault.sameSince <= run.startedAt && run.startPa === fault.samePa) fault.sameRuns += 1
}

/** Resting away from zero while the system is off: a sealed one would move with the weather. */
export function watchZero(state: FoldState, at: Instant, vacuumPa: number, rows: Row[]): void {
  const { fault } = state
  const low = Math.min(fault.zeroLowPa, vacuumPa)
  const high = Math.max(fault.zeroHighPa, vacuumPa)
  const rest = Math.max(0.03 * INHG, 6 * state.sigmaPa)
  if (fault.zeroSince === null || high - low > rest) {
    if (fault.kind === 'zero-drift') endFault(state, at, rows)
    fault.zeroSince = at
    fault.zeroLowPa = vacuumPa
    fault.zeroHighPa = vacuumPa
    return
  }
  fault.zeroLowPa = low
  fault.zeroHighPa = high
  const size = Math.abs(vacuumPa)
  if (at - fault.zeroSince < ZERO_REST_MS || size < ZERO_OFF_PA || size > ZERO_MOST_PA) return
  if (fault.kind === null) begin(state, 'zero-drift', fault.zeroSince, `reads ${inHg(vacuumPa)} at rest`)
}

/** The system is in use again: what rested is over. */
export function leaveZero(state: FoldState, at: Instant, rows: Row[]): void {
  if (state.fault.kind === 'zero-drift') endFault(state, at, rows)
  state.fault.zeroSince = null
}

/** A fall that came back by itself: no gas does that. */
export function pointFault(fall: PendingFall, at: Instant, rows: Row[]): void {
  const dropPa = fall.fromPa - fall.lowPa
  if (dropPa < 0.5 * INHG) return
  pushFault(
    {
      kind: 'jump',
      startedAt: fall.at,
      endedAt: at,
      detail: `fell ${inHg(dropPa)} and came back`,
      knownAt: at,
    },
    rows,
  )
}

/** A rise while the pump was off, too quick for a run that was missed. */
export function riseFault(fromAt: Instant, risePa: number, at: Instant, rows: Row[]): void {
  const detail = `rose ${inHg(risePa)} with the pump off`
  pushFault({ kind: 'jump', startedAt: fromAt, endedAt: at, detail, knownAt: at }, rows)
}

function held(state: FoldState, kind: FaultKind, since: Instant, detail: string, rows: Row[]): null {
  const { fault } = state
  if (fault.kind !== kind) {
    endFault(state, since, rows, state.at ?? since)
    begin(state, kind, since, detail)
  }
  return null
}

function begin(state: FoldState, kind: FaultKind, since: Instant, detail: string): void {
  state.fault.kind = kind
  state.fault.startedAt = since
  state.fault.detail = detail
}

/** Writes the fault in progress, over at `at`. */
export function endFault(state: FoldState, at: Instant, rows: Row[], knownAt: Instant = at): void {
  const { fault } = state
  if (fault.kind !== null && fault.startedAt !== null) {
    const endedAt = Math.max(at, fault.startedAt)
    pushFault(
      {
        kind: fault.kind,
        startedAt: fault.startedAt,
        endedAt,
        detail: fault.detail,
        knownAt: Math.max(knownAt, endedAt),
      },
      rows,
    )
  }
  fault.kind = null
  fault.startedAt = null
  fault.detail = ''
}

const pushFault = (row: FaultRow, rows: Row[]): void => {
  rows.push({ table: 'fault', row })
}
