import { mannKendall, median, medianAbsoluteDeviation, type Point, theilSen } from '@/lib/analysis/statistics'

/** Leak rate of one day; `at` is its middle, epoch milliseconds. */
export type DailyRate = { at: number; paPerHour: number }

/** When the fitted rate crosses the limit, epoch milliseconds; `high` is null beyond sight. */
export type LimitCrossing = { at: number; low: number; high: number | null }

export type RateTrend = {
  /** Of ln(rate), a day; 0.01 is one per cent a day. */
  slopePerDay: number
  low: number | null
  high: number | null
  /** Two-sided Mann–Kendall. */
  pValue: number
  /** Whether there is a trend at all. */
  isTrend: boolean
  /** Days in which it doubles (negative: halves); null without a trend. */
  doublingDays: number | null
  limitCrossing: LimitCrossing | null
  days: number
}

const DAY_MS = 86_400_000
const FEWEST_DAYS = 5
const SIGNIFICANT = 0.05
/** Nothing further off than this is foretold. */
const SIGHT_DAYS = 730
/** Standard error of a median of normal values over that of their mean. */
const MEDIAN_ERROR = 1.2533

/**
 * Trend of the leak rate over weeks: Theil–Sen slope of its logarithm with Gilbert's interval, Mann–Kendall
 * p, doubling time, and the date at which a worsening boat crosses the limit. Without a trend (p over 0.05,
 * or an interval with nought in it) doubling and crossing are null. Days without a positive rate are left
 * out; fewer than five others, or all alike in time: null.
 * @param limitPaPerHour rate at which the hold time is the limit; null = not known
 * @example rateTrend(days, 2032)?.doublingDays // 21.4
 */
export function rateTrend(daily: readonly DailyRate[], limitPaPerHour: number | null): RateTrend | null {
  const known = daily.filter(
    (day) => Number.isFinite(day.at) && Number.isFinite(day.paPerHour) && day.paPerHour > 0,
  )
  const origin = known[0]?.at ?? 0
  const points = known.map((day) => ({ x: (day.at - origin) / DAY_MS, y: Math.log(day.paPerHour) }))
  const line = theilSen(points)
  if (points.length < FEWEST_DAYS || line === null) return null
  // All rates alike is no trend, and known for certain.
  const pValue = mannKendall(points)?.pValue ?? 1
  const { slope, low, high } = line
  const isTrend = pValue < SIGNIFICANT && low !== null && high !== null && low * high > 0
  return {
    slopePerDay: slope,
    low,
    high,
    pValue,
    isTrend,
    doublingDays: isTrend ? Math.LN2 / slope : null,
    limitCrossing: isTrend && limitPaPerHour !== null ? crossing(line, limitPaPerHour, points, origin) : null,
    days: points.length,
  }
}

/**
 * Where the line through the middle of the record meets the limit. The interval takes the doubt of the slope
 * (its own interval) and of the middle (the scatter of days about the line) together.
 */
function crossing(
  line: { slope: number; low: number | null; high: number | null },
  limitPaPerHour: number,
  points: readonly Point[],
  origin: number,
): LimitCrossing | null {
  if (!(line.slope > 0) || !(limitPaPerHour > 0)) return null
  const rests = points.map((point) => point.y - line.slope * point.x)
  const middleDay = median(points.map((point) => point.x)) ?? 0
  const middleLog = (median(rests) ?? 0) + line.slope * middleDay
  const firstDay = Math.min(...points.map((point) => point.x))
  const horizon = Math.max(...points.map((point) => point.x)) + SIGHT_DAYS
  const dayAt = (slope: number) => middleDay + (Math.log(limitPaPerHour) - middleLog) / slope
  const day = dayAt(line.slope)
  // Over the limit since before the record began: nothing is crossed that could be dated.
  if (day < firstDay || day > horizon) return null
  const scatter = medianAbsoluteDeviation(rests) ?? 0
  const middleDays = (1.96 * MEDIAN_ERROR * scatter) / Math.sqrt(points.length) / line.slope
  const ends = [line.low, line.high].flatMap((slope) => (slope !== null && slope > 0 ? [dayAt(slope)] : []))
  const earlier = Math.max(0, ...ends.map((end) => day - end))
  const later = ends.length < 2 ? null : Math.max(0, ...ends.map((end) => end - day))
  const high = later === null ? null : day + Math.hypot(later, middleDays)
  return {
    at: origin + day * DAY_MS,
    low: origin + (day - Math.hypot(earlier, middleDays)) * DAY_MS,
    high: high === null || high > horizon ? null : origin + high * DAY_MS,
  }
}
