import { lagOneAutocorrelation } from '@/lib/analysis/statistics'
import type { WeighedLeg } from './leg-noise'

export type Level = { value: number; weight: number; chiSquared: number }
/** `at` is the index of the first leg of the new level. */
export type Split = { at: number; before: Level; after: Level; z: number }

const FEWEST = 2
const STRONGEST_MEMORY = 0.8

/** Weighted mean of some legs and how they scatter about it. */
export function levelOf(legs: readonly WeighedLeg[]): Level {
  const weight = legs.reduce((sum, leg) => sum + leg.weight, 0)
  const value = legs.reduce((sum, leg) => sum + leg.weight * leg.value, 0) / weight
  return {
    value,
    weight,
    chiSquared: legs.reduce((sum, leg) => sum + leg.weight * (leg.value - value) ** 2, 0),
  }
}

/**
 * The split into two levels with the largest likelihood ratio, at least two legs on each side; z is the
 * difference of the levels over its standard error. Null for fewer than four legs.
 */
export function bestSplit(legs: readonly WeighedLeg[]): Split | null {
  let best = { at: 0, gain: -1 }
  const all = levelOf(legs)
  let weight = 0
  let sum = 0
  legs.forEach((leg, index) => {
    weight += leg.weight
    sum += leg.weight * leg.value
    const at = index + 1
    if (at < FEWEST || at > legs.length - FEWEST) return
    const rest = all.weight - weight
    const difference = (all.weight * all.value - sum) / rest - sum / weight
    const gain = difference ** 2 / (1 / weight + 1 / rest)
    if (gain > best.gain) best = { at, gain }
  })
  return best.at === 0 ? null : splitAt(legs, best.at)
}

/** A split at a given leg; z as if all legs were independent. */
export function splitAt(legs: readonly WeighedLeg[], at: number): Split {
  const before = levelOf(legs.slice(0, at))
  const after = levelOf(legs.slice(at))
  return {
    at,
    before,
    after,
    z: (after.value - before.value) / Math.sqrt(1 / before.weight + 1 / after.weight),
  }
}

/** The same split with z widened where legs resemble their neighbours: a warm afternoon is one thing, not five. */
export function widen(split: Split, legs: readonly WeighedLeg[]): Split {
  const rest = legs.map(
    (leg, index) =>
      (leg.value - (index < split.at ? split.before : split.after).value) * Math.sqrt(leg.weight),
  )
  const memory =
    legs.length < 6 ? 0 : Math.min(STRONGEST_MEMORY, Math.max(0, lagOneAutocorrelation(rest) ?? 0))
  return { ...split, z: split.z / Math.sqrt((1 + memory) / (1 - memory)) }
}

/** Scatter about a straight line in time: what a slow change would leave. */
export function lineChiSquared(legs: readonly WeighedLeg[]): number {
  const middle = (leg: WeighedLeg) => (leg.startedAt + leg.endedAt) / 2
  const weight = legs.reduce((sum, leg) => sum + leg.weight, 0)
  const meanOf = (value: (leg: WeighedLeg) => number) =>
    legs.reduce((sum, leg) => sum + leg.weight * value(leg), 0) / weight
  const meanAt = meanOf(middle)
  const meanValue = meanOf((leg) => leg.value)
  const spread = meanOf((leg) => (middle(leg) - meanAt) ** 2)
  const slope = spread > 0 ? meanOf((leg) => (middle(leg) - meanAt) * (leg.value - meanValue)) / spread : 0
  return legs.reduce(
    (sum, leg) => sum + leg.weight * (leg.value - meanValue - slope * (middle(leg) - meanAt)) ** 2,
    0,
  )
}
