import { nonNegativeLeastSquares } from '@/lib/analysis/statistics'
import { groupBySets } from './groups'
import type { Reading } from './readings'
import type { Share } from './types'

/** The pull towards the prior where tests leave a choice: this many times the boat's flow. */
const PULL_SIGMA = 3
/** Rise of χ² at the ends of a 95 % interval of one figure. */
const CHI_SQUARED_95 = 3.841458820694124
const BISECTIONS = 22

/** The largest flow that any reading shows: the scale of this boat's leak, Pa·m³/s. */
export function flowScale(readings: readonly Reading[]): number {
  return readings.reduce((most, reading) => Math.max(most, reading.flow, reading.sigma), 0)
}

/** Beyond so many times the largest flow read, a flow counts as unbounded. */
const UNBOUNDED = 1e3

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

const testsOnly = (system: System): System => ({
  ...system,
  rows: system.rows.slice(0, system.tests),
  target: system.target.slice(0, system.tests),
})

/** Misfit of the tests to any set of leaks at all: χ² of the best non-negative flows. */
export function misfit(readings: readonly Reading[], priors: ReadonlyMap<string, number>): number {
  if (readings.length === 0) return 0
  const system = testsOnly(buildSystem(readings, priors))
  return nonNegativeLeastSquares(system.rows, system.target).residualNorm ** 2
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
  const tests = testsOnly(system)
  const allowed = nonNegativeLeastSquares(tests.rows, tests.target).residualNorm ** 2 + CHI_SQUARED_95
  return system.groups.flatMap((group, index) => {
    const flow = flows[index] ?? 0
    const [low, high] = withIntervals
      ? intervalOf(tests, index, flow, allowed, flowScale(readings))
      : [flow, flow]
    return group.map((key) => {
      const part = (priors.get(key) ?? 0) / priorOf(group, priors)
      const own = group.length === 1 ? flow : flow * part
      return {
        key,
        flowPaM3PerS: own,
        low: group.length === 1 ? low : 0,
        high,
        share: total > 0 ? own / total : 0,
      }
    })
  })
}

/** χ² with one flow held, the others free. */
function heldMisfit(system: System, index: number, value: number): number {
  const rows = system.rows.map((row) => row.filter((_, column) => column !== index))
  const target = system.target.map((goal, row) => goal - (system.rows[row]?.[index] ?? 0) * value)
  return nonNegativeLeastSquares(rows, target).residualNorm ** 2
}

function intervalOf(
  tests: System,
  index: number,
  flow: number,
  allowed: number,
  scale: number,
): [number, number | null] {
  const fits = (value: number) => heldMisfit(tests, index, value) <= allowed
  const low = fits(0) ? 0 : edge(flow, 0, fits)
  let beyond = flow + scale
  while (fits(beyond)) {
    beyond = flow + 2 * (beyond - flow)
    if (beyond > UNBOUNDED * scale) return [low, null]
  }
  return [low, edge(flow, beyond, fits)]
}

/** Where a value stops fitting on the way from one that does to one that does not. */
function edge(fitting: number, failing: number, fits: (value: number) => boolean): number {
  let inside = fitting
  let outside = failing
  for (let step = 0; step < BISECTIONS; step += 1) {
    const middle = (inside + outside) / 2
    if (fits(middle)) inside = middle
    else outside = middle
  }
  return (inside + outside) / 2
}
