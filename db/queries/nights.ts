import type { Trx } from '@/db/roles'

export interface NightStrip {
  systemId: string
  date: string
  /** Minutes after 18:00, elapsed. */
  quiet: [number, number]
  runs: number[]
  flushes: number[]
}

/**
 * The last nights of each system, 18:00 to 10:00 by the boat's clock, oldest first. Runs are those that no flush
 * caused; flushes are there for whom the full record is.
 */
export async function readNights(
  trx: Trx,
  systemIds: string[],
  at: Date,
  nights: number,
): Promise<NightStrip[]> {
  const minutes = (column: string) =>
    `round((extract(epoch from ${column} - n.starts) / 60)::numeric, 1)::float8`
  const { rows } = await trx.raw<{ rows: NightStrip[] }>(
    `with n as (
       select s.id as system_id, d.day,
         (d.day + time '18:00') at time zone v.time_zone as starts,
         (d.day + 1 + time '10:00') at time zone v.time_zone as ends,
         (d.day + case when v.quiet_start < '12:00' then 1 else 0 end + v.quiet_start) at time zone v.time_zone as quiet_from,
         (d.day + case when v.quiet_start < '12:00' or v.quiet_end <= v.quiet_start then 1 else 0 end + v.quiet_end)
           at time zone v.time_zone as quiet_to
       from system s join vessel v on v.id = s.vessel_id
       cross join lateral (
         select ((cast(:at as timestamptz) at time zone v.time_zone) - interval '18 hours')::date - g as day
         from generate_series(0, cast(:nights as int) - 1) g) d
       where s.id = any (cast(:systems as bigint[]))
     )
     select n.system_id as "systemId", to_char(n.day, 'YYYY-MM-DD') as date,
       json_build_array(${minutes('n.quiet_from')}, ${minutes('n.quiet_to')}) as quiet,
       coalesce(r.at, '{}') as runs, coalesce(f.at, '{}') as flushes
     from n
     left join lateral (
       select array_agg(${minutes('r.started_at')} order by r.started_at) as at from run r
       where r.system_id = n.system_id and r.started_at >= n.starts and r.started_at < least(n.ends, :at)
         and r.trigger in ('leak', 'unknown')) r on true
     left join lateral (
       select array_agg(${minutes('f.at')} order by f.at) as at from flush f
       where f.system_id = n.system_id and f.at >= n.starts and f.at < least(n.ends, :at)) f on true
     order by n.system_id, n.day`,
    { systems: systemIds, at, nights },
  )
  return rows
}
