import type { HoldRow } from '../fold/types'
import { median, medianAbsoluteDeviation } from '../statistics'
import { DAY_MS, isNumber, Z95 } from './shared'
import type { HoldTimeEstimate, HoldTimeInput } from './types'

/** Holds shorter than this have no legs worth fitting. */
export const SHORT_SECONDS = 15 * 60
const NEWEST = 24
/** What settling and the switch's own scatter leave in doubt, relative (judged). */
const FLOOR = 0.03

/** The newest holds that the leak ended, newest first, of the last day. */
export function newestLeakHolds(input: Pick<HoldTimeInput, 'holds' | 'at'>, count = NEWEST): HoldRow[] {
  return input.holds
    .filter((hold) => hold.ending === 'leak' && hold.flushes === 0 && !hold.setAside)
    .filter((hold) => hold.endedAt > input.at - DAY_MS && hold.endedAt > hold.startedAt)
    .sort((a, b) => b.startedAt - a.startedAt)
    .slice(0, count)
}

/** Whether the newest holds that the leak ended are too short to fit: two at least, half of them under 15 min. */
export function isShort(holds: readonly HoldRow[]): boolean {
  const middle = median(holds.slice(0, 7).map((hold) => (hold.endedAt - hold.startedAt) / 1000))
  return holds.length >= 2 && middle !== null && middle < SHORT_SECONDS
}

/**
 * Hold time of a system whose pump runs every few minutes: each hold gives (settled top − end)/length, and the
 * middle one stands for the rate (newest two dozen of the last day). With fewer than two such holds, or none
 * under 15 min: null. Ties and equal holds need nothing special; a hold without vacuum counts by its length.
 */
export function holdTimeFromShortHolds(input: HoldTimeInput): HoldTimeEstimate | null {
  const holds = newestLeakHolds(input)
  if (!isShort(holds)) return null
  const { cutOutPa, cutInPa } = input
  const lengths = holds.map((hold) => (hold.endedAt - hold.startedAt) / 1000)
  const rates = holds.flatMap((hold, index) => {
    const fromPa = hold.settledPa ?? hold.learnedSettledPa ?? hold.cutOutPa
    const seconds = lengths[index] ?? 0
    if (!isNumber(fromPa) || !isNumber(hold.endPa) || !(fromPa > hold.endPa)) return []
    return [((fromPa - hold.endPa) / seconds) * 3600]
  })
  const observed = median(lengths) ?? 0
  const rate = median(rates)
  const measured = rate !== null && isNumber(cutOutPa) && isNumber(cutInPa) && rates.length >= 2
  const values = measured ? rates : lengths
  const middle = (measured ? rate : observed) || 1
  const scatter = (medianAbsoluteDeviation(values) ?? 0) / middle
  const edges = (median(holds.map((hold) => hold.edgeUncertaintySeconds)) ?? 0) / Math.max(observed, 1)
  const logSigma = Math.hypot(
    (1.25 * scatter) / Math.sqrt(values.length),
    FLOOR,
    edges / Math.sqrt(12 * values.length),
  )
  const seconds = measured ? ((cutOutPa - cutInPa) / rate) * 3600 : observed
  const low = seconds * Math.exp(-Z95 * logSigma)
  const high = seconds * Math.exp(Z95 * logSigma)
  return {
    method: 'short-holds',
    seconds,
    low,
    high,
    bound: null,
    holds: holds.length,
    rate: measured
      ? { paPerHour: rate, low: rate * Math.exp(-Z95 * logSigma), high: rate * Math.exp(Z95 * logSigma) }
      : null,
    legs: 0,
    legsSetAside: 0,
    hours: lengths.reduce((sum, length) => sum + length, 0) / 3600,
    compensated: false,
    model: {
      law: null,
      gasResponse: [0, 0, 0],
      holdSeconds: seconds,
      lowSeconds: low,
      highSeconds: high,
      bound: null,
      logSigma,
      observedHoldSeconds: observed,
      standardPressurePa: input.standardPressurePa,
      cutOutPa,
      settledPa: input.settledPa,
      cutInPa,
      compensated: false,
    },
  }
}
