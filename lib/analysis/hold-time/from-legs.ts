import { fitLegs, holdSecondsOf, type LegFit } from '../fit'
import type { HoldTimeEstimate, HoldTimeInput } from './types'
import { allLegs, isNumber, Z95 } from './shared'

/** Over this relative error of the rate a value would mislead, and a bound is given instead. */
const BOUND_OVER = 0.24
/** A day's leg of a boat this tight says enough; more would be a claim about weeks (judged). */
const LONGEST_SECONDS = 14 * 86_400
/** Less than this of legs is no record yet. */
export const LEAST_LEG_HOURS = 0.4

/**
 * Hold time by the physical fit over the legs. Value and interval where the rate stands clear of its error,
 * else a bound from the interval's upper end. No legs, under 24 minutes of them, or no known switch points:
 * null. One leg is enough where it is long; legs with NaN in them lose those bins.
 */
export function holdTimeFromLegs(input: HoldTimeInput): HoldTimeEstimate | null {
  const { cutOutPa, cutInPa } = input
  if (!isNumber(cutOutPa) || !isNumber(cutInPa) || !(cutOutPa > cutInPa)) return null
  const legs = allLegs(input)
  const fit = fitLegs({
    legs,
    at: input.at,
    cutOutPa,
    cutInPa,
    standardPressurePa: input.standardPressurePa,
  })
  if (fit === null || fit.hours < LEAST_LEG_HOURS) return null
  const bandPa = cutOutPa - cutInPa
  const lowRate = fit.ratePaPerHour - Z95 * fit.rateSigma
  const highRate = fit.ratePaPerHour + Z95 * fit.rateSigma
  const bounded = fit.rateSigma > BOUND_OVER * fit.ratePaPerHour || fit.holdSeconds > LONGEST_SECONDS
  // A band that nobody told widens the hold time, not the rate.
  const logSigma = Math.hypot(fit.rateSigma / Math.max(fit.ratePaPerHour, 1), input.bandDoubt)
  const shrink = Math.exp(-Z95 * input.bandDoubt)
  const atHighRate = Math.min((bandPa / highRate) * 3600, LONGEST_SECONDS)
  const low = bounded ? atHighRate * shrink : fit.holdSeconds * Math.exp(-Z95 * logSigma)
  const seconds = bounded ? low : fit.holdSeconds
  const high = bounded ? null : fit.holdSeconds * Math.exp(Z95 * logSigma)
  const holds = new Set(legs.map((leg) => leg.holdStartedAt)).size
  return {
    method: 'legs',
    seconds,
    low,
    high,
    bound: bounded ? 'at-least' : null,
    holds,
    rate: { paPerHour: fit.ratePaPerHour, low: lowRate, high: highRate },
    legs: fit.legs,
    legsSetAside: fit.legsSetAside,
    hours: fit.hours,
    compensated: fit.compensated,
    model: modelOf(fit, input, { cutOutPa, cutInPa, seconds, low, high, bounded, logSigma }),
  }
}

function modelOf(
  fit: LegFit,
  input: HoldTimeInput,
  band: {
    logSigma: number
    cutOutPa: number
    cutInPa: number
    seconds: number
    low: number
    high: number | null
    bounded: boolean
  },
): HoldTimeEstimate['model'] {
  const settledPa = input.settledPa ?? band.cutOutPa
  const share = holdSecondsOf(fit.law, settledPa, band.cutInPa) / fit.holdSeconds
  return {
    law: fit.law,
    gasResponse: fit.gasResponse,
    holdSeconds: band.seconds,
    lowSeconds: band.low,
    highSeconds: band.high,
    bound: band.bounded ? 'at-least' : null,
    logSigma: Math.min(0.5, band.logSigma),
    observedHoldSeconds: band.seconds * (Number.isFinite(share) && share > 0 ? share : 1),
    standardPressurePa: input.standardPressurePa,
    cutOutPa: band.cutOutPa,
    settledPa: input.settledPa,
    cutInPa: band.cutInPa,
    compensated: fit.compensated,
  }
}
