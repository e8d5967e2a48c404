import { normalTwoSided, normalUpperTail } from './distributions'
import { finite, hasTies, midranks, sumOverTies } from './finite'

export type MannWhitney = {
  /** Pairs in which the first is larger, ties counting half (R's W). */
  u: number
  pValue: number
  /** One-sided: the first tends to be larger. */
  pGreater: number
  method: 'exact' | 'normal'
}

/** Groups up to this size without ties are judged exactly, as R does. */
const EXACT_UP_TO = 49

/**
 * Mann–Whitney test of whether values of one group tend to be larger. Exact without ties in groups under
 * 50, else normal with tie and continuity correction (R's `wilcox.test`). An empty group: null; all values
 * alike: p = 1. NaN left out.
 */
export function mannWhitney(first: readonly number[], second: readonly number[]): MannWhitney | null {
  const a = finite(first)
  const b = finite(second)
  if (a.length === 0 || b.length === 0) return null
  const pool = [...a, ...b]
  const rankSum = midranks(pool)
    .slice(0, a.length)
    .reduce((sum, rank) => sum + rank, 0)
  const u = rankSum - (a.length * (a.length + 1)) / 2
  const sorted = pool.sort((left, right) => left - right)
  if (!hasTies(sorted) && a.length <= EXACT_UP_TO && b.length <= EXACT_UP_TO) {
    const greater = mannWhitneyUpperTail(a.length, b.length, u)
    const less = mannWhitneyUpperTail(a.length, b.length, a.length * b.length - u)
    return { u, pValue: Math.min(1, 2 * Math.min(greater, less)), pGreater: greater, method: 'exact' }
  }
  const sigma = Math.sqrt(mannWhitneyVariance(sorted, a.length))
  if (sigma === 0) return { u, pValue: 1, pGreater: 0.5, method: 'normal' }
  const off = u - (a.length * b.length) / 2
  return {
    u,
    pValue: off === 0 ? 1 : normalTwoSided((off - Math.sign(off) * 0.5) / sigma),
    pGreater: normalUpperTail((off - 0.5) / sigma),
    method: 'normal',
  }
}

/** Variance of U with ties; `sorted` is both groups together. */
export function mannWhitneyVariance(sorted: readonly number[], firstCount: number): number {
  const n = sorted.length
  if (n < 2) return 0
  const ties = sumOverTies(sorted, (t) => t * t * t - t)
  return ((firstCount * (n - firstCount)) / 12) * (n + 1 - ties / (n * (n - 1)))
}

/** P(U ≥ u) without ties, from the counts of the Gaussian binomial coefficient. */
export function mannWhitneyUpperTail(firstCount: number, secondCount: number, u: number): number {
  const shares = mannWhitneyShares(firstCount, secondCount)
  return shares.reduce((sum, share, value) => (value >= u - 1e-9 ? sum + share : sum), 0)
}

/** Probability of each value of U, 0 to n·m, under no difference. */
export function mannWhitneyShares(firstCount: number, secondCount: number): number[] {
  const top = firstCount * secondCount
  let ways = new Array<number>(top + 1).fill(0)
  ways[0] = 1
  for (let i = 1; i <= firstCount; i += 1) {
    // Times (1 − q^(m+i)), then divided by (1 − q^i), scaled so that the sum stays 1.
    const times = ways.map(
      (value, power) => value - (power >= secondCount + i ? (ways[power - secondCount - i] ?? 0) : 0),
    )
    const divided = times.slice()
    for (let power = i; power <= top; power += 1)
      divided[power] = (divided[power] ?? 0) + (divided[power - i] ?? 0)
    ways = divided.map((value) => (value * i) / (secondCount + i))
  }
  return ways
}
