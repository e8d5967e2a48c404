import { labelHolds } from '../hold-time'
import type { Instant } from '../fold/types'
import { dropSpread, type DropSpread } from './drops'
import { eveningOf, localHour } from './local-time'
import type { OutlookInput } from './types'

const DAY_MS = 86_400_000
const HABIT_DAYS = 7

export interface FlushEvent {
  at: Instant
  /** How far it drew the vacuum down, Pa; null where nothing measures it: it starts the pump. */
  dropPa: number | null
  /** Whether the pump started: then sparse samples missed the bottom, and the drop is the least it was. */
  startedPump: boolean
}

export interface Habit {
  /** Flushes an hour by hour of the boat's day, on days with people aboard. */
  perHour: readonly number[]
  /** Null: every flush is taken to start the pump. */
  drops: DropSpread | null
  /** Share of the last evenings with people aboard; one half with nothing to go by. */
  aboardShare: number
}

/**
 * Flushes as they were: those that the vacuum told, or, for a logger without it, starts of the pump that were
 * probably a flush's by the length of hold and run.
 */
export function flushEvents(
  input: Pick<OutlookInput, 'seesFlushes' | 'flushes' | 'holds' | 'runs' | 'at'>,
): FlushEvent[] {
  if (input.seesFlushes) return input.flushes.filter((flush) => flush.at <= input.at)
  return labelHolds(input, input.at - 14 * DAY_MS, 400)
    .filter((hold) => hold.ifFlush > hold.ifLeak)
    .map((hold) => ({ at: hold.endedAt, dropPa: null, startedPump: true }))
}

/**
 * The habit of the last week: flushes by hour, smoothed a little over neighbouring hours, over the days on which
 * anybody flushed. No flush at all: no flushes an hour, and drops that start the pump.
 */
export function habitOf(input: OutlookInput, events: readonly FlushEvent[]): Habit {
  const from = input.at - HABIT_DAYS * DAY_MS
  const recent = events.filter((event) => event.at > from)
  const heardFrom = Math.max(from, Math.min(...input.holds.map((hold) => hold.startedAt), input.at))
  const days = Math.max(1, (input.at - heardFrom) / DAY_MS)
  const daysAboard = new Set(recent.map((event) => eveningOf(input.offsets, event.at))).size
  const worth = Math.min(days, Math.max(1, daysAboard))
  const counts = new Array<number>(24).fill(0)
  for (const event of recent) {
    const hour = localHour(input.offsets, event.at)
    counts[hour] = (counts[hour] ?? 0) + 1
  }
  const usual = recent.length / 24 / worth
  const count = (hour: number): number => counts[(hour + 24) % 24] ?? 0
  const perHour = counts.map((own, hour) => {
    const smooth = 0.6 * own + 0.2 * count(hour - 1) + 0.2 * count(hour + 1)
    return (smooth + 0.3 * Math.min(usual, 0.3)) / (worth + 0.3)
  })
  return {
    perHour: recent.length === 0 ? counts : perHour,
    drops: dropSpread(recent),
    aboardShare: recent.length === 0 ? 0.5 : Math.min(1, daysAboard / Math.max(1, Math.round(days))),
  }
}
