import { median, medianAbsoluteDeviation } from '../statistics'
import { holdSecondsOf } from './leak-law'
import { legEquations, UNKNOWNS, type BandFrame, type FitLeg, type LegEquations } from './leg-equations'
import { at, invertSymmetric, timesVector } from './symmetric'
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

/** Pa per K: gas law and half-wet vapour together give 140 to 375 as walls and wetness have it (judged). */
const GAS_RESPONSE_EACH = { mean: 75, sigma: 120 }
const GAS_RESPONSE_SUM = { mean: 225, sigma: 75 }
/** What the gas gives back after a stop: 0.1 to 0.3 inHg (judged). */
const WARMING = { mean: 600, sigma: 400 }
/** Share of orifice: evenly anything between none and all, so 0.29 either way. */
const SHAPE_SIGMA = 0.58
/** What a leg's rate may be off by beyond its noise, Pa/h: always, without a barometer, without air. */
const RATE_SIGMA = { always: 3, noBarometer: 35, noAir: 70 }
const MEMORIES_HOURS = [8, 24, 72, 240] as const
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
  const stepPa = gaugeStepPa(input.legs)
  let fit: Weighted | null = null
  for (const memoryHours of MEMORIES_HOURS) {
    fit = weightedFit(all, input.at, memoryHours, stepPa)
    if (fit !== null && fit.enough) break
  }
  return fit === null ? null : asLegFit(fit, input, frame)
}

interface Noise {
  /** Of a row about the fit, Pa², and how much its correlation in time makes it count. */
  variance: number
  inflation: number
}

interface LegShare {
  leg: LegEquations
  recency: number
  /** Leftover slope, Pa/h, and its variance from noise alone. */
  offPaPerHour: number
  variance: number
  aside: boolean
}

interface Weighted {
  solution: Solution
  jackknife: Float64Array[]
  shares: LegShare[]
  memoryHours: number
  enough: boolean
}

function weightedFit(
  all: readonly LegEquations[],
  atMs: number,
  memoryHours: number,
  stepPa: number,
): Weighted | null {
  const shares: LegShare[] = all.map((leg) => ({
    leg,
    recency: Math.exp(-Math.max(0, atMs - (leg.startedAt + leg.endedAt) / 2) / 3_600_000 / memoryHours),
    offPaPerHour: 0,
    variance: 0,
    aside: false,
  }))
  const sumOf = (pick: (share: LegShare) => number) => shares.reduce((sum, share) => sum + pick(share), 0)
  const legsWorth = sumOf((share) => share.recency)
  const hoursWorth = sumOf((share) => share.recency * share.leg.hours)
  const enough = legsWorth >= 3 && hoursWorth >= 5 && legsWorth * hoursWorth >= 40

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
  return { solution, jackknife, shares, memoryHours, enough }
}

interface Solution {
  values: Float64Array
  covariance: Float64Array
}

interface Sums {
  normal: Float64Array
  right: Float64Array
}

/** Posterior of the unknowns: weighted normal equations plus what is known before (gas response, shape). */
function solve(
  shares: readonly LegShare[],
  noise: Noise,
  tau2: number,
  before: Float64Array | null,
): Solution | null {
  return solveSums(sumsOf(shares, noise, tau2), before)
}

function sumsOf(shares: readonly LegShare[], noise: Noise, tau2: number): Sums {
  const sums = { normal: new Float64Array(UNKNOWNS * UNKNOWNS), right: new Float64Array(UNKNOWNS) }
  for (const share of shares) if (!share.aside) addLeg(sums, share.leg, weightOf(share, noise, tau2))
  return sums
}

function addLeg({ normal, right }: Sums, leg: LegEquations, weight: number): void {
  for (let i = 0; i < normal.length; i += 1) normal[i] = at(normal, i) + weight * at(leg.normal, i)
  for (let i = 0; i < UNKNOWNS; i += 1) right[i] = at(right, i) + weight * at(leg.right, i)
}

/** The fit without each leg in turn, from the same sums. */
function leaveOneOut(
  shares: readonly LegShare[],
  noise: Noise,
  tau2: number,
  before: Float64Array,
): Float64Array[] {
  const whole = sumsOf(shares, noise, tau2)
  return shares
    .filter((share) => !share.aside)
    .flatMap((share) => {
      const sums = { normal: whole.normal.slice(), right: whole.right.slice() }
      addLeg(sums, share.leg, -weightOf(share, noise, tau2))
      return solveSums(sums, before)?.values ?? []
    })
}

/** Adds what is known before to the sums (they are used up) and solves. */
function solveSums({ normal, right }: Sums, before: Float64Array | null): Solution | null {
  addKnownGasResponse(normal, right)
  addKnownWarming(normal, right)
  const rate = before === null ? roughRate(normal, right) : at(before, 0) + at(before, 1)
  addKnownShape(normal, rate)
  return nonNegative(normal, right)
}

const weightOf = (share: LegShare, noise: Noise, tau2: number): number => {
  const variance = noise.variance * noise.inflation
  const { leg } = share
  const own =
    tau2 + (leg.hasBarometer ? 0 : RATE_SIGMA.noBarometer ** 2) + (leg.hasAir ? 0 : RATE_SIGMA.noAir ** 2)
  return share.recency / (variance + own * leg.timeSquares)
}

function addKnownGasResponse(normal: Float64Array, right: Float64Array): void {
  const each = 1 / GAS_RESPONSE_EACH.sigma ** 2
  const sum = 1 / GAS_RESPONSE_SUM.sigma ** 2
  for (let j = 2; j < 5; j += 1) {
    for (let k = 2; k < 5; k += 1) {
      const index = j * UNKNOWNS + k
      normal[index] = at(normal, index) + sum + (j === k ? each : 0)
    }
    right[j] = at(right, j) + sum * GAS_RESPONSE_SUM.mean + each * GAS_RESPONSE_EACH.mean
  }
}

function addKnownWarming(normal: Float64Array, right: Float64Array): void {
  const last = UNKNOWNS - 1
  normal[last * UNKNOWNS + last] = at(normal, last * UNKNOWNS + last) + 1 / WARMING.sigma ** 2
  right[last] = at(right, last) + WARMING.mean / WARMING.sigma ** 2
}

/** The light ridge: orifice − laminar is nought, give or take `SHAPE_SIGMA` of the whole rate. */
function addKnownShape(normal: Float64Array, ratePaPerHour: number): void {
  const precision = 1 / (SHAPE_SIGMA * Math.max(Math.abs(ratePaPerHour), 5)) ** 2
  normal[0] = at(normal, 0) + precision
  normal[UNKNOWNS + 1] = at(normal, UNKNOWNS + 1) + precision
  normal[1] = at(normal, 1) - precision
  normal[UNKNOWNS] = at(normal, UNKNOWNS) - precision
}

function roughRate(normal: Float64Array, right: Float64Array): number {
  const squares = at(normal, 0) + at(normal, UNKNOWNS + 1) + 2 * at(normal, 1)
  return squares > 0 ? (2 * (at(right, 0) + at(right, 1))) / squares : 0
}

/** Solves, and again with the law that came out negative held at nought. */
function nonNegative(normal: Float64Array, right: Float64Array): Solution | null {
  const covariance = invertSymmetric(normal, UNKNOWNS)
  if (covariance === null) return null
  const values = timesVector(covariance, right, UNKNOWNS)
  const negative = at(values, 0) < at(values, 1) ? 0 : 1
  const other = 1 - negative
  if (at(values, negative) >= 0) return { values, covariance }
  // Moving along the covariance to the edge is the constrained optimum of a quadratic.
  const edge = -at(values, negative) / at(covariance, negative * UNKNOWNS + negative)
  const moved = values.map((value, j) => value + edge * at(covariance, j * UNKNOWNS + negative))
  moved[negative] = 0
  if (at(moved, other) < 0) moved[other] = 0
  return { values: moved, covariance }
}

/** Noise of a row about the fit, pooled over legs, and how much its correlation in time makes it count. */
function judgeNoise(shares: readonly LegShare[], values: Float64Array, stepPa: number) {
  let squares = 0
  let products = 0
  let rows = 0
  let pairs = 0
  let moved = 0
  for (const share of shares) {
    if (share.aside) continue
    const rest = leftovers(share.leg, values)
    moved += Math.abs(at(share.leg.pressure, 0) - at(share.leg.pressure, share.leg.count - 1))
    rows += share.leg.count - 2
    pairs += share.leg.count - 1
    rest.forEach((value, row) => {
      squares += value * value
      if (row > 0) products += value * at(rest, row - 1)
    })
  }
  const legs = shares.filter((share) => !share.aside).length
  const perLegRows = rows / Math.max(1, legs) + 2
  const quantum = (stepPa * stepPa) / 12
  const variance = Math.max(squares / Math.max(1, rows), stepPa > 30 ? quantum : 0, 4)
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
function judgeLegs(shares: LegShare[], values: Float64Array, noise: Noise): number {
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
function gaugeStepPa(legs: readonly FitLeg[]): number {
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

function asLegFit(fit: Weighted, input: LegFitInput, frame: BandFrame): LegFit {
  const lawOf = (values: Float64Array): LeakLawFit => ({
    orificePaPerHour: Math.max(0, at(values, 0)),
    laminarPaPerHour: Math.max(0, at(values, 1)),
    midPa: frame.midPa,
    standardPressurePa: frame.standardPressurePa,
  })
  const bandPa = input.cutOutPa - input.cutInPa
  const rateOf = (values: Float64Array): number =>
    bandPa / (holdSecondsOf(lawOf(values), input.cutOutPa, input.cutInPa) / 3600)
  const { values, covariance } = fit.solution
  const law = lawOf(values)
  const ratePaPerHour = rateOf(values)
  const modelSigma = Math.sqrt(at(covariance, 0) + at(covariance, UNKNOWNS + 1) + 2 * at(covariance, 1))
  const used = fit.shares.filter((share) => !share.aside)
  const n = fit.jackknife.length
  const jackknifeMean = fit.jackknife.reduce((sum, one) => sum + rateOf(one), 0) / Math.max(1, n)
  const jackknifeSquares = fit.jackknife.reduce((sum, one) => sum + (rateOf(one) - jackknifeMean) ** 2, 0)
  const jackknifeSigma = n < 3 ? 0 : Math.sqrt(((n - 1) / n) * jackknifeSquares)
  return {
    law,
    gasResponse: [at(values, 2), at(values, 3), at(values, 4)],
    holdSeconds: holdSecondsOf(law, input.cutOutPa, input.cutInPa),
    ratePaPerHour,
    rateSigma: Math.hypot(Math.max(modelSigma, jackknifeSigma), (FLOOR / 1.96) * ratePaPerHour),
    legs: used.length,
    legsSetAside: fit.shares.length - used.length,
    hours: used.reduce((sum, share) => sum + share.leg.hours, 0),
    compensated: used.every((share) => share.leg.hasAir && share.leg.hasBarometer),
    memoryHours: fit.memoryHours,
  }
}
