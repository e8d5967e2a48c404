import { inHgToPa } from '@/shared/units'
import { longestGapSeconds } from './readings'
import type { Judged, Reading, SeenRun } from './types'

/** Domain practice for "off": this far under the cut-in no switch leaves its pump standing. */
const UNDER_PA = inHgToPa(1)
const UNDER_SECONDS = 60

export interface BreakerOffAsked {
  /** Corrected; those since the step began. */
  readings: readonly Reading[]
  runs: readonly SeenRun[]
  beganMs: number
  nowMs: number
  intervalSeconds: number
  /** The level at which the pump would start, Pa; null for a logger without vacuum. */
  cutInPa: number | null
}

/**
 * With the pump's breaker off and a bowl flushed the vacuum falls under the cut-in: the pump must not start, and
 * the logger must go on, so it does not hang on that breaker.
 */
export function judgeBreakerOff(asked: BreakerOffAsked): Judged {
  const { readings, runs, beganMs, nowMs, intervalSeconds, cutInPa } = asked
  const gapSeconds = longestGapSeconds(readings, beganMs, nowMs)
  const under = cutInPa === null ? readings : lastStretchUnder(readings, cutInPa - UNDER_PA)
  const first = under[0]
  const last = under.at(-1)
  const underSeconds = first === undefined || last === undefined ? 0 : (last.atMs - first.atMs) / 1000
  const started = runs.some(({ startedAtMs }) => startedAtMs >= (first?.atMs ?? beganMs))
  const pumped = started || under.some(({ pumpOn }) => pumpOn === true)
  const figures: Judged['figures'] = [
    { name: 'Lowest vacuum', value: lowest(readings), unit: 'Pa' },
    { name: cutInPa === null ? 'Watched for' : 'Under the cut-in for', value: underSeconds, unit: 's' },
    { name: 'Longest without a reading', value: Number.isFinite(gapSeconds) ? gapSeconds : null, unit: 's' },
    { name: 'Starts seen', value: runs.length, unit: 'count' },
  ]
  if (gapSeconds > Math.max(180, 3 * intervalSeconds))
    return {
      outcome: 'failed',
      figures,
      reason:
        'The readings stopped with the breaker. Feed the logger from a supply of its own that stays on, fused, and not from the pump’s breaker; then begin again.',
    }
  if (first === undefined)
    return {
      outcome: 'cannot-tell',
      figures,
      reason:
        'The vacuum is not well under the cut-in yet. With the breaker off, flush until the gauge is at least an inch under where the pump would start.',
    }
  if (pumped)
    return {
      outcome: 'failed',
      figures,
      reason:
        'The pump started. That was not its breaker, or it has a second feed such as a battery charger or an inverter: find it, mark it, and begin again.',
    }
  if (underSeconds < UNDER_SECONDS)
    return { outcome: 'cannot-tell', figures, reason: 'So far so good: leave it off a minute longer.' }
  return {
    outcome: 'passed',
    figures,
    reason:
      'The pump stayed off under its cut-in and the readings went on. Breaker back on when you are done.',
  }
}

/** The readings of the last unbroken stretch under a level, Pa. */
function lastStretchUnder(readings: readonly Reading[], levelPa: number): readonly Reading[] {
  const measured = readings.filter(({ vacuumPa }) => vacuumPa !== null)
  const lastOver = measured.findLastIndex(({ vacuumPa }) => vacuumPa !== null && vacuumPa > levelPa)
  return measured.slice(lastOver + 1)
}

function lowest(readings: readonly Reading[]): number | null {
  const values = readings.flatMap(({ vacuumPa }) => (vacuumPa === null ? [] : [vacuumPa]))
  return values.length === 0 ? null : Math.min(...values)
}
