import { holdTimeFromLegs } from './from-legs'
import { holdTimeFromLengths } from './from-lengths'
import { holdTimeFromShortHolds } from './from-short-holds'
import type { HoldTimeEstimate, HoldTimeInput } from './types'

/**
 * How long the pump stays off when nobody flushes, by whichever method the record allows: whole holds where
 * they are short, the physical fit where there are legs, else the lengths of holds alone. On-demand systems
 * and a record that says nothing yet: null.
 */
export function estimateHoldTime(input: HoldTimeInput): HoldTimeEstimate | null {
  if (!input.standingVacuum) return null
  return holdTimeFromShortHolds(input) ?? holdTimeFromLegs(input) ?? holdTimeFromLengths(input)
}
