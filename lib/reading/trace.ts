import { noteSeen } from '@/db/queries/audit'
import { readTraceBuckets, readTraceFlushes, readTracePlace, readTraceRuns } from '@/db/queries/trace'
import { zoneOffsets } from '@/db/queries/zones'
import { asIngest, asPerson } from '@/db/roles'
import { requireSystemRight } from '@/lib/access/require-right'
import { openRowsAt } from '@/lib/figures'
import type { Trace } from '@/shared/schemas'
import { gapMs, traceChannels } from './trace-channels'
import { traceResolutionMs } from './trace-resolution'

/**
 * The record of a system between two instants, in at most `points` buckets, no extreme lost.
 * @throws Problem `not-found`, `not-allowed` without the full record
 */
export async function readTrace(
  personId: string,
  systemId: string,
  query: { from: string; to: string; points: number },
  now: Date,
): Promise<Trace> {
  const span = { from: new Date(query.from), to: new Date(query.to) }
  const resolutionMs = traceResolutionMs(span.from.getTime(), span.to.getTime(), query.points)
  const read = await asPerson(personId, async (trx) => {
    const { vesselId, owns } = await requireSystemRight(trx, systemId, 'fullRecord')
    // The owner can read who looked; once a day is enough to know.
    if (!owns) await noteSeen(trx, { at: now, personId, vesselId, action: 'record.seen', everyHours: 24 })
    const place = await readTracePlace(trx, systemId)
    return {
      place,
      buckets: await readTraceBuckets(trx, systemId, { ...span, resolutionMs }),
      runs: await readTraceRuns(trx, systemId, span.from, span.to),
      flushes: await readTraceFlushes(trx, systemId, span.from, span.to),
      offsets: await zoneOffsets(trx, place.timeZone, span.from, span.to),
    }
  })
  const open = span.to > now ? (await asIngest((trx) => openRowsAt(trx, systemId, now.getTime()))).run : null
  const running = open === null ? [] : [{ startedAt: open.startedAt, stoppedAt: null, trigger: open.trigger }]
  return {
    resolutionSeconds: resolutionMs / 1000,
    channels: traceChannels(read.buckets, resolutionMs, gapMs(read.place.intervalSeconds)),
    runs: [...read.runs, ...running],
    flushes: read.flushes,
    offsets: read.offsets.map((offset) => ({ from: offset.from.getTime(), seconds: offset.seconds })),
  }
}
