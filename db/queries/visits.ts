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

export interface NewVisit {
  vesselId: string
  systemId: string | null
  shopId: string
  complaint: string
  askedBy: string
  askedAt: Date
}

export async function insertVisit(trx: Trx, visit: NewVisit): Promise<string> {
  const [row] = await trx('visit')
    .insert({
      vessel_id: visit.vesselId,
      system_id: visit.systemId,
      shop_id: visit.shopId,
      complaint: visit.complaint,
      asked_by: visit.askedBy,
      asked_at: visit.askedAt,
    })
    .returning<{ id: string }[]>('id')
  if (row === undefined) throw new Error('the visit was not inserted')
  return row.id
}

/** Shops that may see a vessel, or keep it. */
export async function shopsOfVessel(trx: Trx, vesselId: string): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { id: string }[] }>(
    `select shop_id as id from shop_access where vessel_id = :vessel and withdrawn_at is null
     union select kept_by_shop_id from vessel where id = :vessel and kept_by_shop_id is not null order by id`,
    { vessel: vesselId },
  )
  return rows.map((row) => row.id)
}

export async function systemIsOn(trx: Trx, systemId: string, vesselId: string): Promise<boolean> {
  return (await trx('system').where({ id: systemId, vessel_id: vesselId }).first('id')) !== undefined
}

export interface VisitColumns {
  status?: VisitStatus | undefined
  complaint?: string | undefined
  systemId?: string | undefined
  plannedFor?: Date | null | undefined
  assignedTo?: string | null | undefined
  startedAt?: Date | undefined
  finishedAt?: Date | undefined
  closedAt?: Date | null | undefined
  verdict?: RepairVerdict | null | undefined
  summary?: string | null | undefined
}

export async function updateVisit(trx: Trx, visitId: string, change: VisitColumns): Promise<void> {
  const columns = {
    status: change.status,
    complaint: change.complaint,
    system_id: change.systemId,
    planned_for: change.plannedFor,
    assigned_to: change.assignedTo,
    started_at: change.startedAt,
    finished_at: change.finishedAt,
    closed_at: change.closedAt,
    verdict: change.verdict,
    summary: change.summary,
  }
  const named = Object.fromEntries(Object.entries(columns).filter(([, value]) => value !== undefined))
  if (Object.keys(named).length > 0) await trx('visit').where({ id: visitId }).update(named)
}

/** Whether somebody works for a shop, in a role that goes on visits. */
export async function worksFor(trx: Trx, personId: string, shopId: string): Promise<boolean> {
  const row = await trx('membership')
    .where({ person_id: personId, shop_id: shopId })
    .whereIn('role', ['technician', 'manager'])
    .whereNull('ended_at')
    .first('id')
  return row !== undefined
}
