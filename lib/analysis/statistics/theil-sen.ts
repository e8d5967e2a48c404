import { quantileSorted } from 'simple-statistics'
import { zOfConfidence } from './distributions'
import { sortedFinite } from './finite'
import { kendallVariance } from './mann-kendall'

export type Point = { x: number; y: number }
export type TheilSen = {
  slope: number
  /** Ends of the interval; null where too few points reach that far. */
  low: number | null
  high: number | null
  /** Median y − slope × median x (Conover). */
  intercept: number
  count: number
}

/**
 * Theil–Sen slope: the median of the slopes of all pairs with different x. The interval is Gilbert's
 * (1987, 16.5) with **interpolated** ranks: with N' slopes and C = z·√var(S), the ((N' − C)/2)-th and
 * ((N' + C)/2 + 1)-th smallest (other programs round the ranks and differ a little). Ties in x make no
 * pair; fewer than two different x: null. Points with NaN are left out. Cost is the square of the count.
 */
export function theilSen(points: readonly Point[], confidence = 0.95): TheilSen | null {
  const known = points.filter((point) => Number.isFinite(point.x) && Number.isFinite(point.y))
  const slopes = pairSlopes(known)
  if (slopes.length === 0) return null
  const xs = sortedFinite(known.map((point) => point.x))
  const ys = sortedFinite(known.map((point) => point.y))
  const slope = quantileSorted(slopes, 0.5)
  const reach = zOfConfidence(confidence) * Math.sqrt(kendallVariance(xs, ys))
  return {
    slope,
    low: atRank(slopes, (slopes.length - reach) / 2),
    high: atRank(slopes, (slopes.length + reach) / 2 + 1),
    intercept: quantileSorted(ys, 0.5) - slope * quantileSorted(xs, 0.5),
    count: known.length,
  }
}

function pairSlopes(known: readonly Point[]): number[] {
  const slopes: number[] = []
  known.forEach((later, j) => {
    for (const earlier of known.slice(0, j)) {
      if (later.x !== earlier.x) slopes.push((later.y - earlier.y) / (later.x - earlier.x))
    }
  })
  return slopes.sort((a, b) => a - b)
}

/** Value at a rank from 1, linear between neighbours; null outside. */
function atRank(sorted: readonly number[], rank: number): number | null {
  const below = sorted[Math.floor(rank) - 1]
  const above = sorted[Math.ceil(rank) - 1]
  if (below === undefined || above === undefined) return null
  return below + (above - below) * (rank - Math.floor(rank))
}
