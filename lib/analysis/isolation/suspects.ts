import { normalCdf } from '@/lib/analysis/statistics'
import { groupBySets } from './groups'
import type { Reading } from './readings'
import { flowScale } from './shares'
import type { Suspect } from './types'

/** What the sound parts of a leaking boat let in, against the leak itself (judged). */
const BACKGROUND = 0.04
/** Chance that a test was spoilt: a plug that leaks, a switch that started the pump (judged). */
const SPOILT = 0.005
/** Flows tried, relative to the largest read: steps of 2 %. */
const GRID_STEP = 0.02
const GRID_FROM = 0.02
const GRID_TO = 3
const GRID_TO_BEYOND_BOUNDS = 100

/**
 * Chance of each part to be *the* leak, if there is one only: prior times the likelihood of all readings,
 * over every size that the leak could have. The likeliest first. No tests: the prior.
 */
export function singleLeakSuspects(
  readings: readonly Reading[],
  priors: ReadonlyMap<string, number>,
): Suspect[] {
  const groups = groupBySets(
    [...priors.keys()],
    readings.map((reading) => reading.keys),
  )
  const logs = groups.map((group) => logLikelihood(group[0] ?? '', readings))
  const top = Math.max(...logs)
  const weights = groups.flatMap((group, index) =>
    group.map((key) => ({
      key,
      weight: (priors.get(key) ?? 0) * Math.exp((logs[index] ?? -Infinity) - top),
    })),
  )
  const total = weights.reduce((sum, item) => sum + item.weight, 0)
  return weights
    .map(({ key, weight }) => ({ key, probability: weight / total }))
    .sort((a, b) => b.probability - a.probability)
}

/** Logarithm of the likelihood that the one leak is in `key`, its size free (log-uniform). */
function logLikelihood(key: string, readings: readonly Reading[]): number {
  if (readings.length === 0) return 0
  const scale = flowScale(readings)
  const to = readings.some((reading) => reading.isBound) ? GRID_TO_BEYOND_BOUNDS : GRID_TO
  const logs: number[] = []
  for (let size = GRID_FROM; size <= to; size *= 1 + GRID_STEP) {
    logs.push(
      readings.reduce(
        (sum, reading) => sum + logOfReading(reading, size * scale, reading.keys.has(key), scale),
        0,
      ),
    )
  }
  const top = Math.max(...logs)
  return top + Math.log(logs.reduce((sum, log) => sum + Math.exp(log - top), 0) / logs.length)
}

function logOfReading(reading: Reading, leak: number, isIn: boolean, scale: number): number {
  const expected = isIn ? leak : 0
  const sigma = Math.hypot(reading.sigma, BACKGROUND * leak)
  const off = (reading.flow - expected) / sigma
  if (reading.isBound) return Math.log((1 - SPOILT) * normalCdf(-off) + SPOILT / 2)
  const density = Math.exp(-0.5 * off * off) / (sigma * Math.sqrt(2 * Math.PI))
  return Math.log((1 - SPOILT) * density + SPOILT / (GRID_TO * scale))
}
