import { median, medianAbsoluteDeviation } from '../statistics'
import { UNKNOWNS, type FitLeg, type LegEquations } from './leg-equations'
import { RATE_SIGMA, type LegShare, type Noise } from './posterior'
import { at } from './symmetric'

/** Noise of a row about the fit, pooled over legs, and how much its correlation in time makes it count. */
export function judgeNoise(shares: readonly LegShare[], values: Float64Array, stepPa: number) {
  let squares = 0
  let products = 0
  let rows = 0
  let pairs = 0
  let moved = 0
  const legVariances: number[] = []
  for (const share of shares) {
    if (share.aside) continue
    const rest = leftovers(share.leg, values)
    moved += Math.abs(at(share.leg.pressure, 0) - at(share.leg.pressure, share.leg.count - 1))
    rows += share.leg.count - 2
    const before = squares
    pairs += share.leg.count - 1
    rest.forEach((value, row) => {
      squares += value * value
      if (row > 0) products += value * at(rest, row - 1)
    })
    legVariances.push((squares - before) / Math.max(1, share.leg.count - 2))
  }
  const legs = shares.filter((share) => !share.aside).length
  const perLegRows = rows / Math.max(1, legs) + 2
  const quantum = (stepPa * stepPa) / 12
  // A leg that does not fit must not hide behind the noise that it makes itself.
  const usual = legVariances.length < 5 ? Infinity : 3 * (median(legVariances) ?? Infinity)
  const pooled = Math.min(squares / Math.max(1, rows), Math.max(usual, 25))
  const variance = Math.max(pooled, stepPa > 30 ? quantum : 0, 4)
  const correlation = Math.min(
    0.95,
    Math.max(0, squares > 0 ? products / Math.max(1, pairs) / (squares / Math.max(1, rows + 2 * legs)) : 0),
  )
  // A coarse gauge gives one independent reading a step, however often it is read.
  const stepsPerLeg = stepPa > 30 ? moved / Math.max(1, legs) / stepPa + 2 : perLegRows
  const inflation = Math.max((1 + correlation) / (1 - correlation), perLegRows / stepsPerLeg, 1)
  return { variance, inflation }
}

function leftovers(leg: LegEquations, values: Float64Array): Float64Array {
  const rest = new Float64Array(leg.count)
  for (let row = 0; row < leg.count; row += 1) {
    let value = at(leg.pressure, row)
    for (let j = 0; j < UNKNOWNS; j += 1) value -= at(leg.design, row * UNKNOWNS + j) * at(values, j)
    rest[row] = value
  }
  return rest
}

/**
 * Each leg's leftover slope: legs far off the rest are set aside (never more than three in ten), and what
 * the others scatter beyond their noise comes back as a variance of the rate (DerSimonian and Laird's).
 */
export function judgeLegs(shares: LegShare[], values: Float64Array, noise: Noise): number {
  for (const share of shares) {
    const { leg } = share
    const rest = leftovers(leg, values)
    let product = 0
    for (let row = 0; row < leg.count; row += 1) product += at(rest, row) * at(leg.hoursOf, row)
    share.offPaPerHour = product / leg.timeSquares
    share.variance = (noise.variance * noise.inflation) / leg.timeSquares
    share.aside = false
  }
  setAsideOutliers(shares, at(values, 0) + at(values, 1))
  const used = shares.filter((share) => !share.aside)
  let weights = 0
  let squares = 0
  let q = 0
  for (const share of used) {
    const weight = 1 / (share.variance + RATE_SIGMA.always ** 2)
    weights += weight
    squares += weight * weight
    q += weight * share.offPaPerHour ** 2
  }
  const spread = used.length < 3 ? 0 : Math.max(0, (q - (used.length - 1)) / (weights - squares / weights))
  return spread + RATE_SIGMA.always ** 2
}

function setAsideOutliers(shares: LegShare[], ratePaPerHour: number): void {
  const fresh = shares.filter((share) => share.recency > 0.05)
  if (fresh.length < 5) return
  const middle = median(fresh.map((share) => share.offPaPerHour)) ?? 0
  const spread = medianAbsoluteDeviation(fresh.map((share) => share.offPaPerHour)) ?? 0
  const reach = Math.max(4 * spread, 0.25 * ratePaPerHour)
  const far = fresh
    .map((share) => ({ share, off: Math.abs(share.offPaPerHour - middle) }))
    .filter(({ share, off }) => off > reach && off > 4 * Math.sqrt(share.variance))
    .sort((a, b) => b.off - a.off)
    .slice(0, Math.floor(0.3 * fresh.length))
  for (const { share } of far) share.aside = true
}

/**
 * Step of the gauge, Pa: where most neighbouring bins read alike, the usual difference of those that do not
 * (a tenth of an inch of mercury where none ever differs); 0 where noise hides the step.
 */
export function gaugeStepPa(legs: readonly FitLeg[]): number {
  let alike = 0
  const differences: number[] = []
  for (const leg of legs) {
    leg.bins.vacuumPa.forEach((value, i) => {
      const before = leg.bins.vacuumPa[i - 1]
      if (before === undefined) return
      const difference = Math.abs(value - before)
      if (difference < 0.2) alike += 1
      else differences.push(difference)
    })
  }
  if (alike <= differences.length) return 0
  return median(differences) ?? 338.6
}
