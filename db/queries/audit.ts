import type { Trx } from '@/db/roles'

export interface AuditEntry {
  at: Date
  personId: string
  vesselId?: string | undefined
  shopId?: string | undefined
  action: string
  detail?: Record<string, unknown>
}

/** Writes down who changed what, in the transaction of the change itself. */
export async function noteAudit(trx: Trx, entry: AuditEntry): Promise<void> {
  await trx('audit_entry').insert({
    at: entry.at,
    person_id: entry.personId,
    vessel_id: entry.vesselId ?? null,
    shop_id: entry.shopId ?? null,
    action: entry.action,
    detail: JSON.stringify(entry.detail ?? {}),
  })
}

export interface LogRow {
  id: string
  at: Date
  personId: string | null
  who: string | null
  action: string
  detail: Record<string, unknown>
  vesselId: string | null
  vesselName: string | null
  shopName: string | null
}

const LOG = `
  select a.id, a.at, a.person_id as "personId", p.name as who, a.action, a.detail, a.vessel_id as "vesselId",
    v.name as "vesselName", s.name as "shopName"
  from audit_entry a left join person p on p.id = a.person_id left join vessel v on v.id = a.vessel_id
    left join shop s on s.id = a.shop_id`

interface Page {
  limit: number
  beforeId: string | null
}

/** What was seen and changed on a vessel, the newest first. Under the service's role, after sight was checked. */
export async function readVesselLog(trx: Trx, vesselId: string, page: Page): Promise<LogRow[]> {
  const { rows } = await trx.raw<{ rows: LogRow[] }>(
    `${LOG} where a.vessel_id = :vessel and (cast(:before as bigint) is null or a.id < :before)
     order by a.id desc limit :limit`,
    { vessel: vesselId, before: page.beforeId, limit: page.limit },
  )
  return rows
}

/** What was changed of a boat's and one of its systems' set-up, the newest first. Under the service's role, after sight was checked. */
export async function readSetUpLog(
  trx: Trx,
  vesselId: string,
  systemId: string,
  limit: number,
): Promise<LogRow[]> {
  const { rows } = await trx.raw<{ rows: LogRow[] }>(
    `${LOG} where a.vessel_id = :vessel and (a.action = 'vessel.changed'
       or (a.action in ('system.settings', 'system.parts') and a.detail->>'systemId' = :system))
     order by a.id desc limit :limit`,
    { vessel: vesselId, system: systemId, limit },
  )
  return rows
}

/**
 * What concerns a shop, and what its people did on vessels that it still sees, the newest first. What owners do on
 * their own boats is theirs.
 */
export async function readShopLog(trx: Trx, shopId: string, page: Page): Promise<LogRow[]> {
  const { rows } = await trx.raw<{ rows: LogRow[] }>(
    `${LOG} where (a.shop_id = :shop or (
         a.person_id in (select person_id from membership m where m.shop_id = :shop and m.since <= a.at
           and (m.ended_at is null or m.ended_at > a.at))
         and a.vessel_id in (
           select vessel_id from shop_access where shop_id = :shop and withdrawn_at is null
           union select id from vessel where kept_by_shop_id = :shop)
         and not exists (select 1 from vessel_owner o where o.vessel_id = a.vessel_id and o.person_id = a.person_id)))
       and (cast(:before as bigint) is null or a.id < :before)
     order by a.id desc limit :limit`,
    { shop: shopId, before: page.beforeId, limit: page.limit },
  )
  return rows
}

/** Notes that somebody read something, once in so many hours, under their own role. */
export async function noteSeen(
  trx: Trx,
  seen: { at: Date; personId: string; vesselId: string; action: string; everyHours: number },
): Promise<void> {
  await trx.raw(
    `insert into audit_entry (at, person_id, vessel_id, action)
     select :at, :person, :vessel, :action where not exists (select 1 from audit_entry
       where person_id = :person and vessel_id = :vessel and action = :action
         and at > cast(:at as timestamptz) - make_interval(hours => :hours))`,
    {
      at: seen.at,
      person: seen.personId,
      vessel: seen.vesselId,
      action: seen.action,
      hours: seen.everyHours,
    },
  )
}
