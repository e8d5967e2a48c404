import { MS_PER_DAY, MS_PER_HOUR, MS_PER_SECOND } from '@/simulator/physics/constants'
import type { Span } from '@/simulator/physics/leaks'

/** Instants of a place by day and local hour; day 0 is that of the anchor. */
export type Calendar = {
  anchorMs: number
  offsetSeconds: number
  /** `at(-9, 9.5)` is half past nine in the morning nine days ago. */
  at: (day: number, hour: number) => number
  /** One span a day between two local hours, an end over 24 being on the next day. */
  daily: (
    fromDay: number,
    toDay: number,
    fromHour: number,
    toHour: number,
    keep?: (day: number) => boolean,
  ) => Span[]
  /** 0 = Sunday. */
  weekday: (day: number) => number
}

export function calendarOf(anchorMs: number, offsetSeconds: number): Calendar {
  const localAnchor = anchorMs + offsetSeconds * MS_PER_SECOND
  const midnight = Math.floor(localAnchor / MS_PER_DAY) * MS_PER_DAY - offsetSeconds * MS_PER_SECOND
  const at = (day: number, hour: number): number =>
    midnight + day * MS_PER_DAY + Math.round(hour * MS_PER_HOUR)
  return {
    anchorMs,
    offsetSeconds,
    at,
    daily: (fromDay, toDay, fromHour, toHour, keep = () => true) =>
      Array.from({ length: toDay - fromDay + 1 }, (_, index) => fromDay + index)
        .filter(keep)
        .map((day) => ({ from: at(day, fromHour), to: at(day, toHour) })),
    weekday: (day) => new Date(midnight + offsetSeconds * MS_PER_SECOND + day * MS_PER_DAY).getUTCDay(),
  }
}

export type HarbourZone = { timeZone: string; offsetSeconds: number }

/**
 * The fixed zone in which it is now between 20:00 and 21:00, so that a demo always begins in the evening.
 * In these zones' names the sign is turned round: `Etc/GMT+5` is five hours behind UTC.
 */
export function eveningZone(nowMs: number): HarbourZone {
  const utcHour = Math.floor(nowMs / MS_PER_HOUR) % 24
  let hours = 20 - utcHour
  if (hours > 14) hours -= 24
  const sign = hours > 0 ? '-' : '+'
  return {
    timeZone: hours === 0 ? 'Etc/GMT' : `Etc/GMT${sign}${Math.abs(hours)}`,
    offsetSeconds: hours * 3600,
  }
}
