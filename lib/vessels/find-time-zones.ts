import { findZones } from '@/db/queries/zones'
import { asPerson } from '@/db/roles'
import type { KnownZone, List } from '@/shared/schemas'

/** Zones to pick from, as the database knows them. */
export async function findTimeZones(
  personId: string,
  query: { search: string; limit: number },
): Promise<List<KnownZone>> {
  const items = await asPerson(personId, (trx) => findZones(trx, query.search, query.limit))
  return { items, next: null }
}
