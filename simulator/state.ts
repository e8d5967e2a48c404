import type { SimSample } from '@/simulator/logger'
import type { LeakCondition } from '@/simulator/physics/leaks'
import type { RandomState } from '@/simulator/random'
import type { Snapshot, TrueFlush, TrueHold, TrueRun } from '@/simulator/truth'

/**
 * Everything a boat needs to go on from, plain JSON. `pending` is what happened in the last step after the
 * instant that was asked for; the next stretch delivers it.
 */
export interface BoatState {
  t: number
  amount: number
  excessK: number
  wallC: number
  pumpOn: boolean
  switchClosed: boolean
  cutInPa: number
  cutOutPa: number
  filledM3: number
  conditions: LeakCondition[]
  flush: {
    at: number
    head: string
    kind: 'flush' | 'tap'
    areaM2: number
    closesAt: number
    open: boolean
    vacuumBeforePa: number
    dropPa: number
    startedPump: boolean
  } | null
  openRun: { startedAt: number; trigger: TrueRun['trigger']; vacuumAtStartPa: number } | null
  openHold: {
    startedAt: number
    vacuumAtStartPa: number
    flushes: number
    settledPa: number | null
    interrupted: boolean
  } | null
  eventCursor: number
  /** Number of the next sample in the logger's rhythm, and the rhythm it was counted in. */
  nextSample: number
  intervalSeconds: number
  lastSaidAt: number
  lastVacuumReadPa: number | null
  random: { switch: RandomState; seats: RandomState; sensor: RandomState }
  pending: {
    samples: { trueAt: number; sample: SimSample }[]
    runs: TrueRun[]
    holds: TrueHold[]
    flushes: TrueFlush[]
    snapshots: Snapshot[]
  }
  /** Leaks and filling at the last instant that was asked for. */
  baseline: Snapshot
}

type Start = Pick<
  BoatState,
  'amount' | 'wallC' | 'filledM3' | 'conditions' | 'nextSample' | 'intervalSeconds' | 'random'
>

export const newState = (fromMs: number, start: Start): BoatState => ({
  ...start,
  t: fromMs,
  excessK: 0,
  pumpOn: false,
  switchClosed: false,
  cutInPa: 0,
  cutOutPa: 0,
  flush: null,
  openRun: null,
  openHold: null,
  eventCursor: fromMs,
  lastSaidAt: Number.NEGATIVE_INFINITY,
  lastVacuumReadPa: null,
  pending: { samples: [], runs: [], holds: [], flushes: [], snapshots: [] },
  baseline: {
    at: fromMs,
    conditions: start.conditions.map((condition) => ({ ...condition })),
    filledM3: start.filledM3,
  },
})
