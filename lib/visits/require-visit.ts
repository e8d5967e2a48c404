import { readVisits, type VisitRow } from '@/db/queries/visits'
import type { Trx } from '@/db/roles'
import { noSuch } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { Visit } from '@/shared/schemas'

/** @throws Problem `not-found` */
export async function requireVisit(trx: Trx, visitId: string): Promise<VisitRow> {
  const [visit] = await readVisits(trx, { visitId })
  if (visit === undefined) throw noSuch('visit')
  return visit
}

/** A visit that the person may work on, as technician or manager of its shop. @throws Problem */
export async function requireOwnVisit(trx: Trx, who: Who, visitId: string): Promise<VisitRow> {
  const visit = await requireVisit(trx, visitId)
  const works = who.memberships.some(
    ({ shopId, role }) => shopId === visit.shopId && (role === 'technician' || role === 'manager'),
  )
  if (!works) throw new Problem('not-allowed', 'Visits are worked on by a technician or manager of the shop.')
  return visit
}

const text = (at: Date | null): string | null => at?.toISOString() ?? null

export const visitOnWire = (row: VisitRow): Visit => ({
  ...row,
  askedAt: row.askedAt.toISOString(),
  plannedFor: text(row.plannedFor),
  startedAt: text(row.startedAt),
  finishedAt: text(row.finishedAt),
  closedAt: text(row.closedAt),
})
