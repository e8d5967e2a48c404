import { findContradictions } from './contradictions'
import { chooseNextTest, inseparableGroups } from './next-test'
import { partPriors } from './prior'
import { readTests } from './readings'
import { leakShares } from './shares'
import { singleLeakSuspects } from './suspects'
import { listTestPoints, possibleTests } from './test-points'
import type { IsolationInput, IsolationResult } from './types'

/**
 * What gauge tests say about where the air comes in: the share of every part (non-negative least squares),
 * the chance of each to be the one leak, parts that cannot be told apart, tests that contradict one
 * another, and what to test next. Shares and chances are two things: the first add up to the flow, the
 * second to one.
 * No tests: chances are the prior, shares empty, next the whole boat.
 * Throws a RangeError for two parts of one key, a test of unknown parts or of parts without volume, or one
 * that takes no time.
 */
export function isolate(input: IsolationInput): IsolationResult {
  const { parts, tests } = input
  const keys = parts.map((part) => part.key)
  if (new Set(keys).size !== keys.length) throw new RangeError('two parts of one key')
  const priors = partPriors(parts, input.priorFactors)
  const readings = readTests(parts, tests)
  const possible = input.possible ?? possibleTests(listTestPoints(parts))
  const suspects = singleLeakSuspects(readings, priors)
  const shares = leakShares(readings, priors)
  const contradictions = findContradictions(readings, priors)
  const groups = inseparableGroups({ parts, readings, possible })
  const repeatable = new Set(
    readings.filter((_, index) => contradictions.some(({ repeat }) => repeat === index)),
  )
  return {
    shares: keys.flatMap((key) => shares.filter((share) => share.key === key)),
    suspects,
    inseparable: groups.filter((group) => group.length > 1),
    contradictions,
    next: chooseNextTest({
      parts,
      readings,
      possible,
      suspects,
      shares,
      repeatable,
      gaugeResolutionPa: input.gaugeResolutionPa,
    }),
  }
}
