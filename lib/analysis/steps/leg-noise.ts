import { median, medianAbsoluteDeviation } from '@/lib/analysis/statistics'

/** A leg's rate with its standard error; times epoch milliseconds. */
export type LegRate = { startedAt: number; endedAt: number; paPerHour: number; sigmaPaPerHour: number }

/** A leg ready to be compared: outliers drawn in, weighed by all that scatters it. */
export type WeighedLeg = LegRate & { value: number; weight: number }

const NEIGHBOURS = 4
const LEAST_SCATTER = 0.02
/** An outlier counts as being at most this many standard errors from its neighbours. */
const DRAWN_IN = 4

/**
 * Weighs legs by their own error and by what scatters them besides (weather, warmth, use), learned from the
 * differences of neighbours so that a step does not count as scatter. Takes legs in order of time.
 */
export function weighLegs(legs: readonly LegRate[]): WeighedLeg[] {
  const levels = legs.map((_, index) => localLevel(legs, index))
  const scatter = relativeScatter(legs, levels)
  return legs.map((leg, index) => {
    const level = levels[index] ?? leg.paPerHour
    const sigma = Math.hypot(leg.sigmaPaPerHour, scatter * level) || Number.MIN_VALUE
    const reach = DRAWN_IN * sigma
    const value = Math.min(level + reach, Math.max(level - reach, leg.paPerHour))
    return { ...leg, value, weight: 1 / (sigma * sigma) }
  })
}

/** Middle of a leg's neighbours on the side that it resembles more: sharp at a step. */
function localLevel(legs: readonly LegRate[], index: number): number {
  const rates = (from: number, to: number) => legs.slice(Math.max(0, from), to).map((leg) => leg.paPerHour)
  const own = legs[index]?.paPerHour ?? 0
  const before = rates(index - NEIGHBOURS, index + 1)
  const after = rates(index, index + NEIGHBOURS + 1)
  const sides = [before, after].filter((side) => side.length > 1).map((side) => median(side) ?? own)
  // The last leg, or the first, has a side of its own only with its one neighbour.
  if (after.length < 2) sides.push(median(rates(index - 1, index + 1)) ?? own)
  if (before.length < 2) sides.push(median(rates(index, index + 2)) ?? own)
  const nearest = sides.sort((a, b) => Math.abs(a - own) - Math.abs(b - own))[0]
  return Math.abs(nearest ?? own)
}

/** Scatter of legs beyond their own errors, as a share of the level. */
function relativeScatter(legs: readonly LegRate[], levels: readonly number[]): number {
  const differences = legs.slice(1).map((leg, index) => {
    const level = levels[index + 1] ?? NaN
    return (leg.paPerHour - (legs[index]?.paPerHour ?? NaN)) / (Math.SQRT2 * level)
  })
  const total = medianAbsoluteDeviation(differences) ?? 0
  const own = median(legs.map((leg, index) => leg.sigmaPaPerHour / (levels[index] ?? NaN))) ?? 0
  return Math.max(LEAST_SCATTER, Math.sqrt(Math.max(0, total * total - own * own)))
}
