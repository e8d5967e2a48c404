import { kaplanMeier, median, type Survival, survivalMedian } from '@/lib/analysis/statistics'
import type { ComparedHold, ComparedPeriod, PeriodFigures, Signs } from './types'

/** A leg's rate stands for its hold when its interval is narrower than this share of it, either way. */
const TRUSTED = 0.25
const DAY_SECONDS = 86_400
/** Holds beyond this many add nothing but time. */
const MOST_HOLDS = 250

/** The holds that are compared: neither interrupted nor worked on, in order of time, the newest `MOST_HOLDS`. */
export function quietHolds(period: ComparedPeriod): ComparedHold[] {
  return period.holds
    .filter(
      (hold) => hold.ending !== 'interrupted' && hold.setAside !== true && hold.endedAt > hold.startedAt,
    )
    .sort((a, b) => a.startedAt - b.startedAt)
    .slice(-MOST_HOLDS)
}

/**
 * How long each hold lasts, or would have: seen to its end by leak (without a vacuum channel: not ended by a
 * run that a flush started); else by its own leak rate, where that is known
 * well, over the differential; else cut short at what was seen, or at what the upper end of its leak rate
 * allows if that is longer.
 */
export function holdTimes(period: ComparedPeriod): Survival[] {
  const flushRuns = new Set(period.runs.filter((run) => run.trigger === 'flush').map((run) => run.startedAt))
  return quietHolds(period).map((hold) => {
    const seconds = (hold.endedAt - hold.startedAt) / 1000
    const byLeak = hold.ending === 'leak' || (hold.ending === 'unknown' && !flushRuns.has(hold.endedAt))
    if (byLeak && (hold.flushes ?? 0) === 0) return { time: seconds, event: true }
    const { leakRate } = hold
    const differentialPa = period.differentialPa
    if (leakRate === null || differentialPa === null) return { time: seconds, event: false }
    const wellKnown = (leakRate.high - leakRate.low) / 2 <= TRUSTED * leakRate.paPerHour
    const byRate = (paPerHour: number) => (differentialPa / paPerHour) * 3600
    if (wellKnown) return { time: Math.max(seconds, byRate(leakRate.paPerHour)), event: true }
    return { time: Math.max(seconds, leakRate.high > 0 ? byRate(leakRate.high) : 0), event: false }
  })
}

/** Hold time of a period with its interval: the median, cut-short holds counted as such. */
export function holdTimeOf(times: readonly Survival[]) {
  return survivalMedian(kaplanMeier(times))
}

/** The figures of a period as the reader sees them. */
export function periodFigures(period: ComparedPeriod, pumpAmps: number | null): PeriodFigures {
  const days = (period.observedSeconds ?? (period.to - period.from) / 1000) / DAY_SECONDS
  const pumpSeconds = period.runs.reduce((sum, run) => sum + (run.stoppedAt - run.startedAt) / 1000, 0)
  const times = holdTimes(period)
  const perDay = (amount: number) => (days > 0 ? amount / days : null)
  return {
    holds: times.length,
    holdTimeSeconds: holdTimeOf(times).median,
    leakRatePaPerHour: leakRateOf(period),
    rechargePaPerSecond: rechargeOf(period),
    runsPerDay: perDay(period.runs.length),
    pumpSecondsPerDay: perDay(pumpSeconds),
    ampHoursPerDay: pumpAmps === null ? null : perDay((pumpSeconds * pumpAmps) / 3600),
  }
}

const rechargeOf = (period: ComparedPeriod) =>
  median(period.runs.flatMap((run) => run.rechargePaPerSecond ?? []))

/** Median of the holds' own rates; without any, differential over hold time. */
function leakRateOf(period: ComparedPeriod): number | null {
  const rates = quietHolds(period).flatMap((hold) => hold.leakRate?.paPerHour ?? [])
  const ofHolds = median(rates)
  if (ofHolds !== null) return ofHolds
  const holdSeconds = holdTimeOf(holdTimes(period)).median
  if (holdSeconds === null || period.differentialPa === null) return null
  return (period.differentialPa / holdSeconds) * 3600
}

/** r, R, D and K of a period. */
export function signsOf(period: ComparedPeriod): Signs {
  const perHour = leakRateOf(period)
  const rate = perHour === null ? null : perHour / 3600
  const recharge = rechargeOf(period)
  const known = rate !== null && recharge !== null && rate + recharge > 0
  return {
    ratePaPerSecond: rate,
    rechargePaPerSecond: recharge,
    differentialPa: period.differentialPa,
    ratio: known ? rate / (recharge + rate) : null,
  }
}
