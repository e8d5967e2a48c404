import type { Trx } from '@/db/roles'
import type { HoldTime, NoticeKind, StatementValue } from '@/shared/schemas'

export interface FleetSource {
  vesselId: string
  systemId: string
  name: string
  systemName: string
  harbour: string | null
  berth: string | null
  timeZone: string
  utcOffsetSeconds: number
  state: string | null
  /** Epoch milliseconds, as the figures keep it. */
  sinceMs: number | null
  holdTime: HoldTime | null
  moving: unknown
  lastHeardAt: Date | null
  limitSeconds: number
  aimSeconds: number
  silenceSeconds: number
  statement: { value: StatementValue; from: string } | null
  chance: number | null
  chanceIfFlushedLast: number | null
  expectedRuns: number | null
  hasOutlook: boolean
  openNotices: NoticeKind[]
  nextVisitAt: Date | null
  /** Told by the owner's word, else by a flush since 17:00 of the boat; null where the asker may not know. */
  aboard: 'aboard' | 'away' | 'unknown' | null
}

export interface SeenVessels {
  ids: string[]
  /** Those whose full record the person may read: presence is part of it. */
  full: string[]
}

/** Ids of all vessels that the person sees. */
export async function readSeenVessels(trx: Trx): Promise<SeenVessels> {
  const { rows } = await trx.raw<{ rows: { ids: string[] | null; full: string[] | null }[] }>(
    `select (select array_agg(id::text) from visible_vessels() as seen (id)) as ids,
       (select array_agg(id::text) from full_record_vessels() as whole (id)) as "full"`,
  )
  return { ids: rows[0]?.ids ?? [], full: rows[0]?.full ?? [] }
}

/**
 * One row a system of the vessels named, without touching samples or rows of the record: the figures kept on
 * system_state, the outlook of the night that is not yet over, open notices, the next planned visit.
 * @param trx under the service's role, with vessels that the person sees: asking a policy of each of the eight
 *   tables who may see a thousand boats costs more than reading them.
 */
export async function readFleet(
  trx: Trx,
  at: Date,
  vesselIds: string[],
  fullRecordIds: string[],
): Promise<FleetSource[]> {
  const { rows } = await trx.raw<{ rows: FleetSource[] }>(
    `with mine as (
       select s.id, s.vessel_id, s.name from system s where s.vessel_id = any (cast(:vessels as bigint[]))
     ), offsets as (
       select time_zone, extract(epoch from (cast(:at as timestamptz) at time zone time_zone)
         - (cast(:at as timestamptz) at time zone 'UTC'))::int as seconds
       from (select distinct time_zone from vessel where id = any (cast(:vessels as bigint[]))) z
     ), settings as (
       select distinct on (system_id) system_id, limit_seconds, aim_seconds, silence_seconds from setting
       where system_id in (select id from mine) and in_force_from <= :at order by system_id, in_force_from desc
     ), said as (
       select distinct on (system_id) system_id, json_build_object('value', value, 'from', from_at) as statement
       from statement where vessel_id = any (cast(:vessels as bigint[])) and system_id is not null and from_at <= :at and (until_at is null or until_at > :at)
       order by system_id, from_at desc, id desc
     ), presence as (
       select distinct on (vessel_id) vessel_id, value from statement
       where vessel_id = any (cast(:full as bigint[])) and system_id is null and from_at <= :at
         and (until_at is null or until_at > :at)
       order by vessel_id, from_at desc, id desc
     ), flushed as (
       select p.vessel_id, max(l.at) as at from mine p
       cross join lateral (select at from flush where system_id = p.id and at <= :at and at > cast(:at as timestamptz) - interval '24 hours'
         order by at desc limit 1) l
       where p.vessel_id = any (cast(:full as bigint[])) group by p.vessel_id
     ), nights as (
       select distinct on (system_id) system_id, chance, chance_if_flushed_last, expected_runs from outlook
       where system_id in (select id from mine) and quiet_to > :at and given_at <= :at order by system_id, quiet_to, given_at desc
     ), open_notices as (
       select system_id, array_agg(kind order by opened_at) as kinds from notice
       where vessel_id = any (cast(:vessels as bigint[])) and closed_at is null group by system_id
     ), planned as (
       select p.id as system_id, min(t.planned_for) as at from visit t
       join mine p on p.vessel_id = t.vessel_id and (t.system_id is null or t.system_id = p.id)
       where t.status = 'planned' and t.planned_for is not null group by p.id
     )
     select v.id as "vesselId", s.id as "systemId", v.name, s.name as "systemName", v.harbour, v.berth,
       v.time_zone as "timeZone", o.seconds as "utcOffsetSeconds",
       f.state, f.since as "sinceMs", f."holdTime",
       st.moving, st.last_heard_at as "lastHeardAt",
       coalesce(g.limit_seconds, 10800) as "limitSeconds", coalesce(g.aim_seconds, 28800) as "aimSeconds",
       coalesce(g.silence_seconds, 21600) as "silenceSeconds", t.statement,
       n.chance, n.chance_if_flushed_last as "chanceIfFlushedLast", n.expected_runs as "expectedRuns",
       n.system_id is not null as "hasOutlook", coalesce(k.kinds, '{}') as "openNotices",
       p.at as "nextVisitAt",
       case when not (v.id = any (cast(:full as bigint[]))) then null
         when w.value is not null then w.value
         when b.at >= (date_trunc('day', (cast(:at as timestamptz) at time zone v.time_zone) - interval '17 hours')
           + interval '17 hours') at time zone v.time_zone then 'aboard'
         else 'unknown' end as aboard
     from vessel v
     join mine s on s.vessel_id = v.id
     join offsets o on o.time_zone = v.time_zone
     left join system_state st on st.system_id = s.id
     left join lateral jsonb_to_record(st.figures) as f (state text, since float8, "holdTime" jsonb) on true
     left join settings g on g.system_id = s.id
     left join said t on t.system_id = s.id
     left join nights n on n.system_id = s.id
     left join open_notices k on k.system_id = s.id
     left join planned p on p.system_id = s.id
     left join presence w on w.vessel_id = v.id
     left join flushed b on b.vessel_id = v.id
     where v.id = any (cast(:vessels as bigint[]))`,
    { at, vessels: vesselIds, full: fullRecordIds },
  )
  return rows
}
