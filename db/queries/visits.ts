import type { Trx } from '@/db/roles'
import type { RepairVerdict, VisitStatus } from '@/shared/schemas'

/** When a visit's work began and ended; null when it is not on this system, or not seen. */
export async function readVisitSpan(
  trx: Trx,
  visitId: string,
  systemId: string,
): Promise<{ startedAt: Date | null; finishedAt: Date | null } | null> {
  const { rows } = await trx.raw<{ rows: { startedAt: Date | null; finishedAt: Date | null }[] }>(
    `select v.started_at as "startedAt", v.finished_at as "finishedAt"
     from visit v join system s on s.vessel_id = v.vessel_id and (v.system_id is null or v.system_id = s.id)
     where v.id = ? and s.id = ?`,
    [visitId, systemId],
  )
  return rows[0] ?? null
}

export interface VisitRow {
  id: string
  vesselId: string
  vesselName: string
  systemId: string | null
  systemName: string | null
  shopId: string
  shopName: string
  status: VisitStatus
  complaint: string
  askedBy: string | null
  askedAt: Date
  plannedFor: Date | null
  assignedTo: { id: string; name: string } | null
  startedAt: Date | null
  finishedAt: Date | null
  closedAt: Date | null
  verdict: RepairVerdict | null
  summary: string | null
}

/**
 * Visits the person sees, newest asked first. A shop keeps its visits after it lost sight of the boat; the names are
 * then read past the policies, since the visit names them anyway.
 */
export async function readVisits(
  trx: Trx,
  filter: { status?: string | undefined; vesselId?: string | undefined; visitId?: string | undefined },
): Promise<VisitRow[]> {
  const { rows } = await trx.raw<{ rows: VisitRow[] }>(
    `select v.id, v.vessel_id as "vesselId", n.vessel_name as "vesselName", v.system_id as "systemId",
       n.system_name as "systemName", v.shop_id as "shopId", n.shop_name as "shopName", v.status, v.complaint,
       n.asked_by as "askedBy", v.asked_at as "askedAt", v.planned_for as "plannedFor",
       case when v.assigned_to is not null then json_build_object('id', v.assigned_to::text, 'name', n.assigned_to) end
         as "assignedTo",
       v.started_at as "startedAt", v.finished_at as "finishedAt", v.closed_at as "closedAt", v.verdict, v.summary
     from visit v cross join lateral visit_names(v.id) n
     where (cast(:status as text) is null or v.status = :status)
       and (cast(:vessel as bigint) is null or v.vessel_id = :vessel)
       and (cast(:visit as bigint) is null or v.id = :visit)
     order by v.asked_at desc, v.id desc`,
    {
      status: filter.status ?? null,
      vessel: filter.vesselId ?? null,
      visit: filter.visitId ?? null,
    },
  )
  return rows
}
