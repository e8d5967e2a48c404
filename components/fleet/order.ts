import { rowName } from '@/components/fleet/fleet-words'
import { STATE_TONES, STATES } from '@/components/states'
import type { FleetRow } from '@/shared/schemas'

export const SORTS = ['worst', 'name', 'hold', 'tonight', 'heard', 'visit'] as const
export type Sort = (typeof SORTS)[number]
export const SORT_WORDS: Record<Sort, string> = {
  worst: 'Worst first',
  name: 'Name',
  hold: 'Shortest hold',
  tonight: 'Most runs tonight',
  heard: 'Longest unheard',
  visit: 'Next visit',
}

const collator = new Intl.Collator('en', { numeric: true, sensitivity: 'base' })
function byName(a: FleetRow, b: FleetRow): number {
  return collator.compare(rowName(a), rowName(b)) || Number(a.systemId) - Number(b.systemId)
}

const SEVERITY = new Map(STATES.map((state, index) => [state, index]))
const severity = (row: FleetRow): number => SEVERITY.get(row.state) ?? STATES.length
/** Attention, then weeping, then what stands still or is silent, then the calm. */
function band(row: FleetRow): number {
  const tone = STATE_TONES[row.state]
  if (tone === 'attention') return 0
  if (tone === 'buff-ink') return 1
  return row.state === 'tight' || row.state === 'laid-up' ? 3 : 2
}
const holdSeconds = (row: FleetRow): number => row.holdTime?.seconds ?? Infinity
const ashore = (row: FleetRow): number => (row.aboard === 'aboard' ? 0 : 1)
/** Differences of infinities are not numbers; equal ones are equal. */
const minus = (a: number, b: number): number => (a === b ? 0 : a - b)

/** Worst first; of two that are as bad, the one with people aboard before the one that wakes nobody. */
function byWorst(a: FleetRow, b: FleetRow): number {
  return (
    band(a) - band(b) ||
    ashore(a) - ashore(b) ||
    severity(a) - severity(b) ||
    minus(holdSeconds(a), holdSeconds(b)) ||
    byName(a, b)
  )
}

const instant = (text: string | null, missing: number): number => (text === null ? missing : Date.parse(text))
const runsTonight = (row: FleetRow): number =>
  (row.tonight?.expectedRuns ?? 0) + (row.tonight?.chanceIfFlushedLast ?? 0) / 1000

const COMPARE: Record<Sort, (a: FleetRow, b: FleetRow) => number> = {
  worst: byWorst,
  name: byName,
  hold: (a, b) => minus(holdSeconds(a), holdSeconds(b)) || byName(a, b),
  tonight: (a, b) => runsTonight(b) - runsTonight(a) || byWorst(a, b),
  heard: (a, b) => minus(instant(a.lastHeardAt, 0), instant(b.lastHeardAt, 0)) || byName(a, b),
  visit: (a, b) => minus(instant(a.nextVisitAt, Infinity), instant(b.nextVisitAt, Infinity)) || byWorst(a, b),
}

export const sortRows = (rows: readonly FleetRow[], sort: Sort): FleetRow[] => [...rows].sort(COMPARE[sort])
