import { absent, isFresh, unclear, type Finding, type JudgedRecord } from '@/lib/notices/record'

const FRESH_HOURS = 6
/** The flush that took the vacuum away lies just before the stretch without one. */
const BEFORE_MS = 15 * 60_000

/**
 * Somebody flushed, there is no vacuum and the pump did not start. Without a flush it is merely off, which is
 * nobody's news: most pumps that are off were switched off.
 */
export function noStart(record: JudgedRecord): Finding {
  const { figures, flushes } = record
  if (figures.state !== 'off') return figures.current === null ? unclear : absent
  if (figures.since === null || !isFresh(record, FRESH_HOURS)) return unclear
  const from = figures.since - BEFORE_MS
  const flushed = flushes.findLast((flush) => flush.at >= from && !flush.startedPump)
  if (flushed === undefined) return unclear
  return {
    is: 'present',
    severity: 1,
    reason: 'Somebody flushed, there is no vacuum, and the pump did not start',
    evidence: { sinceAt: new Date(flushed.at).toISOString() },
  }
}
