import type { StoredFlush, StoredHold, StoredRun } from '@/db/queries/record-rows'
import type { Figures } from '@/lib/analysis/figures'
import type { RecordEvidence } from '@/lib/messages/evidence'
import type { NoticeKind } from '@/shared/schemas/words'

/** What a system's notices are judged by: plain data, times epoch milliseconds, rows oldest first. */
export interface JudgedRecord {
  now: number
  figures: Figures
  settings: {
    limitSeconds: number
    cutOutPa: number | null
    cutInPa: number | null
    lowSupplyV: number | null
  }
  runs: readonly StoredRun[]
  holds: readonly StoredHold[]
  flushes: readonly StoredFlush[]
  faults: readonly { kind: string; startedAt: number; endedAt: number; detail: string }[]
  /** Supply voltage of the last half hour while the pump was off, and the newest air; null = not measured. */
  supply: { lowestV: number; highestV: number; count: number } | null
  air: { at: number; airC: number } | null
}

/**
 * Whether what a kind of notice is about is there. `unclear`: neither enough to open nor, with the margin, to
 * end; what stands stays.
 */
export interface Finding {
  is: 'present' | 'absent' | 'unclear'
  /** Grows with the trouble; told again when it has grown by half. */
  severity: number
  reason: string
  evidence: RecordEvidence
}

/** Kinds judged from the record at each upload; the others come with the evening, the hour or the silence. */
export const JUDGED_KINDS = [
  'sensor-fault',
  'running-on',
  'no-start',
  'short-cycling',
  'short-hold',
  'slow-recharge',
  'switch-drift',
  'low-supply',
  'freeze',
] as const satisfies NoticeKind[]
export type JudgedKind = (typeof JUDGED_KINDS)[number]

/** A notice ends only past its limit by this margin. */
export const MARGIN = 1.15
export const HOLDS_NEEDED = 3
const HOUR_MS = 3_600_000

export const absent: Finding = { is: 'absent', severity: 0, reason: '', evidence: {} }
export const unclear: Finding = { is: 'unclear', severity: 0, reason: '', evidence: {} }

export const secondsOf = (hold: { startedAt: number; endedAt: number }): number =>
  (hold.endedAt - hold.startedAt) / 1000

/** Is the newest reading no older than so many hours? */
export const isFresh = ({ figures, now }: JudgedRecord, hours: number): boolean =>
  figures.current !== null && now - figures.current.at <= hours * HOUR_MS

/** Is an instant no further back than so many hours? */
export const isRecent = (at: number, now: number, hours: number): boolean => now - at <= hours * HOUR_MS

/**
 * Lengths of the holds that tell whether a system holds `seconds`, oldest first: those the leak ended, and those a
 * flush cut short only after that. The open hold tells once it has lasted so long.
 */
export function tellingSeconds(record: JudgedRecord, seconds: number): number[] {
  const closed = record.holds
    .filter((hold) => !hold.setAside)
    .filter((hold) => hold.ending === 'leak' || (hold.ending === 'flush' && secondsOf(hold) >= seconds))
    .map(secondsOf)
  const open = record.figures.current?.holdSoFarSeconds ?? null
  return open !== null && open >= seconds ? [...closed, open] : closed
}
