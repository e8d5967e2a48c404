import { inHgToPa } from '@/shared/units'

const LEAST_SECONDS = 120
const MOST_SECONDS = 90 * 60
/** Share of the boat's flow that a test must be able to tell from nought, to find the one leak. */
export const TOLD_APART = 0.25
/** The vacuum it starts from, and how much of it may be used up before the reading turns into a bound. */
const START_PA = inHgToPa(10)
const USED_UP = 0.4

/**
 * How long to wait between readings, s: V·resolution over a quarter
 * (or `toldApart`) of the boat's flow, at least 2 min and
 * at most 90, but no longer than the whole leak takes to use up two fifths of 10 inHg (small parts move the
 * gauge in seconds).
 */
export function waitSeconds(
  volumeM3: number,
  resolutionPa: number,
  flowPaM3PerS: number,
  toldApart = TOLD_APART,
): number {
  if (!(flowPaM3PerS > 0)) return MOST_SECONDS
  const needed = (volumeM3 * resolutionPa) / (toldApart * flowPaM3PerS)
  const usedUp = (USED_UP * START_PA * volumeM3) / flowPaM3PerS
  return Math.min(MOST_SECONDS, Math.max(needed, Math.min(LEAST_SECONDS, usedUp)))
}
