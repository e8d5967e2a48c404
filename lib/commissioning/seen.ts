import { newestReadings, readCorrection, type RawReading } from '@/db/queries/commissioning'
import { listRuns } from '@/db/queries/runs-and-holds'
import type { Trx } from '@/db/roles'
import { openRowsAt } from '@/lib/figures'
import type { Channel } from '@/shared/schemas'
import type { SeenRun } from './checks/types'

const MOST_READINGS = 10_000
const MOST_RUNS = 100
const MINUTE_MS = 60_000

/** A logger's samples between two instants, as read and corrected. Service's role. */
export async function readingsSince(
  trx: Trx,
  loggerId: string,
  from: Date,
  now: Date,
): Promise<{ raw: RawReading[]; corrected: RawReading[] }> {
  // Clocks a little ahead of the server's are right too.
  const to = new Date(now.getTime() + 2 * MINUTE_MS)
  const raw = await newestReadings(trx, loggerId, { from, to, limit: MOST_READINGS })
  const { vacuumOffsetPa, vacuumGain } = await readCorrection(trx, loggerId, now)
  const correct = (pa: number | null) => (pa === null ? null : (pa - vacuumOffsetPa) * vacuumGain)
  return { raw, corrected: raw.map((reading) => ({ ...reading, vacuumPa: correct(reading.vacuumPa) })) }
}

/** The system's runs that began since an instant, the open one included. Service's role. */
export async function runsSince(trx: Trx, systemId: string, from: Date, now: Date): Promise<SeenRun[]> {
  const span = { from, to: null, at: now, after: null, limit: MOST_RUNS }
  const closed = (await listRuns(trx, systemId, span)).map((run) => ({
    startedAtMs: run.startedAt.getTime(),
    stoppedAtMs: run.stoppedAt.getTime(),
    trigger: run.trigger,
    vacuumAtStartPa: run.vacuumAtStartPa,
    vacuumAtStopPa: run.vacuumAtStopPa,
  }))
  const { run } = await openRowsAt(trx, systemId, now.getTime())
  if (run === null || run.startedAt < from.getTime()) return closed
  return [
    ...closed,
    {
      startedAtMs: run.startedAt,
      stoppedAtMs: null,
      trigger: run.trigger,
      vacuumAtStartPa: run.vacuumAtStartPa,
      vacuumAtStopPa: null,
    },
  ]
}

/** Which channels these samples carry. */
export function channelsSeen(readings: readonly RawReading[]): Channel[] {
  const has = (pick: (reading: RawReading) => unknown) => readings.some((reading) => pick(reading) !== null)
  const seen: [Channel, boolean][] = [
    ['pump', has(({ pumpOn }) => pumpOn)],
    ['vacuum', has(({ vacuumPa }) => vacuumPa)],
    ['air', has(({ airC }) => airC)],
    ['barometer', has(({ barometerPa }) => barometerPa)],
    ['supply', has(({ supplyV }) => supplyV)],
  ]
  return seen.flatMap(([channel, there]) => (there ? [channel] : []))
}
