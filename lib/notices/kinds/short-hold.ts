import { formatDuration } from '@/shared/units'
import {
  absent,
  HOLDS_NEEDED,
  isFresh,
  isRecent,
  MARGIN,
  tellingSeconds,
  unclear,
  type Finding,
  type JudgedRecord,
} from '@/lib/notices/record'

/** Holds of the last two days count: older ones say how it was. */
const RECENT_HOURS = 48

/**
 * Hold time under the limit, shown by three holds in a row or by an interval wholly under it. Over, once three
 * holds in a row and the estimate pass the limit with a margin.
 */
export function shortHold(record: JudgedRecord): Finding {
  const { figures, settings } = record
  const limit = settings.limitSeconds
  const { holdTime } = figures
  const lastThree = tellingSeconds(record, limit * MARGIN).slice(-HOLDS_NEEDED)
  if (isOver(lastThree, holdTime?.seconds ?? null, limit)) return absent
  if (!isFresh(record, RECENT_HOURS) || holdTime === null) return unclear
  const byInterval = holdTime.bound === null && holdTime.high !== null && holdTime.high < limit
  const lastLeak = record.holds.findLast((hold) => hold.ending === 'leak' && !hold.setAside)
  const byHolds =
    lastLeak !== undefined &&
    isRecent(lastLeak.endedAt, record.now, RECENT_HOURS) &&
    lastThree.length === HOLDS_NEEDED &&
    lastThree.every((seconds) => seconds < limit) &&
    holdTime.low < limit
  if (!byInterval && !byHolds) return unclear
  return {
    is: 'present',
    severity: limit / Math.max(1, holdTime.seconds),
    reason: `Holds ${formatDuration(holdTime.seconds)}, under the limit of ${formatDuration(limit)}`,
    evidence: {
      holdSeconds: holdTime.seconds,
      holdLowSeconds: holdTime.low,
      holdHighSeconds: holdTime.high,
      limitSeconds: limit,
      holds: byHolds ? HOLDS_NEEDED : holdTime.holds,
      ratePaPerHour: figures.leakRate?.paPerHour ?? null,
    },
  }
}

function isOver(lastThree: number[], estimate: number | null, limit: number): boolean {
  return (
    lastThree.length === HOLDS_NEEDED &&
    lastThree.every((seconds) => seconds >= limit * MARGIN) &&
    (estimate === null || estimate >= limit * MARGIN)
  )
}
