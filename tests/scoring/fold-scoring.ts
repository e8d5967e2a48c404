import {
  initialState,
  orderItems,
  step,
  type Fact,
  type FlushRow,
  type FoldState,
  type HoldRow,
  type LegRow,
  type Row,
  type RunRow,
  type Sample,
} from '@/lib/analysis/fold'
import { simulateBoat, type BoatSpec, type SimSample, type SimTruth } from '@/simulator/boat'
import { PA_PER_INHG } from '@/shared/units'

export const DAY_MS = 86_400_000

/** Rows by table. */
export interface Derived {
  runs: RunRow[]
  holds: HoldRow[]
  legs: LegRow[]
  flushes: FlushRow[]
  state: FoldState
}

/** The rounding of receipt: 1 ms, 0.1 Pa, 0.01 °C and V. The simulator rounds values, not its clock. */
export const asStored = (sample: SimSample): Sample => ({ ...sample, at: Math.round(sample.at) })

export function factsOf(spec: BoatSpec, from: number): Fact[] {
  const { channels, intervalSeconds } = spec.logger
  return [
    {
      kind: 'fitting',
      at: from,
      loggerId: '1',
      intervalSeconds,
      channels: { pump: channels.includes('pump'), vacuum: channels.includes('vacuum') },
    },
  ]
}

export function derive(facts: readonly Fact[], samples: readonly Sample[]): Derived {
  const state = initialState()
  const rows: Row[] = []
  for (const item of orderItems(facts, samples)) rows.push(...step(state, item))
  return { ...split(rows), state }
}

export function split(rows: readonly Row[]): Omit<Derived, 'state'> {
  const out: Omit<Derived, 'state'> = { runs: [], holds: [], legs: [], flushes: [] }
  for (const row of rows) {
    if (row.table === 'run') out.runs.push(row.row)
    if (row.table === 'hold') out.holds.push(row.row)
    if (row.table === 'leg') out.legs.push(row.row)
    if (row.table === 'flush') out.flushes.push(row.row)
  }
  return out
}

export function simulateAndDerive(spec: BoatSpec, from: number, days: number) {
  const { samples, truth } = simulateBoat(spec, from, from + days * DAY_MS)
  const derived = derive(factsOf(spec, from), samples.map(asStored))
  return { samples, truth, derived }
}

/** Pairs each true run with the nearest derived one whose start lies within `withinMs`. */
export function matchRuns(truth: SimTruth, derived: Derived, startMs: number, stopMs: number) {
  const free = [...derived.runs]
  const pairs: { truth: SimTruth['runs'][number]; run: RunRow }[] = []
  const missed: SimTruth['runs'] = []
  for (const real of truth.runs) {
    const index = free.findIndex(
      (run) =>
        Math.abs(run.startedAt - real.startedAt) <= startMs &&
        Math.abs(run.stoppedAt - real.stoppedAt) <= stopMs,
    )
    const [run] = index < 0 ? [] : free.splice(index, 1)
    if (run === undefined) missed.push(real)
    else pairs.push({ truth: real, run })
  }
  return { pairs, missed, extra: free }
}

export function f1(pairs: number, missed: number, extra: number): number {
  return pairs === 0 ? 0 : (2 * pairs) / (2 * pairs + missed + extra)
}

/** True flushes of half an inch or more against derived ones, within `withinMs` either way. */
export function matchFlushes(truth: SimTruth, derived: Derived, withinMs: number) {
  const free = [...derived.flushes]
  const real = truth.flushes.filter(
    (flush) =>
      flush.kind === 'flush' &&
      flush.dropPa >= 0.5 * PA_PER_INHG &&
      (flush.startedPump || !duringRun(truth, flush.at)),
  )
  const missed: SimTruth['flushes'] = []
  let found = 0
  for (const flush of real) {
    const index = free.findIndex((row) => Math.abs(row.at - flush.at) <= withinMs)
    if (index < 0) missed.push(flush)
    else {
      free.splice(index, 1)
      found += 1
    }
  }
  const extra = free.filter((row) => !truth.flushes.some((flush) => Math.abs(flush.at - row.at) <= withinMs))
  return { found, missed, extra }
}

const duringRun = (truth: SimTruth, at: number): boolean =>
  truth.runs.some((run) => at >= run.startedAt && at <= run.stoppedAt)

export function quantile(values: readonly number[], p: number): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.min(sorted.length - 1, Math.max(0, Math.round(p * (sorted.length - 1))))] ?? NaN
}
