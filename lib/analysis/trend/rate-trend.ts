import { mannKendall, median, theilSen } from '@/lib/analysis/statistics'

/** Leak rate of one day; `at` is its middle, epoch milliseconds. */
export type DailyRate = { at: number; paPerHour: number }

/** When the fitted rate crosses the limit, epoch milliseconds; null where an end is beyond sight. */
export type LimitCrossing = { at: number; low: number | null; high: number | null }

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
  const pivot = {
    x: median(points.map((point) => point.x)) ?? 0,
    y: median(points.map((point) => point.y)) ?? 0,
  }
  return {
    slopePerDay: slope,
    low,
    high,
    pValue,
    isTrend,
    doublingDays: isTrend ? Math.LN2 / slope : null,
    limitCrossing:
      isTrend && limitPaPerHour !== null ? crossing(line, pivot, limitPaPerHour, points, origin) : null,
    days: points.length,
  }
}

/** Where the line through the middle of the record meets the limit, and where its steepest and flattest do. */
function crossing(
  line: { slope: number; low: number | null; high: number | null },
  pivot: { x: number; y: number },
  limitPaPerHour: number,
  points: readonly { x: number }[],
  origin: number,
): LimitCrossing | null {
  if (!(line.slope > 0) || !(limitPaPerHour > 0)) return null
  const firstDay = Math.min(...points.map((point) => point.x))
  const lastDay = Math.max(...points.map((point) => point.x))
  const dayAt = (slope: number) => pivot.x + (Math.log(limitPaPerHour) - pivot.y) / slope
  const day = dayAt(line.slope)
  // Over the limit since before the record began: nothing is crossed that could be dated.
  if (day < firstDay || day > lastDay + SIGHT_DAYS) return null
  const ends = [line.low, line.high].map((slope) => (slope !== null && slope > 0 ? dayAt(slope) : null))
  const inSight = ends.map((end) =>
    end === null || end > lastDay + SIGHT_DAYS ? null : origin + end * DAY_MS,
  )
  const [a, b] = inSight
  const at = origin + day * DAY_MS
  const known = [a, b].filter((end): end is number => typeof end === 'number')
  return {
    at,
    low: known.length === 0 ? null : Math.min(at, ...known),
    high: known.length < 2 ? null : Math.max(at, ...known),
  }
}
