import { noteAudit } from '@/db/queries/audit'
import { systemIsOn, updateVisit, worksFor, type VisitColumns, type VisitRow } from '@/db/queries/visits'
import type { Trx } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import { noSuch } from '@/lib/access/require-right'
import type { Who } from '@/lib/auth/who'
import { Problem } from '@/lib/problem'
import type { ChangeVisit, Visit } from '@/shared/schemas'
import { requireOwnVisit, requireVisit, visitOnWire } from './require-visit'

/**
 * Plans, assigns, begins, finishes or closes a visit. A manager assigns anybody of the shop; a technician takes a
 * visit for themselves. @throws Problem `not-found`, `not-allowed`, `invalid`
 */
export async function changeVisit(who: Who, visitId: string, change: ChangeVisit, now: Date): Promise<Visit> {
  return checkedWrite(
    who.personId,
    async (trx) => {
      const visit = await requireOwnVisit(trx, who, visitId)
      requireAssigning(who, visit, change.assignedTo)
      return visit
    },
    async (trx, visit) => {
      await requireSense(trx, visit, change)
      await updateVisit(trx, visitId, columnsOf(visit, change, now))
      await noteAudit(trx, {
        at: now,
        personId: who.personId,
        vesselId: visit.vesselId,
        shopId: visit.shopId,
        action: 'visit.changed',
        detail: { visitId, ...change },
      })
      return visitOnWire(await requireVisit(trx, visitId))
    },
  )
}

function requireAssigning(who: Who, visit: VisitRow, assignedTo: string | null | undefined): void {
  if (assignedTo === undefined || assignedTo === who.personId) return
  const manages = who.memberships.some(({ shopId, role }) => shopId === visit.shopId && role === 'manager')
  if (!manages) throw new Problem('not-allowed', 'Visits are assigned by the shop’s manager.')
}

async function requireSense(trx: Trx, visit: VisitRow, change: ChangeVisit): Promise<void> {
  if (change.assignedTo != null && !(await worksFor(trx, change.assignedTo, visit.shopId)))
    throw new Problem('invalid', 'Assign the visit to a technician or manager of the shop.')
  if (change.systemId !== undefined && !(await systemIsOn(trx, change.systemId, visit.vesselId)))
    throw noSuch('system')
  const startedAt = change.startedAt === undefined ? visit.startedAt : new Date(change.startedAt)
  if (change.finishedAt !== undefined && startedAt !== null && new Date(change.finishedAt) < startedAt)
    throw new Problem('invalid', 'The work ends after it began.')
}

/** A status brings the times it stands for, where they were not said. */
function columnsOf(visit: VisitRow, change: ChangeVisit, now: Date): VisitColumns {
  const date = (text: string | undefined) => (text === undefined ? undefined : new Date(text))
  const begun = change.status === 'under-way' || change.status === 'proving'
  const done = change.status === 'proving' || change.status === 'closed'
  const startedAt = date(change.startedAt) ?? (begun && visit.startedAt === null ? now : undefined)
  const worked = (startedAt ?? visit.startedAt) !== null
  return {
    status: change.status,
    complaint: change.complaint,
    systemId: change.systemId,
    plannedFor: change.plannedFor === null ? null : date(change.plannedFor),
    assignedTo: change.assignedTo,
    startedAt,
    finishedAt: date(change.finishedAt) ?? (done && worked && visit.finishedAt === null ? now : undefined),
    closedAt: change.status === undefined ? undefined : change.status === 'closed' ? now : null,
    verdict: change.verdict,
    summary: change.summary,
  }
}
