import type { HoldRow, RunRow } from '../fold/types'
import { median, standardDeviation } from '../statistics'
import type { HoldTimeInput } from './types'

/** A hold's length with what the run after it says about how it ended. */
export interface LabelledHold {
  endedAt: number
  seconds: number
  /** Relative likelihoods of the run that followed, had the leak or a flush started it. */
  ifLeak: number
  ifFlush: number
  /** Flushes an hour expected at the time of day it ended. */
  flushesPerHour: number
  edgeSeconds: number
}

/** Leak runs refill one differential and are alike: this far apart in the logarithm of their length. */
const ALIKE = 0.05
/** Share of the lengths within 18 % that lie within 6 % of a cluster that is one (a broad heap has 0.4). */
const TIGHT = 0.58

/**
 * Holds since `from`, newest first and at most `most`, with the odds that the leak or a flush ended each: from
 * the ending where the vacuum told it, from the trigger where the run's length told it, else from how near the
 * run's length is to the tight lowest cluster of lengths. Interrupted holds and those set aside are left out.
 */
export function labelHolds(
  input: Pick<HoldTimeInput, 'holds' | 'runs'>,
  from: number,
  most: number,
): LabelledHold[] {
  const holds = input.holds
    .filter((hold) => !hold.setAside && hold.ending !== 'interrupted' && hold.endedAt > from)
    .filter((hold) => Number.isFinite(hold.endedAt - hold.startedAt) && hold.endedAt > hold.startedAt)
    .sort((a, b) => b.startedAt - a.startedAt)
    .slice(0, most)
  const runAfter = new Map(input.runs.map((run) => [run.startedAt, run]))
  const odds = oddsByLength(holds.flatMap((hold) => runAfter.get(hold.endedAt) ?? []))
  const items = holds.map((hold) => {
    const run = runAfter.get(hold.endedAt)
    const seconds = (hold.endedAt - hold.startedAt) / 1000
    return { hold, seconds, ...oddsOf(hold, run, odds), edgeSeconds: hold.edgeUncertaintySeconds }
  })
  const perHour = flushesByHour(items)
  return items.map(({ hold, seconds, ifLeak, ifFlush, edgeSeconds }) => ({
    endedAt: hold.endedAt,
    seconds,
    ifLeak,
    ifFlush,
    edgeSeconds,
    flushesPerHour: perHour[new Date(hold.endedAt).getUTCHours()] ?? 0.5,
  }))
}

type Odds = (runSeconds: number) => { ifLeak: number; ifFlush: number }

function oddsOf(hold: HoldRow, run: RunRow | undefined, byLength: Odds): { ifLeak: number; ifFlush: number } {
  if (hold.ending === 'leak') return { ifLeak: 1, ifFlush: 0.02 }
  if (hold.ending === 'flush') return { ifLeak: 0.02, ifFlush: 1 }
  if (run === undefined || run.interrupted) return { ifLeak: 1, ifFlush: 1 }
  return byLength((run.stoppedAt - run.startedAt) / 1000)
}

/** Likelihoods by run length: a narrow bell at the tight cluster against the broad one of all runs. */
function oddsByLength(runs: readonly RunRow[]): Odds {
  const logs = runs
    .filter((run) => !run.interrupted && run.stoppedAt > run.startedAt)
    .map((run) => Math.log((run.stoppedAt - run.startedAt) / 1000))
    .sort((a, b) => a - b)
  const even = { ifLeak: 1, ifFlush: 1 }
  const cluster = tightCluster(logs)
  if (cluster === null) return () => even
  const edge = (median(runs.map((run) => run.edgeUncertaintySeconds)) ?? 0) / Math.exp(cluster)
  const narrow = Math.hypot(ALIKE, 0.6 * edge)
  const others = logs.filter((log) => Math.abs(log - cluster) > 2 * narrow)
  const middle = median(others) ?? cluster + 0.6
  const broad = Math.max(0.25, standardDeviation(others) ?? 0.5)
  const bell = (log: number, centre: number, sigma: number) =>
    Math.exp(-0.5 * ((log - centre) / sigma) ** 2) / sigma
  return (seconds) => {
    if (!(seconds > 0)) return even
    const log = Math.log(seconds)
    const flush = 0.9 * bell(log, middle, broad) + 0.1 * bell(log, middle, 1.5)
    return { ifLeak: 0.95 * bell(log, cluster, narrow) + 0.05 * flush, ifFlush: flush }
  }
}

/** Centre of the densest window of lengths, the lowest where several are as dense; null with under 6 runs. */
function tightCluster(sorted: readonly number[]): number | null {
  if (sorted.length < 6) return null
  let best: { count: number; centre: number } | null = null
  let end = 0
  sorted.forEach((log, start) => {
    while (end < sorted.length && (sorted[end] ?? Infinity) <= log + 2.4 * ALIKE) end += 1
    const count = end - start
    // Long runs are flushes: a later window has to be clearly denser to count.
    if (best === null || count > 1.4 * best.count) {
      best = { count, centre: median(sorted.slice(start, end)) ?? log }
    }
  })
  const found = best as { count: number; centre: number } | null // written within the closure above
  if (found === null || found.count < Math.max(3, 0.04 * sorted.length)) return null
  // Flush runs start lower and are longer, and scatter: the leak's cluster is tight, and hardly any is shorter.
  const within = (reach: number) => sorted.filter((log) => Math.abs(log - found.centre) < reach).length
  const shorter = sorted.filter((log) => log < found.centre - 3 * ALIKE).length
  if (shorter > Math.max(1, 0.06 * sorted.length)) return null
  return within(1.2 * ALIKE) < TIGHT * within(3.6 * ALIKE) ? null : found.centre
}

/** Flushes an hour by hour of the UTC day from the holds that seem to have been cut, smoothed over neighbours. */
function flushesByHour(items: readonly { hold: HoldRow; ifLeak: number; ifFlush: number }[]): number[] {
  const flushes = new Array<number>(24).fill(0)
  const hours = new Array<number>(24).fill(0)
  for (const { hold, ifLeak, ifFlush } of items) {
    const hour = new Date(hold.endedAt).getUTCHours()
    flushes[hour] = (flushes[hour] ?? 0) + ifFlush / (ifFlush + ifLeak)
    addHours(hours, hold)
  }
  const total = flushes.reduce((sum, count) => sum + count, 0)
  const heard = hours.reduce((sum, count) => sum + count, 0)
  const usual = heard > 0 ? (total + 0.5) / (heard + 1) : 0.5
  return flushes.map((_, hour) => {
    const near = [hour + 23, hour, hour + 1].map((each) => each % 24)
    const count = near.reduce((sum, each) => sum + (flushes[each] ?? 0), 0)
    const over = near.reduce((sum, each) => sum + (hours[each] ?? 0), 0)
    return (count + 2 * usual) / (over + 2)
  })
}

function addHours(hours: number[], hold: HoldRow): void {
  let from = hold.startedAt
  while (from < hold.endedAt) {
    const next = Math.min(hold.endedAt, (Math.floor(from / 3_600_000) + 1) * 3_600_000)
    const hour = new Date(from).getUTCHours()
    hours[hour] = (hours[hour] ?? 0) + (next - from) / 3_600_000
    from = next
  }
}
