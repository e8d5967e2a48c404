/**
 * Times as people on the boat read them. Offsets from UTC come from the server as data: the browser's own
 * copy of the zone rules may be a year old and is never asked.
 */

/** From `from` (RFC 3339 or epoch ms) on, local time is UTC plus `seconds`. */
export type ZoneOffset = { from: string | number; seconds: number }

const DAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'] as const
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const
const DAY_MS = 86_400_000

export type TimeLike = string | number
/** RFC 3339 text or epoch milliseconds to epoch milliseconds. */
export const toMs = (time: TimeLike): number => (typeof time === 'number' ? time : Date.parse(time))

/**
 * Seconds to add to UTC at an instant. Before the first entry the first one serves; an empty table is UTC.
 * `offsetAt([{ from: 0, seconds: 3600 }], 5) // 3600`
 */
export function offsetAt(offsets: readonly ZoneOffset[], atMs: number): number {
  let seconds = offsets[0]?.seconds ?? 0
  for (const offset of offsets) if (toMs(offset.from) <= atMs) seconds = offset.seconds
  return seconds
}

const shifted = (time: TimeLike, offsetSeconds: number): Date => new Date(toMs(time) + offsetSeconds * 1000)
const two = (value: number): string => String(value).padStart(2, '0')

/** `clock(0, 3600) // "01:00"` */
export function clock(time: TimeLike, offsetSeconds: number, withSeconds = false): string {
  const at = shifted(time, offsetSeconds)
  const text = `${two(at.getUTCHours())}:${two(at.getUTCMinutes())}`
  return withSeconds ? `${text}:${two(at.getUTCSeconds())}` : text
}

/** `dayOf(0, 0) // "Thu 1 Jan"`; the year is said only when it is not `yearOf`'s. */
export function dayOf(time: TimeLike, offsetSeconds: number, nowMs?: number): string {
  const at = shifted(time, offsetSeconds)
  const day = `${DAYS[at.getUTCDay()]} ${at.getUTCDate()} ${MONTHS[at.getUTCMonth()]}`
  if (nowMs === undefined || shifted(nowMs, offsetSeconds).getUTCFullYear() === at.getUTCFullYear())
    return day
  return `${day} ${at.getUTCFullYear()}`
}

/** A calendar date as it stands: `dayOfDate('2026-12-01') // "Tue 1 Dec"`. */
export const dayOfDate = (date: string): string => dayOf(`${date}T00:00:00Z`, 0)
/** `weekdayOfDate('2026-12-01') // "Tue"` */
export const weekdayOfDate = (date: string): string => dayOfDate(date).slice(0, 3)

const dayNumber = (time: TimeLike, offsetSeconds: number): number =>
  Math.floor((toMs(time) + offsetSeconds * 1000) / DAY_MS)

/**
 * The time, and the day when it is not today's: "23:40", "Tue 23:40" within six days, else "Tue 1 Dec, 23:40".
 */
export function dayAndClock(time: TimeLike, offsetSeconds: number, nowMs: number): string {
  const away = Math.abs(dayNumber(time, offsetSeconds) - dayNumber(nowMs, offsetSeconds))
  if (away === 0) return clock(time, offsetSeconds)
  if (away <= 6) return `${dayOf(time, offsetSeconds).slice(0, 3)} ${clock(time, offsetSeconds)}`
  return `${dayOf(time, offsetSeconds, nowMs)}, ${clock(time, offsetSeconds)}`
}

/** Whole units, the largest that fits: "40 s", "3 min", "9 h", "12 days". */
export function span(seconds: number): string {
  const length = Math.abs(seconds)
  if (length < 59.5) return `${Math.round(length)} s`
  if (length < 3570) return `${Math.round(length / 60)} min`
  if (length < 48 * 3600) return `${Math.round(length / 3600)} h`
  return `${Math.round(length / 86_400)} days`
}

/** `ago(0, 120_000) // "2 min ago"`; under five seconds it is "now". */
export function ago(time: TimeLike, nowMs: number): string {
  const seconds = (nowMs - toMs(time)) / 1000
  return seconds < 5 ? 'now' : `${span(seconds)} ago`
}

/** `until(7_200_000, 0) // "in 2 h"` */
export function until(time: TimeLike, nowMs: number): string {
  const seconds = (toMs(time) - nowMs) / 1000
  return seconds < 5 ? 'now' : `in ${span(seconds)}`
}

/** Minutes after 18:00 to a clock face: `clockOfMinute(0) // "18:00"`. */
export function clockOfMinute(minuteAfterSix: number): string {
  const minute = (((Math.round(minuteAfterSix) + 18 * 60) % 1440) + 1440) % 1440
  return `${two(Math.floor(minute / 60))}:${two(minute % 60)}`
}
