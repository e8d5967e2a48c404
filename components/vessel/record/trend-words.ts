import { dayOf } from '@/components/time'
import type { Trend } from '@/shared/schemas'
import { formatDuration } from '@/shared/units'

const DAY_SECONDS = 86_400
const SIGNIFICANT = 0.05

const days = (count: number): string => formatDuration(Math.abs(count) * DAY_SECONDS)
const chance = (pValue: number): string =>
  pValue < 0.001 ? 'p under 0.001' : `p ${Number(pValue.toPrecision(2))}`

/**
 * Where the leak goes, in words: "The leak grows: it doubles in 21 days (p 0.004). At that pace the hold time
 * falls under the limit of 3 h about Tue 1 Dec (between Fri 20 Nov and Mon 14 Dec)."
 */
export function trendWords(trend: Trend, limitSeconds: number, offsetSeconds: number, nowMs: number): string {
  const { slopePerDay, doublingDays, pValue, limitCrossing } = trend
  if (slopePerDay === null || pValue === null)
    return 'There are not yet enough days to say where the leak is going.'
  if (doublingDays === null || pValue >= SIGNIFICANT)
    return `No trend in the leak over the last 90 days (${chance(pValue)}).`
  if (doublingDays < 0) return `The leak shrinks: it halves in ${days(doublingDays)} (${chance(pValue)}).`
  const grows = `The leak grows: it doubles in ${days(doublingDays)} (${chance(pValue)}).`
  if (limitCrossing === null) return grows
  const on = (instant: string) => dayOf(instant, offsetSeconds, nowMs)
  const { at, low, high } = limitCrossing
  const interval =
    low === null ? '' : high === null ? ` (not before ${on(low)})` : ` (between ${on(low)} and ${on(high)})`
  const limit = formatDuration(limitSeconds)
  return Date.parse(at) <= nowMs
    ? `${grows} The hold time fell under the limit of ${limit} about ${on(at)}${interval}.`
    : `${grows} At that pace the hold time falls under the limit of ${limit} about ${on(at)}${interval}.`
}
