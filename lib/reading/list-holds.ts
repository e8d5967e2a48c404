import { legRateOfHold, listHolds as holdsOf, type ListedHold } from '@/db/queries/runs-and-holds'
import { asIngest, asPerson, type Trx } from '@/db/roles'
import { requireSystemRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import { openRowsAt } from '@/lib/figures'
import type { Hold, List, SpanQuery } from '@/shared/schemas'
import { SECONDS_PER_HOUR } from '@/shared/units'
import { listSpan, pageByStart } from './list-span'

/** Holds that began in the span, ascending; an open one has a null end and its duration so far. */
export async function listHolds(
  personId: string,
  systemId: string,
  query: SpanQuery,
  now: Date,
): Promise<List<Hold>> {
  const span = listSpan(query, now)
  const { rows, fullRecord } = await asPerson(personId, async (trx) => {
    const standing = await requireSystemRight(trx, systemId, null)
    return { rows: await holdsOf(trx, systemId, span), fullRecord: rightsOf(standing).fullRecord }
  })
  const open = await asIngest((trx) => openHold(trx, systemId, span.at))
  // A flush tells that somebody is up: that belongs to the full record, as it does for closed holds.
  const shown = open !== null && (fullRecord || open.flushes === 0) ? open : null
  return pageByStart<Hold>(rows.map(closedHold), shown, span)
}

function closedHold(row: ListedHold): Hold {
  const durationSeconds = (row.endedAt.getTime() - row.startedAt.getTime()) / 1000
  return {
    startedAt: row.startedAt.toISOString(),
    endedAt: row.endedAt.toISOString(),
    durationSeconds,
    ending: row.ending,
    flushes: row.flushes,
    leakRate: row.legRate ?? wholeHoldRate(row, durationSeconds),
  }
}

/** A hold too short for a leg, ended by its leak: what it lost over how long it lasted, to the doubt of its edges. */
function wholeHoldRate(row: ListedHold, durationSeconds: number): Hold['leakRate'] {
  if (row.ending !== 'leak' || row.settledPa === null || row.endPa === null || durationSeconds <= 0)
    return null
  const lostPa = row.settledPa - row.endPa
  if (lostPa <= 0) return null
  const perHour = (seconds: number) => (lostPa / seconds) * SECONDS_PER_HOUR
  const shortest = durationSeconds - row.edgeUncertaintySeconds
  return {
    paPerHour: perHour(durationSeconds),
    low: perHour(durationSeconds + row.edgeUncertaintySeconds),
    high: shortest > 0 ? perHour(shortest) : null,
  }
}

async function openHold(trx: Trx, systemId: string, at: Date): Promise<Hold | null> {
  const { hold, leg } = await openRowsAt(trx, systemId, at.getTime())
  if (hold === null) return null
  const startedAt = new Date(hold.startedAt)
  const closedLeg = await legRateOfHold(trx, systemId, startedAt, at)
  const openSeconds = leg === null ? 0 : (at.getTime() - leg.startedAt) / 1000
  const rate = leg?.rate != null && openSeconds > (closedLeg?.seconds ?? 0) ? leg.rate : closedLeg
  return {
    startedAt: startedAt.toISOString(),
    endedAt: null,
    durationSeconds: Math.max(0, at.getTime() - hold.startedAt) / 1000,
    ending: 'open',
    flushes: hold.flushes,
    leakRate: rate && { paPerHour: rate.paPerHour, low: rate.low, high: rate.high },
  }
}
