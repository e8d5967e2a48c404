import { DAY_MS, isNumber, Z95 } from './shared'
import { labelHolds, type LabelledHold } from './label-holds'
import { profileOf } from './length-likelihood'
import type { HoldTimeEstimate, HoldTimeInput } from './types'

const WINDOW_MS = 7 * DAY_MS
/** The newest holds of the week: enough for any estimate, and bounded work for a pump that runs all the time. */
const MOST_HOLDS = 240
const FEWEST_NEAR = { short: 4, long: 6 }
const FEWEST_HOLDS = 6
/** Log-likelihood by which a hold time has to beat 'longer than anything seen' (4: odds of 55 to 1). */
const CLEARLY = { short: 4, long: 7 }
/** Nights cut holds at lengths alike, too: beyond this more is asked. */
const LONG_SECONDS = 4 * 3600
/** Weather stretches and shortens holds that are seen only by their length, the longer the more. */
const WIDEN = { relative: 0.03, perHour: 0.012 }
/** A bound rests on single holds: taken down by what a cool night may have added. */
const STRETCH = { relative: 0.03, perHour: 0.008, most: 0.2 }

/**
 * Hold time from lengths alone, for a logger without a vacuum channel. Every hold ends by the leak (hold time
 * × lognormal; a fifth of them shortened by flushes that did not start the pump) or earlier by a flush; which,
 * is hidden, though the length of the run that follows tells where leak runs are alike. Hold time by profile
 * likelihood over the last 7 days, its interval widened for weather. Fewer than 4 holds near the estimate: a
 * bound. Under 6 holds, or nothing longer than 10 minutes and no rule to be seen: null. Equal lengths and
 * ties need nothing; holds that are not finite are left out. `seconds` is the hold as it is observed, at the
 * weather that was.
 */
export function holdTimeFromLengths(input: HoldTimeInput): HoldTimeEstimate | null {
  const holds = labelHolds(input, input.at - WINDOW_MS, MOST_HOLDS)
  if (holds.length < FEWEST_HOLDS) return null
  const profile = profileOf(holds)
  const hours = profile.seconds / 3600
  const isLong = profile.seconds > LONG_SECONDS
  const clearly = isLong ? CLEARLY.long : CLEARLY.short
  const fewest = isLong ? FEWEST_NEAR.long : FEWEST_NEAR.short
  const widening = WIDEN.relative + WIDEN.perHour * hours
  const edges = holds.reduce((sum, hold) => sum + hold.edgeSeconds, 0) / holds.length
  if (profile.near < fewest || profile.overPlateau < clearly || isOutlasted(profile.seconds, holds)) {
    return boundOf(input, holds)
  }
  const logSigma = Math.hypot(profile.logSigma, widening / Z95, edges / profile.seconds / 4)
  const low =
    Math.min(profile.low, profile.seconds) *
    Math.exp(-Z95 * Math.hypot(widening / Z95, edges / profile.seconds / 4))
  const high = Math.max(profile.high, profile.seconds) * (1 + widening)
  return estimateOf(input, holds, {
    seconds: profile.seconds,
    low,
    high,
    near: Math.round(profile.near),
    logSigma,
  })
}

/** Three holds that went on a quarter longer speak against an estimate. */
function isOutlasted(seconds: number, holds: readonly LabelledHold[]): boolean {
  return holds.filter((hold) => hold.seconds > 1.25 * seconds).length >= 3
}

function boundOf(input: HoldTimeInput, holds: readonly LabelledHold[]): HoldTimeEstimate | null {
  const longest = Math.max(...holds.map((hold) => hold.seconds), openSeconds(input))
  const stretch = Math.min(STRETCH.most, STRETCH.relative + (STRETCH.perHour * longest) / 3600)
  const seconds = longest * (1 - stretch)
  if (!(seconds > 0)) return null
  return estimateOf(input, holds, { seconds, low: seconds, high: null, near: holds.length, logSigma: 0.5 })
}

function openSeconds({ open, at }: HoldTimeInput): number {
  return open.hold === null || open.hold.setAside ? 0 : Math.max(0, at - open.hold.startedAt) / 1000
}

function estimateOf(
  input: HoldTimeInput,
  holds: readonly LabelledHold[],
  found: { seconds: number; low: number; high: number | null; near: number; logSigma: number },
): HoldTimeEstimate {
  const { cutOutPa, cutInPa, settledPa, standardPressurePa } = input
  const bandPa = isNumber(cutOutPa) && isNumber(cutInPa) ? cutOutPa - cutInPa : null
  const bound = found.high === null ? 'at-least' : null
  return {
    method: 'run-lengths',
    seconds: found.seconds,
    low: found.low,
    high: found.high,
    bound,
    holds: found.near,
    // With the installer's differential a rate follows; without it the length alone is known.
    rate:
      bandPa === null || found.high === null
        ? null
        : {
            paPerHour: (bandPa / found.seconds) * 3600,
            low: (bandPa / found.high) * 3600,
            high: (bandPa / found.low) * 3600,
          },
    legs: 0,
    legsSetAside: 0,
    hours: holds.reduce((sum, hold) => sum + hold.seconds, 0) / 3600,
    compensated: false,
    model: {
      law: null,
      gasResponse: [0, 0, 0],
      holdSeconds: found.seconds,
      lowSeconds: found.low,
      highSeconds: found.high,
      bound,
      logSigma: found.logSigma,
      observedHoldSeconds: found.seconds,
      standardPressurePa,
      cutOutPa,
      settledPa,
      cutInPa,
      compensated: false,
    },
  }
}
