import type { ScatterPoint } from '@/components/charts/scatter-plot'
import type { Run } from '@/shared/schemas'

/** What a day of the pump came to; `date` is the boat's own calendar date. */
export type PumpDay = {
  date: string
  runs: number
  byItself: number
  seconds: number
  ampHours: number | null
}

/**
 * Runs gathered by the boat's own days, oldest first. `pumpAmps` null leaves the ampere-hours unknown.
 * A run counts wholly on the day it began.
 */
export function pumpDays(runs: readonly Run[], offsetSeconds: number, pumpAmps: number | null): PumpDay[] {
  const days = new Map<string, PumpDay>()
  for (const run of runs) {
    const date = new Date(Date.parse(run.startedAt) + offsetSeconds * 1000).toISOString().slice(0, 10)
    const day = days.get(date) ?? { date, runs: 0, byItself: 0, seconds: 0, ampHours: null }
    day.runs += 1
    if (run.trigger === 'leak') day.byItself += 1
    day.seconds += run.durationSeconds
    day.ampHours = pumpAmps === null ? null : (day.seconds / 3600) * pumpAmps
    days.set(date, day)
  }
  return [...days.values()].sort((a, b) => (a.date < b.date ? -1 : 1))
}

/** How fast each run by itself raised the vacuum, Pa/s; such runs refill one differential and are all alike. */
export function rechargePoints(runs: readonly Run[]): ScatterPoint[] {
  return runs.flatMap((run): ScatterPoint[] => {
    const { vacuumAtStartPa: start, vacuumAtStopPa: stop } = run
    if (run.trigger !== 'leak' || start === null || stop === null || run.durationSeconds <= 0) return []
    return [
      {
        atMs: Date.parse(run.startedAt),
        value: (stop - start) / run.durationSeconds,
        shape: 'full',
        tone: 'ink',
      },
    ]
  })
}

/** Days with data at the end of the list, and their mean: runs, minutes, ampere-hours a day. */
export function meanOfDays(
  days: readonly PumpDay[],
  last: number,
): { runs: number; seconds: number; ampHours: number | null } | null {
  const taken = days.slice(-last)
  if (taken.length === 0) return null
  const sum = (pick: (day: PumpDay) => number) =>
    taken.reduce((total, day) => total + pick(day), 0) / taken.length
  const known = taken.every((day) => day.ampHours !== null)
  return {
    runs: sum((day) => day.runs),
    seconds: sum((day) => day.seconds),
    ampHours: known ? sum((day) => day.ampHours ?? 0) : null,
  }
}
