import { readVisitParts } from '@/db/queries/visit-parts'
import { readVisits } from '@/db/queries/visits'
import { asPerson } from '@/db/roles'
import { pageOf } from '@/lib/api/page-of'
import type { List, Visit, VisitWhole } from '@/shared/schemas'
import { requireVisit, visitOnWire } from './require-visit'

/** Visits of one's shops and own vessels, newest asked first. */
export async function listVisits(
  personId: string,
  query: {
    limit: number
    cursor?: string | undefined
    status?: string | undefined
    vessel?: string | undefined
  },
): Promise<List<Visit>> {
  const rows = await asPerson(personId, (trx) =>
    readVisits(trx, { status: query.status, vesselId: query.vessel }),
  )
  return pageOf(rows.map(visitOnWire), query, (visit) => visit.id)
}

/** @throws Problem `not-found` */
export async function getVisit(personId: string, visitId: string): Promise<VisitWhole> {
  return asPerson(personId, async (trx) => ({
    ...visitOnWire(await requireVisit(trx, visitId)),
    ...(await readVisitParts(trx, visitId)),
  }))
}
