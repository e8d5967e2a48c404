import { finite } from './finite'
import { seededRandom, shuffled } from './random'

export type PermutationResult = { observed: number; pValue: number; permutations: number }

/**
 * Two-sided permutation test of a statistic of two groups: how often relabelling gives one at least as far
 * from nought, counting the labels as they are ((hits + 1)/(n + 1), Phipson & Smyth 2010), so that p is
 * never 0. The same seed gives the same answer. An empty group: null. NaN left out; ties need nothing.
 * @param statistic of the two groups, nought when they are alike; both lists are its own to keep
 */
export function permutationTest(
  first: readonly number[],
  second: readonly number[],
  statistic: (first: number[], second: number[]) => number,
  { permutations = 1999, seed = 1 } = {},
): PermutationResult | null {
  const a = finite(first)
  const b = finite(second)
  if (a.length === 0 || b.length === 0) return null
  const observed = statistic(a.slice(), b.slice())
  const pool = [...a, ...b]
  const random = seededRandom(seed)
  const reach = Math.abs(observed) * (1 - 1e-12)
  let hits = 0
  for (let round = 0; round < permutations; round += 1) {
    const mixed = shuffled(pool, random)
    if (Math.abs(statistic(mixed.slice(0, a.length), mixed.slice(a.length))) >= reach) hits += 1
  }
  return { observed, pValue: (hits + 1) / (permutations + 1), permutations }
}
