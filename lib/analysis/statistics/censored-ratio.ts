import { normalTwoSided, zOfConfidence } from './distributions'
import type { Survival } from './kaplan-meier'
import type { Shift } from './hodges-lehmann'

export type CensoredRatio = Shift & {
  /** The value is a lower bound: too many of the first group were cut short. */
  isBound: boolean
  pValue: number
}

/**
 * Ratio of the first group's times to the second's when some are cut short: the factor at which Gehan's
 * generalisation of the Mann–Whitney count of pairs balances (the Hodges–Lehmann idea), with the interval
 * of factors that its permutation variance does not reject, and its p at a factor of one (E. A. Gehan 1965,
 * Biometrika 52, 203; normal approximation). Pairs whose order is not known, or that are equal, count
 * nought. An end is null where no factor is rejected. An empty group, or no pair whose order is ever known:
 * null. Times that are not positive are left out.
 */
export function censoredRatio(
  first: readonly Survival[],
  second: readonly Survival[],
  confidence = 0.95,
): CensoredRatio | null {
  const a = logTimes(first)
  const b = logTimes(second)
  if (a.length === 0 || b.length === 0) return null
  const times = [...a, ...b].map((item) => item.time)
  const reach = Math.max(...times) - Math.min(...times) + 1
  const at = (shift: number) => gehan(a, b, shift)
  const z = zOfConfidence(confidence)
  const staysOver = (target: number) => at(reach).z > target
  const startsUnder = (target: number) => at(-reach).z < target
  const isBound = at(reach).z >= 0
  if (isBound && startsUnder(Number.MIN_VALUE)) return null
  const from = whereFalls(reach, (shift) => at(shift).z > 0)
  // The count may rest at nought over a stretch: the middle of it, unless it never leaves.
  const to = isBound ? from : whereFalls(reach, (shift) => at(shift).z >= 0)
  return {
    value: Math.exp((from + to) / 2),
    low: startsUnder(z) ? null : Math.exp(whereFalls(reach, (shift) => at(shift).z > z)),
    high: staysOver(-z) ? null : Math.exp(whereFalls(reach, (shift) => at(shift).z > -z)),
    isBound,
    pValue: normalTwoSided(at(0).z),
  }
}

function logTimes(items: readonly Survival[]): Survival[] {
  return items
    .filter((item) => item.time > 0)
    .map((item) => ({ time: Math.log(item.time), event: item.event }))
}

/** Shift at which a condition that holds for small shifts ceases to. */
function whereFalls(reach: number, holds: (shift: number) => boolean): number {
  let holding = -reach
  let ceased = reach
  for (let step = 0; step < 40; step += 1) {
    const middle = (holding + ceased) / 2
    if (holds(middle)) holding = middle
    else ceased = middle
  }
  return (holding + ceased) / 2
}

/** Gehan's count of pairs with the first group's logarithms moved down by `shift`, over its standard error. */
function gehan(a: readonly Survival[], b: readonly Survival[], shift: number): { z: number } {
  const pool = [...a.map((item) => ({ time: item.time - shift, event: item.event })), ...b]
  const endings = pool
    .filter((item) => item.event)
    .map((item) => item.time)
    .sort((x, y) => x - y)
  const all = pool.map((item) => item.time).sort((x, y) => x - y)
  // How many are known to be shorter, less how many are known to be longer.
  const scores = pool.map(
    (item) => countUnder(endings, item.time) - (item.event ? all.length - countUpTo(all, item.time) : 0),
  )
  const count = scores.slice(0, a.length).reduce((sum, score) => sum + score, 0)
  const squares = scores.reduce((sum, score) => sum + score * score, 0)
  const n = pool.length
  const variance = n < 2 ? 0 : (a.length * b.length * squares) / (n * (n - 1))
  return { z: variance > 0 ? count / Math.sqrt(variance) : 0 }
}

/** How many of an ascending list are under a value, and how many not over it. */
const countUnder = (sorted: readonly number[], value: number) => partition(sorted, (item) => item < value)
const countUpTo = (sorted: readonly number[], value: number) => partition(sorted, (item) => item <= value)

function partition(sorted: readonly number[], isBelow: (item: number) => boolean): number {
  let low = 0
  let high = sorted.length
  while (low < high) {
    const middle = (low + high) >> 1
    const item = sorted[middle]
    if (item !== undefined && isBelow(item)) low = middle + 1
    else high = middle
  }
  return low
}
