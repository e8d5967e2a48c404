import {
  minimiseNonNegative,
  nonNegativeLeastSquares,
  type QuadraticForm,
  quadraticForm,
} from '@/lib/analysis/statistics'
import { groupBySets } from './groups'
import { flowInterval } from './intervals'
import type { Reading } from './readings'
import type { Share } from './types'

/** The pull towards the prior where tests leave a choice: this many times the boat's flow. */
const PULL_SIGMA = 3

/** The largest flow that any reading shows: the scale of this boat's leak, Pa·m³/s. */
export function flowScale(readings: readonly Reading[]): number {
  return readings.reduce((most, reading) => Math.max(most, reading.flow, reading.sigma), 0)
}

/** The tests come first among the rows, the pull towards the prior after them. */
type System = { groups: string[][]; rows: number[][]; target: number[]; tests: number }

function buildSystem(readings: readonly Reading[], priors: ReadonlyMap<string, number>): System {
  const groups = groupBySets(
    [...priors.keys()],
    readings.map((reading) => reading.keys),
  )
  const scale = flowScale(readings)
  const bounds = readings.filter((reading) => reading.isBound)
  const rows = readings.map((reading) => [
    ...groups.map((group) => (reading.keys.has(group[0] ?? '') ? 1 / reading.sigma : 0)),
    // What a bound lets the flow be above it.
    ...bounds.map((bound) => (bound === reading ? -1 / reading.sigma : 0)),
  ])
  const target = readings.map((reading) => reading.flow / reading.sigma)
  const pull = 1 / (PULL_SIGMA * scale)
  groups.forEach((group, index) => {
    rows.push([...groups, ...bounds].map((_, other) => (other === index ? pull : 0)))
    target.push(pull * scale * priorOf(group, priors))
  })
  return { groups, rows, target, tests: readings.length }
}

const priorOf = (group: readonly string[], priors: ReadonlyMap<string, number>) =>
  group.reduce((sum, key) => sum + (priors.get(key) ?? 0), 0)

/** χ² of the tests alone. */
const formOfTests = (system: System): QuadraticForm =>
  quadraticForm(system.rows.slice(0, system.tests), system.target.slice(0, system.tests))

/** Misfit of the tests to any set of leaks at all: χ² of the best non-negative flows. */
export function misfit(readings: readonly Reading[], priors: ReadonlyMap<string, number>): number {
  return readings.length === 0 ? 0 : minimiseNonNegative(formOfTests(buildSystem(readings, priors))).value
}

/**
 * Leak flow of every part by non-negative least squares over the tests, with 95 % intervals by the rise of
 * χ². Parts that the tests made so far leave together share their flow by the prior, and each one's interval
 * goes from nought to all of it. No tests: an empty list.
 */
export function leakShares(
  readings: readonly Reading[],
  priors: ReadonlyMap<string, number>,
  { withIntervals = true } = {},
): Share[] {
  if (readings.length === 0) return []
  const system = buildSystem(readings, priors)
  const fit = nonNegativeLeastSquares(system.rows, system.target)
  const flows = system.groups.map((_, index) => fit.x[index] ?? 0)
  const total = flows.reduce((sum, flow) => sum + flow, 0)
  const form = formOfTests(system)
  const best = minimiseNonNegative(form)
  return system.groups.flatMap((group, index) => {
    const flow = flows[index] ?? 0
    const [low, high] = withIntervals
      ? flowInterval(form, best, index, flow, flowScale(readings))
      : [flow, flow]
    const prior = priorOf(group, priors)
    return group.map((key) => {
      const own = prior > 0 ? flow * ((priors.get(key) ?? 0) / prior) : flow / group.length
      const isAlone = group.length === 1
      return { key, flowPaM3PerS: own, low: isAlone ? low : 0, high, share: total > 0 ? own / total : 0 }
    })
  })
}
