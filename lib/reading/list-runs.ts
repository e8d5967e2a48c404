import { listRuns as runsOf } from '@/db/queries/runs-and-holds'
import { asIngest, asPerson } from '@/db/roles'
import { requireSystemRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import { openRowsAt } from '@/lib/figures'
import type { List, Run, SpanQuery } from '@/shared/schemas'
import { listSpan, pageByStart } from './list-span'

/** Runs that began in the span, ascending; one still on has a null end and its duration so far. */
export async function listRuns(
  personId: string,
  systemId: string,
  query: SpanQuery,
  now: Date,
): Promise<List<Run>> {
  const span = listSpan(query, now)
  const { rows, fullRecord } = await asPerson(personId, async (trx) => {
    const standing = await requireSystemRight(trx, systemId, null)
    return { rows: await runsOf(trx, systemId, span), fullRecord: rightsOf(standing).fullRecord }
  })
  const { run } = await asIngest((trx) => openRowsAt(trx, systemId, span.at.getTime()))
  const closed = rows.map((row) => ({
    startedAt: row.startedAt.toISOString(),
    stoppedAt: row.stoppedAt.toISOString(),
    durationSeconds: (row.stoppedAt.getTime() - row.startedAt.getTime()) / 1000,
    trigger: row.trigger,
    vacuumAtStartPa: row.vacuumAtStartPa,
    vacuumAtStopPa: row.vacuumAtStopPa,
    edgeUncertaintySeconds: row.edgeUncertaintySeconds,
    rechargePaPerSecond: row.rechargePaPerSecond,
    supplyV: fullRecord ? row.supplyV : null,
  }))
  const open: Run | null = run && {
    startedAt: new Date(run.startedAt).toISOString(),
    stoppedAt: null,
    durationSeconds: Math.max(0, span.at.getTime() - run.startedAt) / 1000,
    trigger: run.trigger,
    vacuumAtStartPa: run.vacuumAtStartPa,
    vacuumAtStopPa: null,
    edgeUncertaintySeconds: run.edgeUncertaintySeconds,
    rechargePaPerSecond: null,
    supplyV: null,
  }
  return pageByStart<Run>(closed, open, span)
}
