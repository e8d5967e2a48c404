import { chiSquaredUpper } from '@/lib/analysis/statistics'
import type { Reading } from './readings'
import { misfit } from './shares'
import type { Contradiction } from './types'

/** Tests that would differ as much by chance once in ten thousand cannot all be right. */
const CONTRADICTORY = 1e-4
const MOST_TOGETHER = 3
/** Pairs are looked at up to so many tests, and triples: beyond, only all together. */
const MOST_TESTS: Readonly<Record<number, number>> = { 2: 48, 3: 16 }

/**
 * Tests that no set of leaks explains together, in the smallest sets that show it, and of each set the one
 * to repeat: the one without which all tests fit best, of equals the one that says least.
 */
export function findContradictions(
  readings: readonly Reading[],
  priors: ReadonlyMap<string, number>,
): Contradiction[] {
  const together = misfit(readings, priors)
  const isContradiction = (chiSquared: number, count: number) =>
    count > 1 && chiSquaredUpper(chiSquared, count - 1) < CONTRADICTORY
  // Some of the tests never fit worse than all: nothing to look for where all fit well enough for two.
  if (!isContradiction(together, 2)) return []
  const found: number[][] = []
  for (let size = 2; size <= Math.min(MOST_TOGETHER, readings.length); size += 1) {
    if (readings.length > (MOST_TESTS[size] ?? 0)) continue
    for (const set of subsets(readings.length, size)) {
      if (found.some((known) => known.every((index) => set.includes(index)))) continue
      if (isContradiction(misfit(pick(readings, set), priors), size)) found.push(set)
    }
  }
  const isAll = found.length === 0 && isContradiction(together, readings.length)
  const sets = isAll ? [readings.map((_, index) => index)] : found
  return sets.map((tests) => ({ tests, repeat: worstOf(tests, readings, priors) }))
}

const pick = (readings: readonly Reading[], indexes: readonly number[]) =>
  readings.filter((_, index) => indexes.includes(index))

function worstOf(
  tests: readonly number[],
  readings: readonly Reading[],
  priors: ReadonlyMap<string, number>,
): number {
  const scored = tests.map((index) => {
    const reading = readings[index]
    const without = misfit(
      readings.filter((_, other) => other !== index),
      priors,
    )
    return { index, without, precision: reading === undefined ? 0 : Math.abs(reading.flow) / reading.sigma }
  })
  scored.sort((a, b) =>
    Math.abs(a.without - b.without) < 1 ? a.precision - b.precision : a.without - b.without,
  )
  return scored[0]?.index ?? 0
}

function subsets(count: number, size: number, from = 0): number[][] {
  if (size === 0) return [[]]
  const found: number[][] = []
  for (let first = from; first <= count - size; first += 1) {
    for (const rest of subsets(count, size - 1, first + 1)) found.push([first, ...rest])
  }
  return found
}
