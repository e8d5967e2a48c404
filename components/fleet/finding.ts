import type { FleetRow } from '@/shared/schemas'
import { rowName } from '@/components/fleet/fleet-words'
import { STATE_TONES } from '@/components/states'

const said = (count: number, one: string, many: string): string => `${count} ${count === 1 ? one : many}`

/**
 * The fleet in a sentence: how many want attention, how many are likely to run tonight, and which are silent.
 * "2 want attention, 3 are likely to run tonight, 1 is unheard." · "All 12 hold, and none is likely to run tonight."
 */
export function fleetFinding(rows: readonly FleetRow[]): string {
  const attention = rows.filter((row) => STATE_TONES[row.state] === 'attention')
  const running = rows.filter((row) => (row.tonight?.chanceIfFlushedLast ?? 0) >= 0.5)
  const unheard = rows.filter((row) => row.state === 'unheard')
  const parts: string[] = []
  const only = attention.length === 1 ? attention[0] : undefined
  if (only) parts.push(`${rowName(only)} wants attention`)
  else if (attention.length > 1) parts.push(said(attention.length, 'wants attention', 'want attention'))
  if (running.length > 0)
    parts.push(said(running.length, 'is likely to run tonight', 'are likely to run tonight'))
  if (unheard.length > 0) parts.push(said(unheard.length, 'is unheard', 'are unheard'))
  if (parts.length === 0)
    return `${rows.length === 1 ? 'It holds' : `All ${rows.length} hold`}, and none is likely to run tonight.`
  return `${parts.join(', ')}.`
}
