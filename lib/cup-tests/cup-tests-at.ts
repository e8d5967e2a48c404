import {
  readCupFlushes,
  readCupLegs,
  readCupTests,
  type CupLeg,
  type CupTestRow,
} from '@/db/queries/cup-tests'
import { readShortHolds } from '@/db/queries/trend'
import type { Trx } from '@/db/roles'
import type { CupTest } from '@/lib/analysis/signatures'
import { openRowsAt } from '@/lib/figures'
import type { CupTestResult } from '@/shared/schemas'
import { judge, strengthOf } from './judge'
import { pooled, ratesWithin, type CupRate } from './rates'
import { spansOf, WET_MS, type CupSpans, type Span } from './spans'

const MOST_TESTS = 10
const MOST_LEGS = 60

/**
 * A system's cup tests with what the leak did, as known at `at` (epoch milliseconds), the newest first.
 * @param trx under the service's role: checkpoints are read for what is open
 * @param fromMs only those whose water went in at or after this
 */
export async function cupTestsAt(
  trx: Trx,
  systemId: string,
  at: number,
  fromMs = -Infinity,
): Promise<CupTestResult[]> {
  const rows = await readCupTests(trx, systemId, { atMs: at, limit: MOST_TESTS + 1 })
  const [newest] = rows
  if (newest === undefined) return []
  // A leg that is still open can only belong to the newest.
  const open = at - newest.waterAt < 2 * WET_MS ? await openLeg(trx, systemId, at) : []
  const results: CupTestResult[] = []
  for (const [index, row] of rows.slice(0, MOST_TESTS).entries()) {
    if (row.waterAt < fromMs) break
    const previousWaterAt = rows[index + 1]?.waterAt ?? null
    const nextWaterAt = rows[index - 1]?.waterAt ?? null
    const span = { fromMs: row.waterAt - WET_MS, toMs: Math.min(at, row.waterAt + WET_MS), atMs: at }
    const flushes = await readCupFlushes(trx, systemId, span)
    const spans = spansOf({ waterAt: row.waterAt, at, flushes, previousWaterAt, nextWaterAt })
    results.push(await resultOf(trx, systemId, row, spans, { at, open: index === 0 ? open : [] }))
  }
  return results
}

/** Those that say something, in the words of the signature. */
export async function cupTestsKnown(
  trx: Trx,
  systemId: string,
  at: number,
  fromMs: number,
): Promise<CupTest[]> {
  const found = await cupTestsAt(trx, systemId, at, fromMs)
  return found.flatMap(({ headName, before, wet, after, verdict }) => {
    if (before === null || wet === null || verdict === null) return []
    const test = { headName, before, wet, after }
    return strengthOf(test) === null ? [] : [test]
  })
}

async function resultOf(
  trx: Trx,
  systemId: string,
  row: CupTestRow,
  spans: CupSpans,
  { at, open }: { at: number; open: readonly CupLeg[] },
): Promise<CupTestResult> {
  const bounds = [spans.before, spans.wet, ...(spans.after === null ? [] : [spans.after])]
  const edgesMs = bounds.flat()
  const [fromMs, toMs] = [Math.min(...edgesMs), Math.max(...edgesMs)]
  const stored = await readCupLegs(trx, systemId, { fromMs, toMs, atMs: at, edgesMs, limit: MOST_LEGS })
  const legs = [...stored, ...open]
  const rate = async (span: Span): Promise<CupRate | null> =>
    pooled(ratesWithin(legs, span)) ?? (await shortHoldRate(trx, systemId, span, at))
  const before = await rate(spans.before)
  const wet = await rate(spans.wet)
  const after = spans.after === null ? null : await rate(spans.after)
  const wetMinutes = (spans.wet[1] - spans.wet[0]) / 60_000
  const afterMinutes = spans.after === null ? 0 : (spans.after[1] - spans.after[0]) / 60_000
  const facts = { headName: row.headName, before, wet, after, wetMinutes, afterMinutes, over: spans.over }
  return {
    id: row.id,
    partKey: row.partKey,
    headName: row.headName,
    waterAt: new Date(row.waterAt).toISOString(),
    flushedAt: spans.flushedAt === null ? null : new Date(spans.flushedAt).toISOString(),
    open: !spans.over,
    ...judge(facts),
    before,
    wet,
    after,
  }
}

/** Where the pump starts every few minutes no leg is long enough: its whole holds serve. */
async function shortHoldRate(
  trx: Trx,
  systemId: string,
  [fromMs, toMs]: Span,
  atMs: number,
): Promise<CupRate | null> {
  const [from, to, at] = [new Date(fromMs), new Date(toMs), new Date(atMs)]
  const holds = await readShortHolds(trx, systemId, { from, to, at, limit: MOST_LEGS })
  const rates = holds
    .filter((hold) => hold.endedAt <= toMs)
    .map((hold) => ({ paPerHour: hold.paPerHour, sigma: hold.sigmaPaPerHour }))
  return pooled(rates)
}

async function openLeg(trx: Trx, systemId: string, at: number): Promise<CupLeg[]> {
  const { leg } = await openRowsAt(trx, systemId, at)
  if (leg === null || leg.setAside) return []
  const { startedAt, bins, rate } = leg
  const last = Math.max(0, ...bins.offsetSeconds)
  return [{ startedAt, endedAt: startedAt + last * 1000, rate, bins }]
}
