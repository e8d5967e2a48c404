import { holdSecondsOf } from './leak-law'
import { legEquations, UNKNOWNS, type BandFrame, type FitLeg, type LegEquations } from './leg-equations'
import { gaugeStepPa, judgeLegs, judgeNoise } from './judge-legs'
import { leaveOneOut, RATE_SIGMA, solve, type LegShare, type Solution } from './posterior'
import { at } from './symmetric'
import type { GasResponse, LeakLawFit } from './types'

export interface LegFitInput {
  legs: readonly FitLeg[]
  at: number
  cutOutPa: number
  cutInPa: number
  standardPressurePa: number
}

export interface LegFit {
  law: LeakLawFit
  gasResponse: GasResponse
  /** From cut-out to cut-in at steady 20 °C and standard pressure; infinite where nothing seems to leak. */
  holdSeconds: number
  /** Mean rate over the band, Pa/h, and its standard error with everything that is in doubt. */
  ratePaPerHour: number
  rateSigma: number
  /** Legs used, those set aside because they don't fit the rest, and hours of the used ones. */
  legs: number
  legsSetAside: number
  hours: number
  compensated: boolean
  /** How far back newer legs outweigh older ones, h. */
  memoryHours: number
}

const LONGEST_MEMORY_HOURS = 240
const MEMORIES_HOURS = [8, 24, 72, LONGEST_MEMORY_HOURS] as const
const FLOOR = 0.01

/**
 * One physical fit of all legs: newer ones weigh more (8 h of memory, longer while that holds too few), legs
 * that don't fit the rest are set aside. The rate's standard error is the larger of the model's and the
 * jackknife's over legs, with a floor of 1 %. No usable leg: null. One leg gives a fit with a wide error;
 * legs that are all alike (a coarse gauge that never stepped) give a rate of about nought with an error of a
 * step over the time watched.
 */
export function fitLegs(input: LegFitInput): LegFit | null {
  const frame: BandFrame = {
    midPa: (input.cutOutPa + input.cutInPa) / 2,
    standardPressurePa: input.standardPressurePa,
  }
  const all = input.legs.flatMap((leg) => legEquations(leg, frame) ?? [])
  if (all.length === 0) return null
  const fit = weightedFit(all, input.at, memoryHoursOf(all, input.at), gaugeStepPa(input.legs))
  return fit === null ? null : asLegFit(fit, input, frame)
}

interface Weighted {
  solution: Solution
  jackknife: Float64Array[]
  shares: LegShare[]
  memoryHours: number
}

const recencyOf = (leg: LegEquations, atMs: number, memoryHours: number): number =>
  Math.exp(-Math.max(0, atMs - (leg.startedAt + leg.endedAt) / 2) / 3_600_000 / memoryHours)

/** The shortest memory that still holds a few legs and several hours of them. */
function memoryHoursOf(all: readonly LegEquations[], atMs: number): number {
  const enough = MEMORIES_HOURS.find((memoryHours) => {
    const worths = all.map((leg) => recencyOf(leg, atMs, memoryHours))
    const legsWorth = worths.reduce((sum, worth) => sum + worth, 0)
    const hoursWorth = worths.reduce((sum, worth, i) => sum + worth * (all[i]?.hours ?? 0), 0)
    return legsWorth >= 3 && hoursWorth >= 5 && legsWorth * hoursWorth >= 40
  })
  return enough ?? LONGEST_MEMORY_HOURS
}

function weightedFit(
  all: readonly LegEquations[],
  atMs: number,
  memoryHours: number,
  stepPa: number,
): Weighted | null {
  const shares: LegShare[] = all.map((leg) => ({
    leg,
    recency: recencyOf(leg, atMs, memoryHours),
    offPaPerHour: 0,
    variance: 0,
    aside: false,
  }))
  let noise = { variance: 100, inflation: 2 }
  let tau2 = RATE_SIGMA.always ** 2
  let solution: Solution | null = null
  for (let round = 0; round < 3; round += 1) {
    const scale = solution === null ? null : solution.values
    solution = solve(shares, noise, tau2, scale)
    if (solution === null) return null
    noise = judgeNoise(shares, solution.values, stepPa)
    tau2 = judgeLegs(shares, solution.values, noise)
  }
  solution = solve(shares, noise, tau2, solution?.values ?? null)
  if (solution === null) return null
  const settled = solution
  const used = shares.filter((share) => !share.aside)
  const jackknife = used.length < 3 ? [] : leaveOneOut(shares, noise, tau2, settled.values)
  return { solution, jackknife, shares, memoryHours }
}

function asLegFit(fit: Weighted, input: LegFitInput, frame: BandFrame): LegFit {
  const lawOf = (values: Float64Array): LeakLawFit => ({
    orificePaPerHour: Math.max(0, at(values, 0)),
    laminarPaPerHour: Math.max(0, at(values, 1)),
    midPa: frame.midPa,
    standardPressurePa: frame.standardPressurePa,
  })
  const bandPa = input.cutOutPa - input.cutInPa
  const { values, covariance } = fit.solution
  const law = lawOf(values)
  const holdSeconds = holdSecondsOf(law, input.cutOutPa, input.cutInPa)
  const ratePaPerHour = bandPa / (holdSeconds / 3600)
  const modelSigma = Math.sqrt(at(covariance, 0) + at(covariance, UNKNOWNS + 1) + 2 * at(covariance, 1))
  const used = fit.shares.filter((share) => !share.aside)
  const n = fit.jackknife.length
  const midRates = fit.jackknife.map((one) => at(one, 0) + at(one, 1))
  const jackknifeMean = midRates.reduce((sum, one) => sum + one, 0) / Math.max(1, n)
  const jackknifeSquares = midRates.reduce((sum, one) => sum + (one - jackknifeMean) ** 2, 0)
  const jackknifeSigma = n < 3 ? 0 : Math.sqrt(((n - 1) / n) * jackknifeSquares)
  return {
    law,
    gasResponse: [at(values, 2), at(values, 3), at(values, 4)],
    holdSeconds,
    ratePaPerHour,
    rateSigma: Math.hypot(Math.max(modelSigma, jackknifeSigma), (FLOOR / 1.96) * ratePaPerHour),
    legs: used.length,
    legsSetAside: fit.shares.length - used.length,
    hours: used.reduce((sum, share) => sum + share.leg.hours, 0),
    compensated: used.every((share) => share.leg.hasAir && share.leg.hasBarometer),
    memoryHours: fit.memoryHours,
  }
}
