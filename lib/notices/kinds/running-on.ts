import { absent, isFresh, unclear, type Finding, type JudgedRecord } from '@/lib/notices/record'

/** Told within the half hour or not at all: a pump that ran on yesterday needs nobody now. */
const FRESH_HOURS = 0.5

/** On for long past its learned recharge, and the vacuum does not rise. Over when the pump has stopped. */
export function runningOn(record: JudgedRecord): Finding {
  const { figures } = record
  if (figures.state === 'running-on') {
    if (!isFresh(record, FRESH_HOURS)) return unclear
    return {
      is: 'present',
      severity: 1,
      reason: sentence(figures.reason),
      evidence: { sinceAt: figures.since === null ? null : new Date(figures.since).toISOString() },
    }
  }
  return figures.current?.pumpOn === true ? unclear : absent
}

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)
