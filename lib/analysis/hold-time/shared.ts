import type { FitLeg } from '../fit'
import type { HoldTimeInput } from './types'

export const Z95 = 1.959963984540054
export const HOUR_MS = 3_600_000
export const DAY_MS = 24 * HOUR_MS

export const isNumber = (value: number | null | undefined): value is number =>
  typeof value === 'number' && Number.isFinite(value)

/** The newest legs are enough for any estimate, and bound its cost. */
const MOST_LEGS = 96

/** Legs that count, newest first and no more than `MOST_LEGS`, the open one with them. */
export function allLegs(input: Pick<HoldTimeInput, 'legs' | 'open' | 'at'>): FitLeg[] {
  const legs: FitLeg[] = input.legs
    .filter((leg) => !leg.setAside)
    .sort((a, b) => b.startedAt - a.startedAt)
    .slice(0, MOST_LEGS)
  const open = input.open.leg
  if (open === null || open.setAside) return legs
  const lastSeconds = open.bins.offsetSeconds.at(-1) ?? 0
  return [...legs, { ...open, endedAt: open.startedAt + lastSeconds * 1000 }]
}
