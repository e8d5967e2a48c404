import { dayAndClock, dayOf } from '@/components/time'
import type { FleetRow } from '@/shared/schemas'
import { formatDuration } from '@/shared/units'

/** How the leak is moving, in a few words with their day: "worse since Sun 22 Nov". */
export function movingWords(row: FleetRow, nowMs: number): string {
  const moving = row.moving
  if (moving === null) return ''
  const since = moving.since
  switch (moving.word) {
    case 'steady':
      return 'steady'
    case 'worse':
    case 'better':
      return since ? `${moving.word} since ${dayOf(since, row.utcOffsetSeconds, nowMs)}` : moving.word
    case 'stepped':
      return since ? `stepped ${dayAndClock(since, row.utcOffsetSeconds, nowMs)}` : 'stepped'
    case 'held-since-repair':
      return since
        ? `held since the repair of ${dayOf(since, row.utcOffsetSeconds, nowMs).slice(4)}`
        : 'held since the repair'
  }
}

const LIKELY = 0.5

/** What tonight brings, for a shop: "6 runs", "quiet if flushed last thing", "quiet". */
export function tonightWords(row: FleetRow): string {
  if (row.state === 'short-cycling' && row.holdTime)
    return `all night, every ${formatDuration(row.holdTime.seconds)}`
  const tonight = row.tonight
  if (tonight === null || (tonight.chance === null && tonight.chanceIfFlushedLast === null)) return ''
  if ((tonight.chanceIfFlushedLast ?? 0) >= LIKELY) {
    const runs = Math.max(1, Math.round(tonight.expectedRuns ?? 1))
    return `${runs} ${runs === 1 ? 'run' : 'runs'}`
  }
  return (tonight.chance ?? 0) >= LIKELY ? 'quiet if flushed last thing' : 'quiet'
}

/** A boat's name as one row: with its system's where it has several. */
export const rowName = (row: FleetRow): string =>
  row.systemName ? `${row.name} · ${row.systemName}` : row.name
