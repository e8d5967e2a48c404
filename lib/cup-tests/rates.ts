import type { CupLeg, CupLegBins } from '@/db/queries/cup-tests'
import { legRate } from '@/lib/analysis/fold'
import type { Span } from './spans'

/** Leak rate with its standard error, Pa/h. */
export interface CupRate {
  paPerHour: number
  sigma: number
}

/** Half widths of 95 % intervals to standard errors; below 1 Pa/h no sensor says anything. */
const toRate = (rate: { paPerHour: number; low: number; high: number }): CupRate => ({
  paPerHour: rate.paPerHour,
  sigma: Math.max(1, (rate.high - rate.low) / 3.92),
})

/** The bins of a leg that lie wholly within a span. */
export function cutBins(bins: CupLegBins, startedAt: number, [from, to]: Span): CupLegBins {
  const keep = bins.offsetSeconds.map((seconds) => {
    const middle = startedAt + seconds * 1000
    const half = bins.widthSeconds * 500
    return middle - half >= from && middle + half <= to
  })
  const cut = <Value>(values: readonly Value[]): Value[] => values.filter((_, index) => keep[index])
  return {
    widthSeconds: bins.widthSeconds,
    offsetSeconds: cut(bins.offsetSeconds),
    count: cut(bins.count),
    vacuumPa: cut(bins.vacuumPa),
    airC: cut(bins.airC),
    laggedAirC: [cut(bins.laggedAirC[0]), cut(bins.laggedAirC[1])],
    barometerPa: cut(bins.barometerPa),
  }
}

/** Rates of the legs within a span; a leg that reaches over an edge is cut there and measured anew. */
export function ratesWithin(legs: readonly CupLeg[], span: Span): CupRate[] {
  return legs.flatMap((leg) => {
    if (leg.endedAt <= span[0] || leg.startedAt >= span[1]) return []
    const inside = leg.startedAt >= span[0] && leg.endedAt <= span[1]
    const rate = inside
      ? leg.rate
      : leg.bins === null
        ? null
        : legRate(cutBins(leg.bins, leg.startedAt, span))
    return rate === null ? [] : [toRate(rate)]
  })
}

/**
 * One rate of several, each weighed by its standard error, Pa/h. Where they differ among themselves by more than
 * their errors allow, the error grows by the root of the reduced chi-square (Birge's ratio; common practice).
 * @returns null without any
 * @example pooled([{ paPerHour: 100, sigma: 10 }, { paPerHour: 100, sigma: 10 }]) // sigma 7.07
 */
export function pooled(rates: readonly CupRate[]): CupRate | null {
  if (rates.length === 0) return null
  const weights = rates.map((rate) => 1 / rate.sigma ** 2)
  const total = weights.reduce((sum, weight) => sum + weight, 0)
  const mean = rates.reduce((sum, rate, i) => sum + (weights[i] ?? 0) * rate.paPerHour, 0) / total
  const chiSquare = rates.reduce((sum, rate, i) => sum + (weights[i] ?? 0) * (rate.paPerHour - mean) ** 2, 0)
  const birge = rates.length > 1 ? Math.max(1, chiSquare / (rates.length - 1)) : 1
  return { paPerHour: mean, sigma: Math.sqrt(birge / total) }
}
