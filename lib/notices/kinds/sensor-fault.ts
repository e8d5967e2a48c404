import { absent, unclear, type Finding, type JudgedRecord } from '@/lib/notices/record'

const STANDS_MS = 24 * 3_600_000

/** A fault of the vacuum sensor in the last day of readings. Over after a day of readings without one. */
export function sensorFault(record: JudgedRecord): Finding {
  const { figures, faults } = record
  if (figures.current === null) return unclear
  const since = figures.current.at - STANDS_MS
  const fault = faults.findLast((one) => one.endedAt >= since)
  if (fault === undefined) return absent
  return { is: 'present', severity: 1, reason: sentence(fault.detail), evidence: { fault: fault.detail } }
}

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)
