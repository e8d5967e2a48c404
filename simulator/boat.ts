import { createEngine } from '@/simulator/engine'
import type { SimSample } from '@/simulator/logger'
import type { BoatSpec } from '@/simulator/spec'
import type { BoatState } from '@/simulator/state'
import { truthOf, type SimTruth } from '@/simulator/truth'

export type { SimSample, LoggerSpec, Channel } from '@/simulator/logger'
export type { BoatSpec, BoatOverrides } from '@/simulator/spec'
export type { BoatState } from '@/simulator/state'
export type { SimTruth } from '@/simulator/truth'
export { CLEAN, defaultBoat, flowForBoatHold } from '@/simulator/spec'
export { loggerClock, sendableAt } from '@/simulator/logger'
export { joinTruths } from '@/simulator/truth'
export { randomBoat, type RandomBoatKind } from '@/simulator/random-boat'

export type SimulateOptions = {
  /** The `end` of an earlier stretch: goes on from there, and `fromMs` must be that stretch's `toMs`. */
  resume?: BoatState
}

/**
 * Simulates one boat over a half-open stretch of true time (epoch ms). The same spec and start give the same
 * result however the stretch is cut: every random draw belongs to the boat's own history, and steps never
 * depend on `toMs`.
 *
 * @param spec Not changed.
 * @returns `samples` as the logger recorded them, in order; `truth` of runs and holds that ended, and flushes
 * that were over, within the stretch; `end` to resume from, plain JSON.
 * @throws RangeError when `toMs` is before `fromMs`.
 * @example const { samples, truth } = simulateBoat(defaultBoat({ seed: 7 }), from, from + 86_400_000)
 */
export function simulateBoat(
  spec: BoatSpec,
  fromMs: number,
  toMs: number,
  options: SimulateOptions = {},
): { samples: SimSample[]; truth: SimTruth; end: BoatState } {
  if (!(toMs >= fromMs)) throw new RangeError('A stretch cannot end before it starts.')
  const resumed = options.resume ? structuredClone(options.resume) : null
  const { state, runTo } = createEngine(spec, fromMs, resumed)
  runTo(toMs)

  const { pending } = state
  const samples = split(pending.samples, (each) => each.trueAt, toMs)
  const runs = split(pending.runs, (each) => each.stoppedAt, toMs)
  const holds = split(pending.holds, (each) => each.endedAt, toMs)
  const flushes = split(pending.flushes, (each) => each.at, toMs)
  const snapshots = split(pending.snapshots, (each) => each.at, toMs)
  const known = [state.baseline, ...snapshots.before]

  const unendedRun = state.openRun ?? runs.after[0] ?? null
  const openRun = unendedRun && unendedRun.startedAt < toMs ? unendedRun : null
  const unendedHold = holds.after[0] ?? state.openHold
  const openHold = unendedHold && unendedHold.startedAt < toMs ? unendedHold : null
  const truth = truthOf(
    spec,
    {
      runs: runs.before,
      holds: holds.before,
      flushes: flushes.before,
      openRun: openRun && {
        startedAt: openRun.startedAt,
        trigger: openRun.trigger,
        vacuumAtStartPa: openRun.vacuumAtStartPa,
      },
      openHold: openHold && {
        startedAt: openHold.startedAt,
        vacuumAtStartPa: openHold.vacuumAtStartPa,
        flushes: openHold.flushes,
      },
    },
    known,
  )
  const end: BoatState = {
    ...state,
    pending: {
      samples: samples.after,
      runs: runs.after,
      holds: holds.after,
      flushes: flushes.after,
      snapshots: snapshots.after,
    },
    baseline: known[known.length - 1] ?? state.baseline,
  }
  return { samples: samples.before.map((each) => each.sample), truth, end }
}

/** Parts a list in order of time at an instant. */
function split<Item>(items: readonly Item[], timeOf: (item: Item) => number, at: number) {
  return {
    before: items.filter((item) => timeOf(item) < at),
    after: items.filter((item) => timeOf(item) >= at),
  }
}
