import { MINUTE, SECOND } from './constants'
import { learned } from './rings'
import type { FoldState } from './state'
import type { FaultKind, FoldSettings, Instant, StatementValue } from './types'

export interface Current {
  /** Time of the last sample. */
  at: Instant | null
  vacuumPa: number | null
  vacuumAt: Instant | null
  pumpOn: boolean | null
  pumpAt: Instant | null
  airC: number | null
  airAt: Instant | null
  barometerPa: number | null
  barometerAt: Instant | null
  supplyV: number | null
  supplyAt: Instant | null
  /** Length of the hold or of the run in progress up to the last sample; null where there is none. */
  holdSoFarSeconds: number | null
  runSoFarSeconds: number | null
}

/** Last values of each channel with their times, and how long the hold or the run has lasted. */
export function currentOf(state: FoldState): Current {
  const { channels, sampleAt } = state
  const soFar = (startedAt: Instant | undefined): number | null =>
    startedAt === undefined || sampleAt === null ? null : (sampleAt - startedAt) / SECOND
  return {
    at: sampleAt,
    vacuumPa: channels.vacuumPa,
    vacuumAt: channels.vacuumAt,
    pumpOn: state.run !== null ? true : state.hold !== null ? false : channels.pumpOn,
    pumpAt: channels.pumpAt,
    airC: channels.airC,
    airAt: channels.airAt,
    barometerPa: channels.barometerPa,
    barometerAt: channels.barometerAt,
    supplyV: channels.supplyV,
    supplyAt: channels.supplyAt,
    holdSoFarSeconds: soFar(state.hold?.startedAt),
    runSoFarSeconds: soFar(state.run?.startedAt),
  }
}

export interface Condition {
  settings: FoldSettings
  statement: { value: StatementValue; since: Instant } | null
  /** Vacuum far under the cut-in without a start since then, or said to be off. */
  offSince: Instant | null
  /** The run in progress if it is running on; the moment from which it was. */
  runningOnSince: Instant | null
  lastFlushAt: Instant | null
  lastSampleAt: Instant | null
  lastGap: { from: Instant; to: Instant } | null
  fault: { kind: FaultKind; startedAt: Instant; detail: string } | null
  fitting: FoldState['fitting']
}

/** What the figures need of the state that no row tells. */
export function conditionOf(state: FoldState): Condition {
  const { kind, startedAt, detail } = state.fault
  return {
    settings: state.settings,
    statement: state.statement,
    offSince: state.offSince,
    runningOnSince: runningOnSince(state),
    lastFlushAt: state.lastFlushAt,
    lastSampleAt: state.sampleAt,
    lastGap: state.lastGap,
    fault: kind === null || startedAt === null ? null : { kind, startedAt, detail },
    fitting: state.fitting,
  }
}

/**
 * Running on: the pump is on for over twice the time that the learned recharge needs from the vacuum at its
 * start, at least 5 minutes, and the vacuum has not risen for 2 minutes. Without a vacuum channel: over twice
 * the usual run and at least 5 minutes. Null where it isn't.
 */
export function runningOnSince(state: FoldState): Instant | null {
  const { run, sampleAt } = state
  if (run === null || sampleAt === null) return null
  const taught = learned(state)
  let neededSeconds = taught.runSeconds ?? 0
  if (run.lowPa !== null && taught.rechargePaPerSecond !== null) {
    neededSeconds = Math.max(0, taught.cutOutPa - run.lowPa) / taught.rechargePaPerSecond
  }
  const long = run.startedAt + Math.max(5 * MINUTE, 2 * neededSeconds * SECOND)
  const since = run.topPa === null ? long : Math.max(long, run.risingAt + 2 * MINUTE)
  return sampleAt >= since ? since : null
}
