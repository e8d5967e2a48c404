import { normalCdf } from '../statistics'
import type { FlushEvent } from './habit'

/** Lognormal spread of how far one flush draws the vacuum down. */
export interface DropSpread {
  /** Of the drop in Pa. */
  logMean: number
  logSigma: number
}

const ROUNDS = 12
const LEAST_SIGMA = 0.08
const FEWEST = 3

/**
 * How far a flush draws the vacuum down, from the last ones: those that did not start the pump were measured
 * whole, those that did are at least what was seen (sparse samples miss the bottom). Maximum likelihood for
 * right-censored lognormal values by expectation and maximisation. Under three drops: null, and every flush is
 * taken to start the pump.
 */
export function dropSpread(events: readonly FlushEvent[]): DropSpread | null {
  const known = events.flatMap(({ dropPa, startedPump }) =>
    dropPa !== null && dropPa > 0 ? [{ log: Math.log(dropPa), atLeast: startedPump }] : [],
  )
  if (known.length < FEWEST) return null
  const count = known.length
  let mean = known.reduce((sum, each) => sum + each.log, 0) / count
  let sigma = Math.max(0.15, Math.sqrt(known.reduce((sum, each) => sum + (each.log - mean) ** 2, 0) / count))
  for (let round = 0; round < ROUNDS; round += 1) {
    let first = 0
    let second = 0
    for (const { log, atLeast } of known) {
      const expected = atLeast ? beyond(log, mean, sigma) : { mean: log, square: log * log }
      first += expected.mean
      second += expected.square
    }
    mean = first / count
    sigma = Math.max(LEAST_SIGMA, Math.sqrt(Math.max(0, second / count - mean * mean)))
  }
  return { logMean: mean, logSigma: sigma }
}

/** Mean and mean square of a normal value known to be at least `from`. */
function beyond(from: number, mean: number, sigma: number): { mean: number; square: number } {
  const z = (from - mean) / sigma
  const tail = Math.max(1e-9, 1 - normalCdf(z))
  const ratio = z > 5 ? z : (Math.exp(-0.5 * z * z) * 0.3989422804014327) / tail
  const expected = mean + sigma * ratio
  return { mean: expected, square: mean * mean + sigma * sigma + sigma * (from + mean) * ratio }
}
