import { median } from '@/lib/analysis/statistics'
import type { Reading } from './types'

/** The vacuum readings at or after an instant, Pa, in their order. */
export const vacuumSince = (readings: readonly Reading[], sinceMs: number): number[] =>
  readings.flatMap(({ atMs, vacuumPa }) => (atMs >= sinceMs && vacuumPa !== null ? [vacuumPa] : []))

/** Middle value; NaN of nothing. `middle([3, 1, 2]) // 2` */
export const middle = (values: readonly number[]): number => median(values) ?? Number.NaN

/** Largest minus smallest; 0 of nothing. `spread([3, 1, 2]) // 2` */
export const spread = (values: readonly number[]): number =>
  values.length === 0 ? 0 : Math.max(...values) - Math.min(...values)

/** The longest time between one reading and the next, to `endMs` included, in seconds; Infinity of none. */
export function longestGapSeconds(readings: readonly Reading[], beganMs: number, endMs: number): number {
  if (readings.length === 0) return Infinity
  let before = beganMs
  let longest = 0
  for (const { atMs } of readings) {
    longest = Math.max(longest, atMs - before)
    before = atMs
  }
  return Math.max(longest, endMs - before) / 1000
}
