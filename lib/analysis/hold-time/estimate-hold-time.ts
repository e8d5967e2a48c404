import { holdTimeFromLegs } from './from-legs'
import { holdTimeFromLengths } from './from-lengths'
import { holdTimeFromShortHolds } from './from-short-holds'
import type { HoldTimeEstimate, HoldTimeInput } from './types'

/**
 * How long the pump stays off when nobody flushes, by whichever method the record allows: the physical fit where
 * there are legs, whole holds where they are too short to have any, else the lengths of holds alone. On-demand
 * systems and a record that says nothing yet: null.
 */
export function estimateHoldTime(input: HoldTimeInput): HoldTimeEstimate | null {
  if (!input.standingVacuum) return null
  const fromLegs = holdTimeFromLegs(input)
  const fromShort = holdTimeFromShortHolds(input)
  if (fromShort === null) return fromLegs ?? holdTimeFromLengths(input)
  return legsAreOfShortHolds(fromLegs, fromShort) ? fromLegs : fromShort
}

/** Legs of before the holds became short would tell of another leak: only when both agree do legs tell more. */
function legsAreOfShortHolds(
  legs: HoldTimeEstimate | null,
  short: HoldTimeEstimate,
): legs is HoldTimeEstimate {
  if (legs === null || legs.bound !== null || legs.legs < 6) return false
  return Math.abs(Math.log(legs.seconds / short.seconds)) < 0.15
}
