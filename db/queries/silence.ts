import type { Trx } from '@/db/roles'

/** A system whose logger has been silent for about as long as its silence limit, or longer. */
export interface SilentSystem {
  systemId: string
  vesselId: string
  vesselName: string
  harbour: string | null
  timeZone: string
  /** The shop that is told; null when no shop looks after the vessel. */
  shopId: string | null
  lastHeardAt: Date
  /** Past its own limit, not only near it. */
  overdue: boolean
  noticeId: string | null
  /** Told by the notice of another system in the same harbour. */
  covered: boolean
}

/**
 * Systems with a fitted logger, silent for their limit less an hour. Left out where silence is expected: laid
 * up, switched off, nobody aboard by the owner's word, or never heard at all.
 */
export async function silentSystems(trx: Trx, now: Date): Promise<SilentSystem[]> {
  const { rows } = (await trx.raw(
    `select s.id as system_id, v.id as vessel_id, v.name as vessel_name, v.harbour, v.time_zone, t.last_heard_at,
       coalesce(v.kept_by_shop_id, (select min(a.shop_id) from shop_access a
         where a.vessel_id = v.id and a.withdrawn_at is null)) as shop_id,
       t.last_heard_at < :now::timestamptz - make_interval(secs => f.silence_seconds) as overdue,
       (select n.id from notice n where n.system_id = s.id and n.kind = 'logger-silent' and n.closed_at is null)
         as notice_id,
       exists (select 1 from notice n where n.kind = 'logger-silent' and n.closed_at is null
         and n.evidence->'systemIds' @> to_jsonb(s.id::text)) as covered
     from system s join vessel v on v.id = s.vessel_id join system_state t on t.system_id = s.id,
       lateral (select coalesce((select g.silence_seconds from setting g where g.system_id = s.id
         and g.in_force_from <= :now order by g.in_force_from desc limit 1), 21600) as silence_seconds) f
     where t.last_heard_at < :now::timestamptz - make_interval(secs => greatest(0, f.silence_seconds - 3600))
       and exists (select 1 from logger_fitting g where g.system_id = s.id and g.span @> :now::timestamptz)
       and not exists (select 1 from statement x where (x.system_id = s.id or (x.vessel_id = v.id and x.system_id is null))
         and x.value in ('off', 'laid-up', 'away') and x.from_at <= :now and (x.until_at is null or x.until_at > :now))
     order by t.last_heard_at, s.id`,
    { now },
  )) as { rows: Row[] }
  return rows.map((row) => ({
    systemId: String(row.system_id),
    vesselId: String(row.vessel_id),
    vesselName: row.vessel_name,
    harbour: row.harbour,
    timeZone: row.time_zone,
    shopId: row.shop_id === null ? null : String(row.shop_id),
    lastHeardAt: row.last_heard_at,
    overdue: row.overdue,
    noticeId: row.notice_id === null ? null : String(row.notice_id),
    covered: row.covered,
  }))
}

interface Row {
  system_id: string
  vessel_id: string
  vessel_name: string
  harbour: string | null
  time_zone: string
  shop_id: string | null
  last_heard_at: Date
  overdue: boolean
  notice_id: string | null
  covered: boolean
}

/** Open notices of silence with how many of their systems are still silent. */
export async function openSilences(
  trx: Trx,
  now: Date,
): Promise<{ noticeId: string; systemId: string; vesselId: string; openedAt: Date; heardAgain: boolean }[]> {
  const { rows } = (await trx.raw(
    `select n.id, n.system_id, n.vessel_id, n.opened_at, not exists (
       select 1 from system_state t where t.last_heard_at <= n.opened_at and t.system_id = any (
         case when jsonb_typeof(n.evidence->'systemIds') = 'array'
           then array(select x::bigint from jsonb_array_elements_text(n.evidence->'systemIds') x)
           else array[n.system_id] end)) as heard_again
     from notice n where n.kind = 'logger-silent' and n.closed_at is null and n.opened_at <= ? order by n.id`,
    [now],
  )) as {
    rows: { id: string; system_id: string; vessel_id: string; opened_at: Date; heard_again: boolean }[]
  }
  return rows.map((row) => ({
    noticeId: String(row.id),
    systemId: String(row.system_id),
    vesselId: String(row.vessel_id),
    openedAt: row.opened_at,
    heardAgain: row.heard_again,
  }))
}
