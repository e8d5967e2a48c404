import type { LoggerFitting } from '@/db/queries/ingest-loggers'
import { refreshDays } from '@/db/queries/system-days'
import { lockStates, type SystemState } from '@/db/queries/system-state'
import type { Trx } from '@/db/roles'
import { endsOf, type Batch } from '@/ingest/check'
import { derive, rebuild, type Change, type Derived } from '@/ingest/derive'
import { judge } from '@/ingest/judge'
import { storeFigures } from '@/lib/figures'

interface Span {
  fromMs: number
  toMs: number
}

/** The systems that a batch of a logger's samples reaches, locked, with the spans of its fittings there. */
export async function lockReached(
  trx: Trx,
  fittings: readonly LoggerFitting[],
  batch: Batch,
): Promise<{ state: SystemState; spans: LoggerFitting[] }[]> {
  const { firstMs, lastMs } = endsOf(batch)
  const reached = fittings.filter(({ fromMs, toMs }) => fromMs <= lastMs && toMs > firstMs)
  const states = await lockStates(
    trx,
    reached.map(({ systemId }) => systemId),
  )
  return states.map((state) => ({
    state,
    spans: reached.filter(({ systemId }) => systemId === state.systemId),
  }))
}

/**
 * Everything that follows from changed samples of a system: rows, days, figures, notices.
 * @param spans when the logger was fitted to the system, half-open, epoch milliseconds.
 * @param changed times of changed samples, ascending; only those within a span concern the system.
 */
export async function takeIn(
  trx: Trx,
  locked: SystemState,
  spans: readonly Span[],
  changed: Float64Array,
  now: Date,
): Promise<Derived> {
  return settle(trx, locked, changeWithin(spans, changed), now)
}

/** Derives, brings up to date what is computed from the rows, and judges what is to be told. */
export async function settle(
  trx: Trx,
  locked: SystemState,
  change: Change | null,
  now: Date,
  patient = false,
): Promise<Derived> {
  const derived = await derive(trx, locked, change, patient)
  await refreshSpan(trx, locked.systemId, derived)
  await judge(trx, locked.systemId, now)
  return derived
}

/** Derives a system anew. Nothing is told: what was told before was told by the same samples. */
export async function settleAnew(trx: Trx, locked: SystemState, now: Date): Promise<Derived> {
  const derived = await rebuild(trx, locked)
  await refreshSpan(trx, locked.systemId, derived)
  await storeFigures(trx, locked.systemId, now.getTime())
  return derived
}

async function refreshSpan(trx: Trx, systemId: string, { span }: Derived): Promise<void> {
  if (span !== null) await refreshDays(trx, systemId, span.fromMs, span.toMs)
}

function changeWithin(spans: readonly Span[], changed: Float64Array): Change | null {
  const within = (at: number) => spans.some(({ fromMs, toMs }) => at >= fromMs && at < toMs)
  const fromMs = changed.find(within)
  const toMs = changed.findLast(within)
  return fromMs === undefined || toMs === undefined ? null : { fromMs, toMs }
}
