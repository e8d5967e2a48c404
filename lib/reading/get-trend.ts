import { readDayRates, readLegRates, readShortHolds } from '@/db/queries/trend'
import { readSettings } from '@/db/queries/systems'
import { asIngest, asPerson } from '@/db/roles'
import { requireSystemRight } from '@/lib/access/require-right'
import { findSteps } from '@/lib/analysis/steps'
import { rateTrend } from '@/lib/analysis/trend'
import { summaryAt } from '@/lib/figures'
import type { Trend } from '@/shared/schemas'
import { inHgToPa, SECONDS_PER_HOUR } from '@/shared/units'
import { withShortHolds } from './daily-rates'

const DAY_MS = 86_400_000
const USUAL_DAYS = 60
/** Steps are looked for among the newest legs, however long the span. */
const MOST_LEGS = 600
const USUAL_DIFFERENTIAL_PA = inHgToPa(1.8)
const instant = (ms: number): string => new Date(ms).toISOString()
const instantOrNull = (ms: number | null): string | null => (ms === null ? null : instant(ms))

/** Where the leak rate goes: default the 60 days up to `at`. A leak figure, so sight is enough. */
export async function getTrend(
  personId: string,
  systemId: string,
  query: { from?: string | undefined; to?: string | undefined; at?: string | undefined },
  now: Date,
): Promise<Trend> {
  const at = query.at === undefined ? now : new Date(query.at)
  const to = query.to === undefined ? at : new Date(query.to)
  const from = query.from === undefined ? new Date(to.getTime() - USUAL_DAYS * DAY_MS) : new Date(query.from)
  await asPerson(personId, (trx) => requireSystemRight(trx, systemId, null))
  const { daily, legs, limitPaPerHour } = await asIngest(async (trx) => {
    const span = { from, to, at, limit: MOST_LEGS }
    const legs = await readLegRates(trx, systemId, span)
    const short = await readShortHolds(trx, systemId, span)
    const [setting] = await readSettings(trx, [systemId], at)
    const summary = await summaryAt(trx, systemId, at.getTime())
    const band =
      summary?.settledPa != null && summary.cutInPa != null ? summary.settledPa - summary.cutInPa : null
    const limitHours = (setting?.limitSeconds ?? 10_800) / SECONDS_PER_HOUR
    return {
      daily: withShortHolds(await readDayRates(trx, systemId, span), short),
      legs: [...legs, ...short],
      limitPaPerHour: (band ?? USUAL_DIFFERENTIAL_PA) / limitHours,
    }
  })
  const trend = rateTrend(daily, limitPaPerHour)
  return {
    slopePerDay: trend?.slopePerDay ?? null,
    doublingDays: trend?.doublingDays ?? null,
    pValue: trend?.pValue ?? null,
    limitCrossing: trend?.limitCrossing
      ? {
          at: instant(trend.limitCrossing.at),
          low: instantOrNull(trend.limitCrossing.low),
          high: instantOrNull(trend.limitCrossing.high),
        }
      : null,
    steps: findSteps(legs).map((step) => ({
      ...step,
      between: [instant(step.between[0]), instant(step.between[1])],
    })),
  }
}
