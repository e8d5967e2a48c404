import { inHgToPa } from '@/shared/units'

/** Hold times that part the verdicts, s. */
export type HoldLimits = { aimSeconds: number; limitSeconds: number; shortCyclingSeconds: number }

/** Common practice: 8 h wanted, 3 h at least, under 10 min short cycling. */
export const DEFAULT_HOLD_LIMITS: HoldLimits = {
  aimSeconds: 8 * 3600,
  limitSeconds: 3 * 3600,
  shortCyclingSeconds: 600,
}

/** Cut-out minus cut-in where nobody gave it: the one that makes 0.3 inHg in 30 min and 3 h one rule. */
export const DEFAULT_DIFFERENTIAL_PA = inHgToPa(1.8)

/** What a reading can be told to: half a division of a 0.25 inHg dial, a digital gauge, the boat's logger. */
export const GAUGE_RESOLUTION_PA = {
  dial: inHgToPa(0.125),
  digital: inHgToPa(0.1),
  logger: inHgToPa(0.01),
} as const

/**
 * Half-width of the 95 % interval of a difference of two readings, in resolutions: each is off by up to
 * half a step either way, so their difference is triangular over ± one step, and 1 − √0.05 of it holds 95 %.
 */
export const DIFFERENCE_95_IN_STEPS = 1 - Math.sqrt(0.05)
