import type { Trx } from '@/db/roles'

/**
 * Makes the days (UTC dates) of a system anew from its rows. A run, flush or leg belongs to the day it began; the
 * time observed is shared out over the days it lies in. Days with nothing in them are removed.
 * @param fromMs, toMs epoch milliseconds; every day they touch is made anew.
 */
export async function refreshDays(trx: Trx, systemId: string, fromMs: number, toMs: number): Promise<void> {
  const days = { systemId, first: utcDay(fromMs), last: utcDay(toMs) }
  await trx.raw('delete from system_day where system_id = :systemId and day between :first and :last', days)
  await trx.raw(
    `insert into system_day (system_id, day, leak_runs, flush_runs, flushes, run_seconds, observed_seconds,
       leak_pa_per_hour, leak_sigma_pa_per_hour, hold_seconds, recharge_pa_per_second)
     select :systemId, d.day, r.leak_runs, r.flush_runs, f.flushes, r.run_seconds, o.observed_seconds,
       l.rate, l.sigma, h.hold_seconds, r.recharge
     from (select g::date as day, g at time zone 'UTC' as starts, (g + interval '1 day') at time zone 'UTC' as ends
           from generate_series(:first::timestamp, :last::timestamp, interval '1 day') g) d
     cross join lateral (
       select count(*) filter (where trigger = 'leak')::int as leak_runs,
         count(*) filter (where trigger = 'flush')::int as flush_runs,
         coalesce(sum(extract(epoch from stopped_at - started_at)), 0)::float8 as run_seconds,
         percentile_cont(0.5) within group (order by recharge_pa_per_second) as recharge
       from run where system_id = :systemId and started_at >= d.starts and started_at < d.ends) r
     cross join lateral (
       select count(*)::int as flushes from flush
       where system_id = :systemId and at >= d.starts and at < d.ends) f
     cross join lateral (
       select percentile_cont(0.5) within group (order by extract(epoch from ended_at - started_at))::float8
         as hold_seconds
       from hold where system_id = :systemId and ending = 'leak' and not set_aside
         and started_at >= d.starts and started_at < d.ends) h
     cross join lateral (
       -- Legs weigh by how well each is known; a half-width of 1.96 sigma is the interval's.
       select sum(w * rate_pa_per_hour) / sum(w) as rate, sqrt(1 / sum(w)) as sigma
       from (select rate_pa_per_hour, 1 / power(greatest((rate_high - rate_low) / 3.92, 1), 2) as w
             from leg where system_id = :systemId and rate_pa_per_hour is not null and not set_aside
               and started_at >= d.starts and started_at < d.ends order by started_at) w) l
     cross join lateral (
       select coalesce(sum(extract(epoch from least(s.t, d.ends) - greatest(s.f, d.starts))), 0)::float8
         as observed_seconds
       from (select started_at as f, stopped_at as t from run
               where system_id = :systemId and not interrupted
                 and started_at < d.ends and stopped_at > d.starts
             union all
             select started_at, ended_at from hold
               where system_id = :systemId and started_at < d.ends and ended_at > d.starts) s) o
     where r.leak_runs + r.flush_runs + f.flushes > 0 or o.observed_seconds > 0 or r.run_seconds > 0`,
    days,
  )
}

const utcDay = (ms: number): string => new Date(ms).toISOString().slice(0, 10)
