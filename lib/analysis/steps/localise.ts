import { type Split, splitAt } from './best-split'
import type { WeighedLeg } from './leg-noise'

/**
 * How much of a leg may be of the other level without its rate showing it. A median of slopes stays wholly
 * with one side until the other has 1 − √½ of the time, and moves little until two fifths.
 */
const UNSEEN = 0.42
/** A leg whose rate shows the change had it near its middle: from 0.3 to 0.7, give or take. */
const MIXED_SPAN = 0.4
const REACH = 0.2
/** Fall of the likelihood ratio within which another hold could as well be the one (95 %). */
const AS_WELL = 3.84

/**
 * Between which instants the level changed, epoch milliseconds: over all splits that explain the legs about
 * as well as the best one. A leg beside the split whose rate is neither the old nor the new level holds the
 * change within it; otherwise it lies between the last old leg and the first new one, or as far into either
 * as would not show.
 */
export function localise(legs: readonly WeighedLeg[], best: Split): [number, number] {
  const spans = splitsAsGood(legs, best).map((split) => spanOf(legs, split))
  return [Math.min(...spans.map(([from]) => from)), Math.max(...spans.map(([, to]) => to))]
}

function splitsAsGood(legs: readonly WeighedLeg[], best: Split): Split[] {
  const good = [best]
  for (const direction of [-1, 1]) {
    for (let at = best.at + direction; at > 1 && at < legs.length - 1; at += direction) {
      const split = splitAt(legs, at)
      if (leftOver(split) > leftOver(best) + AS_WELL) break
      good.push(split)
    }
  }
  return good
}

const leftOver = ({ before, after }: Split) => before.chiSquared + after.chiSquared

function spanOf(legs: readonly WeighedLeg[], split: Split): [number, number] {
  const last = legs[split.at - 1]
  const first = legs[split.at]
  if (last === undefined || first === undefined) return [NaN, NaN]
  const mixed = [last, first]
    .filter((leg) => isMixed(leg, split))
    .sort((a, b) => middleness(b, split) - middleness(a, split))[0]
  if (mixed !== undefined) {
    const length = mixed.endedAt - mixed.startedAt
    const share = 0.5 + MIXED_SPAN * (newShare(mixed, split) - 0.5)
    const middle = mixed.endedAt - share * length
    return [
      Math.max(mixed.startedAt, middle - REACH * length),
      Math.min(mixed.endedAt, middle + REACH * length),
    ]
  }
  return [
    last.endedAt - UNSEEN * (last.endedAt - last.startedAt),
    first.startedAt + UNSEEN * (first.endedAt - first.startedAt),
  ]
}

const newShare = (leg: WeighedLeg, { before, after }: Split) =>
  Math.min(1, Math.max(0, (leg.paPerHour - before.value) / (after.value - before.value)))

const middleness = (leg: WeighedLeg, split: Split) => -Math.abs(newShare(leg, split) - 0.5)

function isMixed(leg: WeighedLeg, split: Split): boolean {
  const share = newShare(leg, split)
  const sigma = 1 / Math.sqrt(leg.weight) / Math.abs(split.after.value - split.before.value)
  return share > Math.max(0.15, 3 * sigma) && share < 1 - Math.max(0.15, 3 * sigma)
}
