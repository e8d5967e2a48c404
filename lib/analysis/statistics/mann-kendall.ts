import { normalTwoSided } from './distributions'
import { hasTies, sortedFinite, sumOverTies } from './finite'
import type { Point } from './theil-sen'

export type MannKendall = {
  count: number
  s: number
  variance: number
  z: number
  /** Two-sided. */
  pValue: number
  method: 'exact' | 'normal'
}

/**
 * Mann–Kendall test for a monotonic trend of y over x: S = Σ sign(y_j − y_i), variance corrected for ties
 * in either, continuity-corrected normal p (Gilbert 1987, ch. 16); exact, from the distribution of
 * inversions, when there are no ties and at most `exactUpTo` points. Fewer than 3 points, or all alike:
 * null. Points with NaN are left out.
 */
export function mannKendall(points: readonly Point[], { exactUpTo = 10 } = {}): MannKendall | null {
  const known = points
    .filter((point) => Number.isFinite(point.x) && Number.isFinite(point.y))
    .sort((a, b) => a.x - b.x)
  const count = known.length
  if (count < 3) return null
  const s = kendallS(known)
  const xs = sortedFinite(known.map((point) => point.x))
  const ys = sortedFinite(known.map((point) => point.y))
  const variance = kendallVariance(xs, ys)
  if (!(variance > 0)) return null
  const z = s === 0 ? 0 : (s - Math.sign(s)) / Math.sqrt(variance)
  const exact = count <= exactUpTo && !hasTies(xs) && !hasTies(ys)
  const pValue = exact ? Math.min(1, 2 * kendallUpperTail(count, Math.abs(s))) : normalTwoSided(z)
  return { count, s, variance, z, pValue, method: exact ? 'exact' : 'normal' }
}

function kendallS(known: readonly Point[]): number {
  let s = 0
  known.forEach((later, j) => {
    for (const earlier of known.slice(0, j)) s += Math.sign((later.y - earlier.y) * (later.x - earlier.x))
  })
  return s
}

/** Variance of S with ties in both rankings (Kendall 1970, Rank Correlation Methods, ch. 4). */
export function kendallVariance(sortedX: readonly number[], sortedY: readonly number[]): number {
  const n = sortedX.length
  const spread = (t: number) => t * (t - 1) * (2 * t + 5)
  const pairs = (t: number) => t * (t - 1)
  const triples = (t: number) => t * (t - 1) * (t - 2)
  const ties = (f: (size: number) => number): [number, number] => [
    sumOverTies(sortedX, f),
    sumOverTies(sortedY, f),
  ]
  const [spreadX, spreadY] = ties(spread)
  const [pairsX, pairsY] = ties(pairs)
  const [triplesX, triplesY] = ties(triples)
  const main = (spread(n) - spreadX - spreadY) / 18
  const second = n > 2 ? (triplesX * triplesY) / (9 * n * (n - 1) * (n - 2)) : 0
  return main + second + (pairsX * pairsY) / (2 * n * (n - 1))
}

/**
 * P(S ≥ s) among all orders of n different values, exactly, from the numbers of permutations with each
 * count of inversions (Gilbert 1987, table A18).
 * @example kendallUpperTail(5, 6) // 0.11666...
 */
export function kendallUpperTail(n: number, s: number): number {
  let ways = [1]
  for (let size = 2; size <= n; size += 1) {
    const next = new Array<number>(ways.length + size - 1).fill(0)
    ways.forEach((value, inversions) => {
      for (let added = 0; added < size; added += 1) {
        next[inversions + added] = (next[inversions + added] ?? 0) + value / size
      }
    })
    ways = next
  }
  const pairs = (n * (n - 1)) / 2
  return ways.reduce((sum, share, inversions) => (pairs - 2 * inversions >= s ? sum + share : sum), 0)
}
