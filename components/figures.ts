import { formatDuration, formatDurationRange, UNKNOWN } from '@/shared/units'

/**
 * A length of time with how sure it is: "2.2 h (1.9 to 2.6 h)"; where both ends read the same, by how much it
 * may be off: "1.4 h (± 2 min)". Without an upper end the lower one is a bound.
 */
export function durationWithInterval(seconds: number, low: number | null, high: number | null): string {
  const [value, interval] = durationAndInterval(seconds, low, high)
  return interval === '' ? value : `${value} (${interval})`
}

/** The same in two pieces, so that the figure can be set strong; the second is empty where nothing is known of it. */
export function durationAndInterval(
  seconds: number,
  low: number | null,
  high: number | null,
): [string, string] {
  const value = formatDuration(seconds)
  if (low === null || high === null) return [value, low === null ? '' : formatDurationRange(low, high)]
  if (formatDuration(low) !== formatDuration(high)) return [value, formatDurationRange(low, high)]
  return [value, `± ${roundedUp(Math.max(high - seconds, seconds - low, 1))}`]
}

/** A doubt is said no smaller than it is: whole minutes from a minute on. */
const roundedUp = (seconds: number): string =>
  seconds > 55 && seconds < 3600 ? `${Math.ceil(seconds / 60)} min` : formatDuration(Math.ceil(seconds))

/** Hold time as it stands in a row: bound, figure with interval, or a dash. */
export function holdWords(
  holdTime: { seconds: number; low: number | null; high: number | null; bound: 'at-least' | null } | null,
): string {
  if (holdTime === null) return UNKNOWN
  if (holdTime.bound === 'at-least') return `at least ${formatDuration(holdTime.seconds)}`
  return durationWithInterval(holdTime.seconds, holdTime.low, holdTime.high)
}
