import { SECONDS_PER_HOUR } from '@/shared/units'
import type { HoldLimits } from './limits'

export type LeakDownVerdict = 'tight' | 'weeping' | 'leaking' | 'short-cycling' | 'cannot-tell'
export type RateInterval = { paPerHour: number; low: number; high: number }

/** Once the interval is this narrow against a boundary, the reading itself decides. */
const NEAR_ENOUGH = 0.1

type Band = { verdict: Exclude<LeakDownVerdict, 'cannot-tell'>; from: number; to: number }

function bandsOf(differentialPa: number, limits: HoldLimits): Band[] {
  const rateAt = (holdSeconds: number) => (differentialPa / holdSeconds) * SECONDS_PER_HOUR
  const [aim, limit, short] = [limits.aimSeconds, limits.limitSeconds, limits.shortCyclingSeconds].map(rateAt)
  return [
    { verdict: 'tight', from: -Infinity, to: aim ?? 0 },
    { verdict: 'weeping', from: aim ?? 0, to: limit ?? 0 },
    { verdict: 'leaking', from: limit ?? 0, to: short ?? 0 },
    { verdict: 'short-cycling', from: short ?? 0, to: Infinity },
  ]
}

/**
 * What a leak-down test shows, or how many more minutes would show it. Decided when the whole interval lies
 * in one band of hold time, or is within a tenth of the boundaries that it crosses. A vacuum that rises by
 * more than a tight boat loses is weather or temperature: `cannot-tell`, and waiting does not help
 * (`moreMinutes` null).
 */
export function judgeRate(
  rate: RateInterval,
  seconds: number,
  differentialPa: number,
  limits: HoldLimits,
): { verdict: LeakDownVerdict; moreMinutes: number | null } {
  const bands = bandsOf(differentialPa, limits)
  const tightest = bands[0]
  if (tightest !== undefined && rate.high < -tightest.to) return { verdict: 'cannot-tell', moreMinutes: null }
  const band = bands.find((candidate) => rate.paPerHour <= candidate.to)
  if (band === undefined) return { verdict: 'cannot-tell', moreMinutes: null }
  const factor = Math.max(
    lengthening(rate.paPerHour - rate.low, rate.paPerHour - band.from, band.from),
    lengthening(rate.high - rate.paPerHour, band.to - rate.paPerHour, band.to),
  )
  if (factor <= 1) return { verdict: band.verdict, moreMinutes: null }
  return { verdict: 'cannot-tell', moreMinutes: Math.max(1, Math.ceil(((factor - 1) * seconds) / 60)) }
}

/** By how much longer a test must be so that its reach, which falls with time, no longer crosses a boundary. */
function lengthening(reach: number, distance: number, boundary: number): number {
  if (!Number.isFinite(boundary)) return 0
  return reach / Math.max(distance, NEAR_ENOUGH * boundary)
}
