import {
  censoredRatio,
  hodgesLehmannRatio,
  mannWhitney,
  mean,
  type Survival,
} from '@/lib/analysis/statistics'
import { holdTimeOf, holdTimes, periodFigures, quietHolds, signsOf } from './figures'
import type { Comparison, ComparedPeriod } from './types'
import { hoursNeededFor, type Interval, judgeRepair, type Level, otherCause } from './verdict'

/** Least holds on either side for a verdict. */
const FEWEST = 2

/**
 * Before and after a visit: hold time, leak rate, recharge, runs and pump minutes of both, the ratio of hold
 * times (Hodges–Lehmann, with flush-cut holds as cut short) with its 95 % interval and the Mann–Whitney p
 * (Gehan's where any is cut short), and the verdict. A pumped-out tank moves rate and recharge together and
 * leaves K = r/(R + r) as it was: that is no repair. Nothing on a side: `too-early`, ratio and p null.
 */
export function compareBeforeAfter(
  before: ComparedPeriod,
  after: ComparedPeriod,
  { limitSeconds, pumpAmps = null }: { limitSeconds: number; pumpAmps?: number | null },
): Comparison {
  const [timesBefore, timesAfter] = [holdTimes(before), holdTimes(after)]
  const figures = { before: periodFigures(before, pumpAmps), after: periodFigures(after, pumpAmps) }
  const signs = { before: signsOf(before), after: signsOf(after) }
  const because = otherCause(signs.before, signs.after)
  const change = changeOf(timesAfter, timesBefore)
  const enough = Math.min(timesBefore.length, timesAfter.length) >= FEWEST
  const level = levelAfter(timesBefore, timesAfter, change?.ratio ?? null)
  const verdict = change === null || !enough ? null : judgeRepair(change.ratio, level, limitSeconds, because)
  const expectedSeconds =
    meanLength(after) ?? Math.min(figures.before.holdTimeSeconds ?? limitSeconds, limitSeconds)
  return {
    ...figures,
    ratio: change?.ratio ?? null,
    pValue: change?.pValue ?? null,
    verdict: verdict ?? 'too-early',
    hoursNeeded:
      verdict === null ? hoursNeededFor(change?.ratio ?? null, timesAfter.length, expectedSeconds) : null,
    signs,
    because,
  }
}

function changeOf(
  after: readonly Survival[],
  before: readonly Survival[],
): { ratio: Interval; pValue: number } | null {
  const seen = (items: readonly Survival[]) => items.map((item) => item.time)
  if ([...after, ...before].every((item) => item.event)) {
    const ratio = hodgesLehmannRatio(seen(after), seen(before))
    const test = mannWhitney(seen(after), seen(before))
    return ratio === null || test === null ? null : { ratio, pValue: test.pValue }
  }
  const censored = censoredRatio(after, before)
  if (censored === null) return null
  const { value, low, high, isBound, pValue } = censored
  return { ratio: { value, low, high: isBound ? null : high }, pValue }
}

/** How long holds are left alone in a period, by leak or by people. */
function meanLength(period: ComparedPeriod): number | null {
  return mean(quietHolds(period).map((hold) => (hold.endedAt - hold.startedAt) / 1000))
}

/**
 * Hold time after with its interval: the one before times the ratio where both are known (few holds after
 * say more against many before than by themselves), else the median of those after.
 */
function levelAfter(before: readonly Survival[], after: readonly Survival[], ratio: Interval | null): Level {
  const own = holdTimeOf(after)
  const base = holdTimeOf(before).median
  const scaled = (factor: number | null | undefined) =>
    base === null || factor === null || factor === undefined ? null : base * factor
  return {
    median: own.median ?? scaled(ratio?.value),
    low: scaled(ratio?.low) ?? own.low,
    high: scaled(ratio?.high) ?? own.high,
    atLeast: atLeast(after),
  }
}

/** Where the curve does not fall to half: half of the holds lasted at least this long. */
function atLeast(times: readonly Survival[]): number | null {
  if (times.length < FEWEST) return null
  const sorted = times.map((item) => item.time).sort((a, b) => a - b)
  return sorted[Math.floor((sorted.length - 1) / 2)] ?? null
}
