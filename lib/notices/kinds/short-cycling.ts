import { median } from 'simple-statistics'
import { formatDuration } from '@/shared/units'
import {
  absent,
  HOLDS_NEEDED,
  isRecent,
  MARGIN,
  secondsOf,
  tellingSeconds,
  unclear,
  type Finding,
  type JudgedRecord,
} from '@/lib/notices/record'

const LIMIT_SECONDS = 600
const RECENT_HOURS = 2

/** Three holds in a row, of the last two hours, that the leak ended within ten minutes. */
export function shortCycling(record: JudgedRecord): Finding {
  const { now, figures } = record
  // A logger without a vacuum channel cannot say what ended a hold; there the estimate has to agree.
  const byLength = figures.state === 'short-cycling'
  const own = record.holds.filter(
    (hold) => !hold.setAside && (hold.ending === 'leak' || (byLength && hold.ending === 'unknown')),
  )
  const lastThree = own.slice(-HOLDS_NEEDED)
  const seconds = lastThree.map(secondsOf)
  const last = lastThree.at(-1)
  const isShort =
    last !== undefined &&
    lastThree.length === HOLDS_NEEDED &&
    isRecent(last.endedAt, now, RECENT_HOURS) &&
    seconds.every((length) => length < LIMIT_SECONDS) &&
    !isInterrupted(record, lastThree)
  if (isShort) {
    const typical = median(seconds)
    return {
      is: 'present',
      severity: LIMIT_SECONDS / Math.max(1, typical),
      reason: `The pump starts again by itself every ${formatDuration(typical)}`,
      evidence: { holdSeconds: typical, limitSeconds: LIMIT_SECONDS, holds: HOLDS_NEEDED },
    }
  }
  const telling = tellingSeconds(record, LIMIT_SECONDS * MARGIN).slice(-HOLDS_NEEDED)
  const isOver =
    telling.length === HOLDS_NEEDED && telling.every((length) => length >= LIMIT_SECONDS * MARGIN)
  return isOver ? absent : unclear
}

/** A longer hold between them, whatever ended it, means that it is not cycling all the time. */
function isInterrupted(record: JudgedRecord, lastThree: readonly { startedAt: number }[]): boolean {
  const from = lastThree[0]?.startedAt ?? record.now
  return record.holds.some((hold) => hold.startedAt >= from && secondsOf(hold) >= LIMIT_SECONDS)
}
