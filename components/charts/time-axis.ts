import { clock, dayOf, offsetAt, type ZoneOffset } from '@/components/time'

/** Steps of the time axis in seconds, up to a fortnight; longer ones go by calendar months. */
const STEPS = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200, 10_800, 21_600, 43_200]
const DAY = 86_400
const DAY_STEPS = [DAY, 2 * DAY, 7 * DAY, 14 * DAY]
const MONTH = 30.4 * DAY

/** The smallest step that leaves at most `most` marks; Infinity stands for months. */
export function timeStep(fromSeconds: number, toSeconds: number, most: number): number {
  const length = toSeconds - fromSeconds
  return [...STEPS, ...DAY_STEPS].find((step) => length / step <= most) ?? Infinity
}

function monthSplits(from: number, to: number, offsets: readonly ZoneOffset[], most: number): number[] {
  const every = [1, 2, 3, 6, 12].find((months) => (to - from) / (months * MONTH) <= most) ?? 12
  const start = new Date(from * 1000)
  const splits: number[] = []
  for (let month = 0; month < 1200; month += 1) {
    const local = Date.UTC(start.getUTCFullYear(), start.getUTCMonth() + month, 1) / 1000
    const at = local - offsetAt(offsets, local * 1000)
    if (at > to) break
    if (at >= from && new Date(local * 1000).getUTCMonth() % every === 0) splits.push(at)
  }
  return splits
}

/**
 * Marks of a time axis on round times of the boat's own clock, epoch seconds, also across a clock change.
 * `timeSplits(0, 7200, [], 3) // [0, 3600, 7200]`
 */
export function timeSplits(
  fromSeconds: number,
  toSeconds: number,
  offsets: readonly ZoneOffset[],
  most: number,
): number[] {
  const step = timeStep(fromSeconds, toSeconds, most)
  if (step === Infinity) return monthSplits(fromSeconds, toSeconds, offsets, most)
  const splits: number[] = []
  const first = Math.floor((fromSeconds + offsetAt(offsets, fromSeconds * 1000)) / step) * step
  for (let local = first; splits.length <= most * 2; local += step) {
    // The offset in force is asked at the mark itself; near a change the first guess may be the other side's.
    const guess = local - offsetAt(offsets, (local - offsetAt(offsets, local * 1000)) * 1000)
    if (guess > toSeconds) break
    if (guess >= fromSeconds && guess !== splits[splits.length - 1]) splits.push(guess)
  }
  return splits
}

/** What stands at each mark: the clock, and the day under the first mark and wherever a new one begins. */
export function timeLabels(splits: readonly number[], offsets: readonly ZoneOffset[]): string[] {
  const gap = (splits[1] ?? Infinity) - (splits[0] ?? 0)
  const step = Number.isFinite(gap) ? gap : 60
  let lastDay = ''
  return splits.map((split) => {
    const offset = offsetAt(offsets, split * 1000)
    const day = dayOf(split * 1000, offset)
    if (step > 20 * DAY)
      return `${day.split(' ')[2] ?? ''} ${new Date((split + offset) * 1000).getUTCFullYear()}`
    if (step >= 20 * 3600) return step > 3 * DAY ? day.slice(4) : day
    const isNew = day !== lastDay
    lastDay = day
    const time = clock(split * 1000, offset, step < 60)
    return isNew ? `${time}\n${day}` : time
  })
}
