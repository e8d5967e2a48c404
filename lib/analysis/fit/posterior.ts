import { UNKNOWNS, type LegEquations } from './leg-equations'
import { at, invertSymmetric, timesVector } from './symmetric'

/** Pa per K: gas law and half-wet vapour together give 140 to 375 as walls and wetness have it (judged). */
const GAS_RESPONSE_EACH = { mean: 75, sigma: 120 }
const GAS_RESPONSE_SUM = { mean: 225, sigma: 75 }
/** What the gas gives back after a stop: 0.1 to 0.3 inHg (judged). */
const WARMING = { mean: 600, sigma: 400 }
/** Share of orifice: evenly anything between none and all, so 0.29 either way. */
const SHAPE_SIGMA = 0.58
/** What a leg's rate may be off by beyond its noise, Pa/h: always, without a barometer, without air. */
export const RATE_SIGMA = { always: 3, noBarometer: 35, noAir: 70 }
export interface Noise {
  /** Of a row about the fit, Pa², and how much its correlation in time makes it count. */
  variance: number
  inflation: number
}

export interface LegShare {
  leg: LegEquations
  recency: number
  /** Leftover slope, Pa/h, and its variance from noise alone. */
  offPaPerHour: number
  variance: number
  aside: boolean
}

export interface Solution {
  values: Float64Array
  covariance: Float64Array
}

interface Sums {
  normal: Float64Array
  right: Float64Array
}

/** Posterior of the unknowns: weighted normal equations plus what is known before (gas response, shape). */
export function solve(
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
export function leaveOneOut(
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
