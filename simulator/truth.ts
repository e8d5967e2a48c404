import {
  MS_PER_SECOND,
  PA_PER_INHG,
  REFERENCE_TEMPERATURE_K,
  STANDARD_PRESSURE_PA,
} from '@/simulator/physics/constants'
import { holdSeconds, leakInflow, orificeInflow, laminarInflow } from '@/simulator/physics/leak-flow'
import { leakLawOf, type LeakCondition, type LeakSpec } from '@/simulator/physics/leaks'
import type { BoatSpec, SwitchSpec } from '@/simulator/spec'

export type TrueRun = {
  startedAt: number
  stoppedAt: number
  trigger: 'leak' | 'flush' | 'startup'
  vacuumAtStartPa: number
  vacuumAtStopPa: number
}
export type TrueHold = {
  startedAt: number
  endedAt: number
  /** What started the next run. `off`: power was lost during it. */
  ending: 'leak' | 'flush' | 'startup' | 'off'
  flushes: number
  vacuumAtStartPa: number
  vacuumAtEndPa: number
  /** Three minutes after the stop, null when flushed or ended before. */
  settledPa: number | null
}
export type TrueFlush = {
  at: number
  head: string
  kind: 'flush' | 'tap'
  dropPa: number
  startedPump: boolean
}
/** What history has made of leaks and gas space from an instant on. */
export type Snapshot = { at: number; conditions: LeakCondition[]; filledM3: number }

/** The switch's points at an instant, without their scatter. */
export function switchPointsAt(spec: SwitchSpec, at: number): { cutOutPa: number; cutInPa: number } {
  let { cutOutPa, cutInPa } = spec
  for (const drift of spec.drift) {
    if (at <= drift.from || (drift.until !== undefined && at >= drift.until)) continue
    const days = (at - drift.from) / 86_400_000
    cutOutPa += days * drift.cutOutPaPerDay
    cutInPa += days * drift.cutInPaPerDay
  }
  return { cutOutPa, cutInPa }
}

export const gasVolumeM3 = (spec: BoatSpec, filledM3: number): number =>
  spec.volumeM3 - (spec.tank.collects ? Math.min(filledM3, 0.8 * spec.volumeM3) : 0)

/** What really happened: all instants are true time, epoch ms. */
export interface SimTruth {
  runs: TrueRun[]
  holds: TrueHold[]
  /** Flushes and taps. */
  flushes: TrueFlush[]
  /** Unended at the end of the simulated stretch, null when there is none. */
  openRun: Omit<TrueRun, 'stoppedAt' | 'vacuumAtStopPa'> | null
  openHold: { startedAt: number; vacuumAtStartPa: number; flushes: number } | null
  /**
   * How long the pump stays off when nobody flushes, s: from the switch's cut-out to its cut-in with the
   * leaks and gas space of that instant, at steady 20 °C and the place's standard pressure. Infinity when tight.
   */
  holdTimeSeconds: (at: number) => number
  /** The same from the settled top, `settledDropPa` under the cut-out: what a hold really lasts. */
  holdTimeFromSettledSeconds: (at: number, settledDropPa: number) => number
  /** How fast it loses vacuum at `vacuumPa` (default 9 inHg) under the same steady conditions, Pa/h. */
  leakPaPerHour: (at: number, vacuumPa?: number) => number
  /** pV flow of each part's leaks at 9 inHg, 20 °C, Pa·m³/s: what isolation ought to find. */
  leakFlowByPart: (at: number) => Map<string, number>
  gasVolumeM3: (at: number) => number
  switchPoints: (at: number) => { cutOutPa: number; cutInPa: number }
}

export type TruthEvents = Pick<SimTruth, 'runs' | 'holds' | 'flushes' | 'openRun' | 'openHold'>

/** Adds the questions to the events. `snapshots` are in order of time, the first at or before the start. */
export function truthOf(spec: BoatSpec, events: TruthEvents, snapshots: readonly Snapshot[]): SimTruth {
  const lawAt = leakLawOf(spec.leaks)
  const snapshotAt = (at: number): Snapshot => {
    let low = 0
    let high = snapshots.length - 1
    while (low < high) {
      const middle = Math.ceil((low + high) / 2)
      if ((snapshots[middle]?.at ?? Infinity) <= at) low = middle
      else high = middle - 1
    }
    return snapshots[low] ?? { at, conditions: [], filledM3: spec.tank.filledAtStartM3 }
  }
  const volumeAt = (at: number): number => gasVolumeM3(spec, snapshotAt(at).filledM3)
  const lawNow = (at: number) => lawAt(snapshotAt(at).conditions, at)
  const outsidePa = spec.standardPressurePa
  const holdFrom = (at: number, dropPa: number): number => {
    const points = switchPointsAt(spec.switch, at)
    return holdSeconds(lawNow(at), volumeAt(at), points.cutOutPa - dropPa, points.cutInPa, outsidePa)
  }
  return {
    ...events,
    holdTimeSeconds: (at) => holdFrom(at, 0),
    holdTimeFromSettledSeconds: holdFrom,
    leakPaPerHour: (at, vacuumPa = 9 * PA_PER_INHG) =>
      (3600 *
        REFERENCE_TEMPERATURE_K *
        leakInflow(lawNow(at), outsidePa, outsidePa - vacuumPa, REFERENCE_TEMPERATURE_K)) /
      volumeAt(at),
    leakFlowByPart: (at) => flowByPart(spec.leaks, snapshotAt(at).conditions, at),
    gasVolumeM3: volumeAt,
    switchPoints: (at) => switchPointsAt(spec.switch, at),
  }
}

function flowByPart(leaks: readonly LeakSpec[], conditions: readonly LeakCondition[], at: number) {
  const flows = new Map<string, number>()
  const inside = STANDARD_PRESSURE_PA - 9 * PA_PER_INHG
  leaks.forEach((leak, index) => {
    const condition = conditions[index]
    if (!condition) return
    const law = leakLawOf([leak])([condition], at)
    const flow =
      REFERENCE_TEMPERATURE_K *
      (orificeInflow(law.areaM2, STANDARD_PRESSURE_PA, inside, REFERENCE_TEMPERATURE_K) +
        laminarInflow(law.conductance, STANDARD_PRESSURE_PA, inside, REFERENCE_TEMPERATURE_K))
    flows.set(leak.part, (flows.get(leak.part) ?? 0) + flow)
  })
  return flows
}

/** Joins the truths of consecutive stretches of one boat into one. */
export function joinTruths(first: SimTruth, second: SimTruth, secondFrom: number): SimTruth {
  const of = (at: number): SimTruth => (at < secondFrom ? first : second)
  return {
    runs: [...first.runs, ...second.runs],
    holds: [...first.holds, ...second.holds],
    flushes: [...first.flushes, ...second.flushes],
    openRun: second.openRun,
    openHold: second.openHold,
    holdTimeSeconds: (at) => of(at).holdTimeSeconds(at),
    holdTimeFromSettledSeconds: (at, drop) => of(at).holdTimeFromSettledSeconds(at, drop),
    leakPaPerHour: (at, vacuumPa) => of(at).leakPaPerHour(at, vacuumPa),
    leakFlowByPart: (at) => of(at).leakFlowByPart(at),
    gasVolumeM3: (at) => of(at).gasVolumeM3(at),
    switchPoints: (at) => of(at).switchPoints(at),
  }
}

/** Duration of a run in seconds. */
export const runSeconds = (run: TrueRun): number => (run.stoppedAt - run.startedAt) / MS_PER_SECOND
