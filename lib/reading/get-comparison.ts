import { readComparisonHolds, readComparisonRuns, readObservedSeconds } from '@/db/queries/comparison'
import { readSettings } from '@/db/queries/systems'
import { readVisitSpan } from '@/db/queries/visits'
import { asIngest, asPerson, type Trx } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { compareBeforeAfter, type ComparedPeriod } from '@/lib/analysis/comparison'
import { openRowsAt } from '@/lib/figures'
import { Problem } from '@/lib/problem'
import type { Comparison } from '@/shared/schemas'

interface Span {
  from: Date
  to: Date
}
export interface ComparisonQuery {
  before?: { from: string; to: string } | undefined
  after?: { from: string; to: string } | undefined
  visit?: string | undefined
}

/** So much record on either side of a visit says what it changed, and older habits don't blur it. */
const SIDE_DAYS = 14
const DAY_MS = 86_400_000

/** Before and after: two spans, or the fortnight before a visit's beginning and what came after its end. */
export async function getComparison(
  personId: string,
  systemId: string,
  query: ComparisonQuery,
  now: Date,
): Promise<Comparison> {
  const { before, after } = await asPerson(personId, async (trx) => {
    await requireSystemRight(trx, systemId, null)
    return spansOf(trx, systemId, query, now)
  })
  return asIngest((trx) => compareSpans(trx, systemId, before, after, now))
}

/**
 * The comparison itself, from what was known at `now`.
 * @param trx under the service's role: holds that a flush cut short count, whoever asks
 */
export async function compareSpans(
  trx: Trx,
  systemId: string,
  before: Span,
  after: Span,
  now: Date,
): Promise<Comparison> {
  const [setting] = await readSettings(trx, [systemId], now)
  const { ratio, pValue, verdict, hoursNeeded, because, signs, ...sides } = compareBeforeAfter(
    await periodOf(trx, systemId, before, now),
    await periodOf(trx, systemId, after, now),
    { limitSeconds: setting?.limitSeconds ?? 10_800, pumpAmps: setting?.pumpAmps ?? null },
  )
  const sideOf = (side: 'before' | 'after') => ({
    ...sides[side],
    differentialPa: signs[side].differentialPa,
    flowRatio: signs[side].ratio,
  })
  return { before: sideOf('before'), after: sideOf('after'), ratio, pValue, verdict, hoursNeeded, because }
}

async function spansOf(
  trx: Trx,
  systemId: string,
  query: ComparisonQuery,
  now: Date,
): Promise<{ before: Span; after: Span }> {
  if (query.before !== undefined && query.after !== undefined)
    return { before: dated(query.before), after: dated(query.after) }
  const visit = await readVisitSpan(trx, query.visit ?? '0', systemId)
  if (visit === null) throw noSuch('visit')
  if (visit.startedAt === null)
    throw new Problem('conflict', 'The visit has not begun: there is nothing yet to compare.')
  const end = visit.finishedAt ?? now
  return {
    before: { from: new Date(visit.startedAt.getTime() - SIDE_DAYS * DAY_MS), to: visit.startedAt },
    after: { from: end, to: new Date(Math.min(now.getTime(), end.getTime() + SIDE_DAYS * DAY_MS)) },
  }
}

const dated = (span: { from: string; to: string }): Span => ({
  from: new Date(span.from),
  to: new Date(span.to),
})

async function periodOf(trx: Trx, systemId: string, span: Span, now: Date): Promise<ComparedPeriod> {
  const known = { ...span, at: now }
  const holds = await readComparisonHolds(trx, systemId, known)
  const open = await openHoldIn(trx, systemId, span, now)
  const learned = holds.map((hold) => hold.differentialPa).filter((pa): pa is number => pa !== null)
  const observed = await readObservedSeconds(trx, systemId, known)
  return {
    from: span.from.getTime(),
    to: span.to.getTime(),
    holds: open === null ? holds : [...holds, open],
    runs: await readComparisonRuns(trx, systemId, known),
    differentialPa: learned.sort((a, b) => a - b)[Math.floor((learned.length - 1) / 2)] ?? null,
    observedSeconds: observed + (open === null ? 0 : (open.endedAt - open.startedAt) / 1000),
  }
}

/** A hold that goes on says already that it lasts at least so long. */
async function openHoldIn(
  trx: Trx,
  systemId: string,
  span: Span,
  now: Date,
): Promise<ComparedPeriod['holds'][number] | null> {
  const { hold, leg } = await openRowsAt(trx, systemId, now.getTime())
  const endedAt = Math.min(now.getTime(), span.to.getTime())
  if (hold === null || hold.startedAt < span.from.getTime() || hold.startedAt >= endedAt) return null
  return {
    startedAt: hold.startedAt,
    endedAt,
    ending: 'open',
    leakRate: leg?.rate ?? null,
    setAside: hold.setAside,
  }
}
