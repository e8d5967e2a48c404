/** Over this the times of an upload are shifted; under it they are taken as sent. */
const SHIFT_OVER_SECONDS = 120
/** A clock measured within so much of the last shift has not been set since: the difference is the network's. */
const SAME_CLOCK_SECONDS = 30

/**
 * The logger's clock minus ours at receipt, by the request's `Date` header (whole seconds; RFC 9110 section 6.6.1).
 * @returns seconds, or null when the header is missing or unreadable.
 */
export function clockOffsetSeconds(header: string | null, receiptMs: number): number | null {
  const said = header === null ? NaN : Date.parse(header)
  return Number.isFinite(said) ? (said - receiptMs) / 1000 : null
}

/**
 * What an upload's times are shifted by. The same shift is used again while the clock stands as it stood, so that a
 * pack sent twice falls on the same times; a new one is rounded to the header's own resolution.
 * @param lastShiftSeconds of the logger's last shifted upload, or null.
 */
export function shiftSeconds(offsetSeconds: number | null, lastShiftSeconds: number | null): number {
  if (offsetSeconds === null || Math.abs(offsetSeconds) <= SHIFT_OVER_SECONDS) return 0
  if (lastShiftSeconds !== null && Math.abs(offsetSeconds - lastShiftSeconds) <= SAME_CLOCK_SECONDS)
    return lastShiftSeconds
  return Math.round(offsetSeconds)
}
