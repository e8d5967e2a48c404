const SECOND = 1000
const MINUTE = 60 * SECOND
const HOUR = 60 * MINUTE
const DAY = 24 * HOUR

/** Widths people read easily; from an hour on whole hours, which the hourly rollup can give. */
const WIDTHS_MS = [
  ...[0.1, 0.2, 0.5, 1, 2, 5, 10, 15, 20, 30].map((n) => n * SECOND),
  ...[1, 2, 3, 5, 10, 15, 20, 30].map((n) => n * MINUTE),
  ...[1, 2, 3, 4, 6, 8, 12].map((n) => n * HOUR),
  ...[1, 2, 4, 7, 14, 28, 91, 182, 364, 3640, 36_400].map((n) => n * DAY),
]

/**
 * The finest width whose buckets, on its multiples, cover [from, to) in at most `points`.
 * @param fromMs, toMs epoch milliseconds, the earlier first
 * @example traceResolutionMs(0, 86_400_000, 1200) // 120_000
 */
export function traceResolutionMs(fromMs: number, toMs: number, points: number): number {
  const fits = (width: number) => Math.ceil(toMs / width) - Math.floor(fromMs / width) <= points
  // Two points or fewer may straddle a multiple of every width; the span itself is then the bucket.
  return WIDTHS_MS.find(fits) ?? Math.ceil(Math.max(toMs, 1) / DAY) * DAY
}
