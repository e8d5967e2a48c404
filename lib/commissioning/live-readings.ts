import { readLoggerHeard } from '@/db/queries/commissioning'
import { asIngest, asPerson } from '@/db/roles'
import type { Who } from '@/lib/auth/who'
import type { LiveReadings } from '@/shared/schemas'
import { requireOpen } from './require-commissioning'
import { channelsSeen, readingsSince, runsSince } from './seen'

const WINDOW_MS = 600_000
const MOST_SHOWN = 120

/**
 * What the logger sends while it is being fitted. Whoever fits it sees this much of the record, for as long as the
 * commissioning is open, and no further back than ten minutes.
 * @throws Problem `not-found`, `not-allowed`, `conflict` once it is signed off
 */
export async function liveReadings(who: Who, id: string, now: Date): Promise<LiveReadings> {
  const row = await asPerson(who.personId, (trx) => requireOpen(trx, who, id, now))
  const { logger, system } = row
  if (logger === null || system === null) return nothing(now)
  const began = row.checks.findLast((check) => check.doneAt === null)?.beganAt
  return asIngest(async (trx) => {
    const heard = await readLoggerHeard(trx, logger.id)
    const { raw, corrected } = await readingsSince(trx, logger.id, new Date(now.getTime() - WINDOW_MS), now)
    const runs = began === undefined ? [] : await runsSince(trx, system.id, new Date(began), now)
    const newest = <Value>(pick: (reading: (typeof raw)[number]) => Value | null): Value | null => {
      const last = corrected.findLast((reading) => pick(reading) !== null)
      return last === undefined ? null : pick(last)
    }
    const last = raw.at(-1)
    const iso = (ms: number) => new Date(ms).toISOString()
    return {
      at: now.toISOString(),
      readings: raw
        .slice(-MOST_SHOWN)
        .map(({ atMs, vacuumPa, pumpOn }) => ({ at: iso(atMs), vacuumPa, pumpOn })),
      newest: {
        at: last === undefined ? null : iso(last.atMs),
        vacuumPa: newest(({ vacuumPa }) => vacuumPa),
        pumpOn: newest(({ pumpOn }) => pumpOn),
        airC: newest(({ airC }) => airC),
        barometerPa: newest(({ barometerPa }) => barometerPa),
        supplyV: newest(({ supplyV }) => supplyV),
      },
      seen: channelsSeen(raw),
      lastHeardAt: heard.lastHeardAt?.toISOString() ?? null,
      clockOffsetSeconds: heard.clockOffsetSeconds,
      runs: runs.map(({ startedAtMs, stoppedAtMs, trigger }) => ({
        startedAt: iso(startedAtMs),
        stoppedAt: stoppedAtMs === null ? null : iso(stoppedAtMs),
        trigger,
      })),
    }
  })
}

const nothing = (now: Date): LiveReadings => ({
  at: now.toISOString(),
  readings: [],
  newest: { at: null, vacuumPa: null, pumpOn: null, airC: null, barometerPa: null, supplyV: null },
  seen: [],
  lastHeardAt: null,
  clockOffsetSeconds: null,
  runs: [],
})
