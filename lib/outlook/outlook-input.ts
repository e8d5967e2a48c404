import type { Trx } from '@/db/roles'
import { airPoints } from '@/db/queries/air'
import { vesselOfSystem } from '@/db/queries/judged'
import { nightWindow, zoneOffsets } from '@/db/queries/zones'
import { figuresOf, RECORD_DAYS } from '@/lib/analysis/figures'
import type { OutlookInput } from '@/lib/analysis/outlook'
import { figuresBasis } from '@/lib/figures'

const DAY_MS = 86_400_000
const AIR_MS = 2 * DAY_MS
/** When the last flush is expected of people who flush last thing: so long into quiet hours. */
const BEDTIME_MS = 30 * 60_000

/** Everything that an outlook is simulated from, as known at `at`, and the night it is about. */
export interface OutlookBasis {
  input: OutlookInput
  /** Date of the evening in the boat's zone. */
  night: string
  timeZone: string
}

/**
 * Loads the record of the last two weeks, the open hold, the fitted leak, the air and the coming night's hours.
 * @param trx under the service's role.
 * @returns null when there is no such system.
 */
export async function outlookBasis(trx: Trx, systemId: string, at: Date): Promise<OutlookBasis | null> {
  const basis = await figuresBasis(trx, systemId, at.getTime())
  const vessel = await vesselOfSystem(trx, systemId)
  if (basis === null || vessel === null) return null
  const window = await nightWindow(trx, vessel.vesselId, at)
  const from = new Date(at.getTime() - (RECORD_DAYS + 1) * DAY_MS)
  const offsets = await zoneOffsets(trx, vessel.timeZone, from, new Date(window.to.getTime() + 2 * DAY_MS))
  const { rows, open, current } = basis.input
  const input: OutlookInput = {
    at: at.getTime(),
    night: {
      from: window.from.getTime(),
      to: window.to.getTime(),
      bedtime: Math.min(window.from.getTime() + BEDTIME_MS, window.to.getTime()),
    },
    offsets: offsets.map((offset) => ({ from: offset.from.getTime(), seconds: offset.seconds })),
    runs: rows.runs,
    holds: rows.holds,
    flushes: rows.flushes,
    open,
    current,
    model: figuresOf(basis.input).model,
    air: await airPoints(trx, systemId, new Date(at.getTime() - AIR_MS), at),
    said: basis.setUp.said ?? 'unknown',
    // What the outlook rests on is as old as its newest reading, whenever that was received.
    lastHeardAt: current?.at ?? null,
    seesFlushes: basis.setUp.channels.includes('vacuum'),
  }
  return { input, night: window.night, timeZone: vessel.timeZone }
}
