import { quantileSorted } from 'simple-statistics'
import { zOfConfidence } from './distributions'
import { finite, hasTies } from './finite'
import { mannWhitneyShares, mannWhitneyVariance } from './mann-whitney'

export type Shift = { value: number; low: number | null; high: number | null }

const EXACT_UP_TO = 49

/**
 * Hodges–Lehmann shift of the first group over the second: the median of all differences (not the
 * root-finder's value that R prints with ties). The interval inverts the Mann–Whitney test by order
 * statistics of the differences: exact ranks without ties in groups under 50, else normal ranks with the
 * tie correction, rounded outwards. Ends are null where the groups are too small for the confidence.
 * An empty group: null. NaN left out.
 */
export function hodgesLehmann(
  first: readonly number[],
  second: readonly number[],
  confidence = 0.95,
): Shift | null {
  const a = finite(first)
  const b = finite(second)
  if (a.length === 0 || b.length === 0) return null
  const differences = a.flatMap((x) => b.map((y) => x - y)).sort((left, right) => left - right)
  const rank = lowRank(a, b, confidence)
  return {
    value: quantileSorted(differences, 0.5),
    low: rank < 1 ? null : (differences[rank - 1] ?? null),
    high: rank < 1 ? null : (differences[differences.length - rank] ?? null),
  }
}

/**
 * Ratio of the first group to the second, by the shift of the logarithms. Values that are not positive
 * are left out.
 */
export function hodgesLehmannRatio(
  first: readonly number[],
  second: readonly number[],
  confidence = 0.95,
): Shift | null {
  const logs = (values: readonly number[]) => values.filter((value) => value > 0).map(Math.log)
  const shift = hodgesLehmann(logs(first), logs(second), confidence)
  if (shift === null) return null
  const exp = (value: number | null) => (value === null ? null : Math.exp(value))
  return { value: Math.exp(shift.value), low: exp(shift.low), high: exp(shift.high) }
}

/** Rank from 1 of the difference at the interval's lower end; under 1 where there is none. */
function lowRank(a: readonly number[], b: readonly number[], confidence: number): number {
  const sorted = [...a, ...b].sort((left, right) => left - right)
  const tail = (1 - confidence) / 2
  if (!hasTies(sorted) && a.length <= EXACT_UP_TO && b.length <= EXACT_UP_TO) {
    let below = 0
    const first = mannWhitneyShares(a.length, b.length).findIndex((share) => {
      below += share
      return below > tail
    })
    return first
  }
  const sigma = Math.sqrt(mannWhitneyVariance(sorted, a.length))
  return Math.floor((a.length * b.length) / 2 - zOfConfidence(confidence) * sigma)
}
