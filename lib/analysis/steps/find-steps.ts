import { bestSplit, levelOf, lineChiSquared, type Split, splitAt, widen } from './best-split'
import { type LegRate, weighLegs, type WeighedLeg } from './leg-noise'
import { localise } from './localise'

export type Step = {
  /** The change lies between these instants, epoch milliseconds. */
  between: [number, number]
  fromPaPerHour: number
  toPaPerHour: number
  /** The change over its standard error; over 5. */
  strength: number
}

const STRONG = 5
const LEAST_RATIO = 1.3
/** A step must explain the legs this much better than a slow change does. */
const BETTER_THAN_LINE = 4

/**
 * Sudden changes of the leak rate: a weighted likelihood-ratio split of the legs' rates (z over 5 and by a
 * factor of at least 1.3, better than a straight line), again on each side, each localised to the hold in
 * which it happened. Fewer than four legs, or none that stand out: an empty list. Legs with NaN or without
 * an error are left out; order does not matter.
 * @example findSteps(legs) // [{ between: [t1, t2], fromPaPerHour: 372, toPaPerHour: 1524, strength: 21 }]
 */
export function findSteps(legs: readonly LegRate[]): Step[] {
  const known = legs
    .filter((leg) => Number.isFinite(leg.paPerHour) && leg.sigmaPaPerHour > 0 && leg.endedAt > leg.startedAt)
    .sort((a, b) => a.startedAt - b.startedAt)
  const weighed = weighLegs(known)
  return describe(weighed, keepSteps(weighed, cutsIn(weighed, 0)))
}

/**
 * Indices at which a new level may begin, by recursion on each side of the best split: more than there are,
 * since a leak that came and went looks slow until both its ends are cut.
 */
function cutsIn(legs: readonly WeighedLeg[], offset: number): number[] {
  const split = bestSplit(legs)
  if (split === null || Math.abs(split.z) <= STRONG) return []
  return [
    ...cutsIn(legs.slice(0, split.at), offset),
    offset + split.at,
    ...cutsIn(legs.slice(split.at), offset + split.at),
  ]
}

/** Drops cuts that are no steps between the levels beside them, the weakest first. */
function keepSteps(legs: readonly WeighedLeg[], cuts: readonly number[]): number[] {
  let kept = cuts.slice()
  for (;;) {
    const judged = kept.map((cut, index) => {
      const from = kept[index - 1] ?? 0
      const part = legs.slice(from, kept[index + 1] ?? legs.length)
      const split = widen(splitAt(part, cut - from), part)
      return { cut, isStep: isStep(part, split), z: Math.abs(split.z) }
    })
    const weakest = judged.filter((item) => !item.isStep).sort((a, b) => a.z - b.z)[0]
    if (weakest === undefined) return kept
    kept = kept.filter((cut) => cut !== weakest.cut)
  }
}

function isStep(legs: readonly WeighedLeg[], { before, after, z, at }: Split): boolean {
  const noise = 1 / Math.sqrt(Math.min(before.weight, after.weight))
  const small = Math.max(noise, Math.min(Math.abs(before.value), Math.abs(after.value)))
  const large = Math.max(Math.abs(before.value), Math.abs(after.value))
  if (Math.abs(z) <= STRONG || large < LEAST_RATIO * small) return false
  // A side of few legs must have all of them beyond the middle, or one odd leg would be a step.
  const middle = (before.value + after.value) / 2
  const agrees = (side: readonly WeighedLeg[], level: number) =>
    side.length > 4 || side.every((leg) => (leg.value - middle) * (level - middle) > 0)
  if (!agrees(legs.slice(0, at), before.value) || !agrees(legs.slice(at), after.value)) return false
  return lineChiSquared(legs) > before.chiSquared + after.chiSquared + BETTER_THAN_LINE
}

/** Legs on either side whose rates stand for the levels before and after. */
const BESIDE = 8

function describe(legs: readonly WeighedLeg[], cuts: readonly number[]): Step[] {
  return cuts.map((cut, index) => {
    const from = cuts[index - 1] ?? 0
    const part = legs.slice(from, cuts[index + 1] ?? legs.length)
    const split = widen(splitAt(part, cut - from), part)
    return {
      between: localise(part, split),
      fromPaPerHour: levelOf(part.slice(Math.max(0, split.at - BESIDE), split.at)).value,
      toPaPerHour: levelOf(part.slice(split.at, split.at + BESIDE)).value,
      strength: Math.abs(split.z),
    }
  })
}
