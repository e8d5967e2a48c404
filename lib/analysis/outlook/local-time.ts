import type { Instant } from '../fold/types'
import type { OffsetSpan } from './types'

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS

/** Offset in force at an instant, s: that of the last span at or before it (of the first, before all; 0 with none). */
export function offsetSecondsAt(offsets: readonly OffsetSpan[], at: Instant): number {
  let seconds = offsets[0]?.seconds ?? 0
  for (const span of offsets) if (span.from <= at) seconds = span.seconds
  return seconds
}

/** Hour of the boat's day, 0 to 23. */
export function localHour(offsets: readonly OffsetSpan[], at: Instant): number {
  const local = at + offsetSecondsAt(offsets, at) * 1000
  return Math.floor((((local % DAY_MS) + DAY_MS) % DAY_MS) / HOUR_MS)
}

/** Number of the boat's day (days since 1970-01-01, local), a night before noon counted to the evening before. */
export function eveningOf(offsets: readonly OffsetSpan[], at: Instant): number {
  return Math.floor((at + offsetSecondsAt(offsets, at) * 1000 - 12 * HOUR_MS) / DAY_MS)
}

/** 17:00 by the boat's clock on the evening that a night belongs to. */
export function eveningStart(offsets: readonly OffsetSpan[], nightFrom: Instant): Instant {
  const localMs = eveningOf(offsets, nightFrom) * DAY_MS + 17 * HOUR_MS
  return localMs - offsetSecondsAt(offsets, nightFrom) * 1000
}
