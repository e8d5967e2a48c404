import type { LegRate } from '@/lib/analysis/steps'
import { normalDraw, type Random } from '@/lib/analysis/statistics'
import { inHgToPa } from '@/shared/units'

export type SteppedBoat = { legs: LegRate[]; stepAt: number | null; oldHoldMs: number }

const HOUR_MS = 3_600_000
const DIFFERENTIAL_PA = inHgToPa(2)

/**
 * Two weeks of a boat's legs: holds by leak, some cut short by a flush, rates that follow the warmth of the
 * day and the weather of days, read by a Theil–Sen slope. `factor` steps the rate at a moment in between.
 */
export function drawSteppedBoat(random: Random, factor: number): SteppedBoat {
  const rate = inHgToPa(0.08 * Math.pow(20, random()))
  const days = 14
  const stepAt = factor === 1 ? null : (3 + 8 * random()) * 24 * HOUR_MS
  const swing = 0.12 * random()
  const phase = 2 * Math.PI * random()
  const flushesAnHour = 0.4 * random()
  const legs: LegRate[] = []
  let weather = 0
  let at = 0
  while (at < days * 24 * HOUR_MS) {
    weather = 0.9 * weather + 0.02 * normalDraw(random)
    const warmth = 1 + swing * Math.sin((2 * Math.PI * at) / (24 * HOUR_MS) + phase) + weather
    const hourOfDay = (at / HOUR_MS) % 24
    const awake = hourOfDay > 7 && hourOfDay < 23
    const cut = awake && flushesAnHour > 0 ? (-Math.log(1 - random()) / flushesAnHour) * HOUR_MS : Infinity
    const old = rate * warmth
    const length = Math.min(cut, holdLength(old, factor, at, stepAt), 10 * HOUR_MS)
    if (length > 600_000) legs.push(readLeg(random, at, at + length, old, factor, stepAt))
    at += length + 90_000
  }
  return { legs, stepAt, oldHoldMs: (DIFFERENTIAL_PA / rate) * HOUR_MS }
}

/** A hold with a step in it goes on at the new rate from there. */
function holdLength(rate: number, factor: number, at: number, stepAt: number | null): number {
  const whole = (DIFFERENTIAL_PA / rate) * HOUR_MS
  if (stepAt === null || at + whole < stepAt) return whole
  if (at >= stepAt) return whole / factor
  return stepAt - at + (whole - (stepAt - at)) / factor
}

/** Median slope of pairs over the leg, and the gauge's error for its length. */
function readLeg(
  random: Random,
  startedAt: number,
  endedAt: number,
  old: number,
  factor: number,
  stepAt: number | null,
): LegRate {
  const length = endedAt - startedAt
  const share = stepAt === null ? 0 : Math.min(1, Math.max(0, (endedAt - stepAt) / length))
  const paPerHour = medianSlope(old, old * factor, share)
  const sigmaPaPerHour = inHgToPa(0.01) / (length / HOUR_MS) + 0.01 * paPerHour
  return { startedAt, endedAt, paPerHour: paPerHour + sigmaPaPerHour * normalDraw(random), sigmaPaPerHour }
}

/** Theil–Sen slope of a line that kinks after 1 − share of its length. */
function medianSlope(before: number, after: number, share: number): number {
  const points = Array.from({ length: 25 }, (_, index) => index / 24)
  const level = (x: number) => before * Math.min(x, 1 - share) + after * Math.max(0, x - (1 - share))
  const slopes = points.flatMap((x, index) =>
    points.slice(0, index).map((earlier) => (level(x) - level(earlier)) / (x - earlier)),
  )
  slopes.sort((a, b) => a - b)
  return slopes[Math.floor(slopes.length / 2)] ?? before
}
