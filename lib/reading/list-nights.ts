import { readNights } from '@/db/queries/nights'
import { asPerson } from '@/db/roles'
import type { Nights } from '@/shared/schemas'

/** More than this in sixteen hours is a bar, not ticks. */
const MOST_TICKS = 60

/** Night strips of the systems asked for, in that order; those the person does not see are left out. */
export async function listNights(
  personId: string,
  query: { systems: string[]; nights: number },
  at: Date,
): Promise<Nights> {
  const ids = [...new Set(query.systems)]
  const strips = await asPerson(personId, (trx) => readNights(trx, ids, at, query.nights))
  const bySystem = new Map<string, Nights['items'][number]['nights']>()
  for (const strip of strips) {
    const night = {
      date: strip.date,
      quiet: strip.quiet,
      runs: strip.runs.slice(0, MOST_TICKS),
      flushes: strip.flushes.slice(0, MOST_TICKS),
      more: Math.max(0, strip.runs.length - MOST_TICKS),
    }
    bySystem.set(strip.systemId, [...(bySystem.get(strip.systemId) ?? []), night])
  }
  return {
    items: ids.flatMap((systemId) => {
      const nights = bySystem.get(systemId)
      return nights === undefined ? [] : [{ systemId, nights }]
    }),
  }
}
