import type { Knex } from 'knex'

const CHANNELS = ['vacuum', 'air', 'barometer', 'supply'] as const
const out = CHANNELS.map(
  (name) => `${name}_min double precision, ${name}_max double precision, ${name}_mean double precision`,
).join(', ')
const aggregated = CHANNELS.map(
  (name) =>
    `min(v.${name}_min), max(v.${name}_max), sum(v.${name}_mean * v.n) / sum(v.n) filter (where v.${name}_mean is not null)`,
).join(', ')

/** One sample as a bucket of its own; vacuum corrected by the calibration in force. */
const raw = (lo: string, hi: string): string => `
    select s.at as first_at, s.at as last_at, 1::double precision as n,
      s.v as vacuum_min, s.v as vacuum_max, s.v as vacuum_mean, s.air_c::double precision as air_min,
      s.air_c::double precision as air_max, s.air_c::double precision as air_mean,
      s.barometer_pa::double precision as barometer_min, s.barometer_pa::double precision as barometer_max,
      s.barometer_pa::double precision as barometer_mean, s.supply_v::double precision as supply_min,
      s.supply_v::double precision as supply_max, s.supply_v::double precision as supply_mean
    from spans p cross join lateral (
      select x.at, (x.vacuum_pa - p.shift) * p.gain as v, x.air_c, x.barometer_pa, x.supply_v from sample x
      where x.logger_id = p.logger_id and x.at >= ${lo} and x.at < ${hi} and x.at >= p_from and x.at < p_to offset 0) s`

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- The record in buckets on multiples of p_step, extremes kept: from hours where a bucket holds whole ones, else from
-- samples. One check for all of it, as with system_samples.
create function system_trace(p_system bigint, p_from timestamptz, p_to timestamptz, p_step interval)
returns table (bucket timestamptz, first_at timestamptz, last_at timestamptz, ${out})
language plpgsql stable security definer set search_path = public set jit = off as $$
declare
  epoch constant timestamptz := '1970-01-01T00:00:00Z';
  an_hour constant interval := interval '1 hour';
  by_hour constant boolean := p_step >= interval '1 hour';
begin
  if current_person() is not null and p_system not in (select full_record_systems()) then
    return;
  end if;
  return query
  with fitted as (
    select f.logger_id, greatest(p_from, lower(f.span)) as lo, least(p_to, coalesce(upper(f.span), 'infinity')) as hi
    from logger_fitting f where f.system_id = p_system and f.span && tstzrange(p_from, p_to)
  ), pieces as (
    select f.logger_id, greatest(f.lo, c.since) as lo, least(f.hi, c.until) as hi, c.shift, c.gain
    from fitted f cross join lateral (
      select x.since, lead(x.since, 1, 'infinity'::timestamptz) over (order by x.since) as until, x.shift, x.gain from (
        select '-infinity'::timestamptz as since, 0::double precision as shift, 1::double precision as gain
        union all
        select k.in_force_from, k.vacuum_offset_pa, k.vacuum_gain from calibration k where k.logger_id = f.logger_id) x) c
    where c.since < f.hi and c.until > f.lo
  ), spans as (
    -- Whole hours lie in [hours_from, hours_to); without them that is empty, and all of it is read as samples.
    select w.*, case when by_hour then greatest(date_bin(an_hour, w.hi, epoch), w.hours_from) else w.hi end as hours_to
    from (select q.*, case when by_hour
        then least(date_bin(an_hour, q.lo + an_hour - interval '1 microsecond', epoch), q.hi) else q.hi end as hours_from
      from pieces q) w
  ), v as (${raw('p.lo', 'p.hours_from')}
    union all${raw('p.hours_to', 'p.hi')}
    union all
    select s.hour, s.hour + an_hour, s.samples,
      (s.vacuum_min_pa - p.shift) * p.gain, (s.vacuum_max_pa - p.shift) * p.gain, (s.vacuum_mean_pa - p.shift) * p.gain,
      s.air_min_c, s.air_max_c, s.air_mean_c, s.barometer_min_pa, s.barometer_max_pa,
      s.barometer_mean_pa, s.supply_min_v, s.supply_max_v, s.supply_mean_v
    from spans p cross join lateral (
      select h.* from sample_hour h
      where h.logger_id = p.logger_id and h.hour >= p.hours_from and h.hour < p.hours_to offset 0) s
  )
  select date_bin(p_step, v.first_at, epoch), min(v.first_at), max(v.last_at), ${aggregated}
  from v group by 1 order by 1;
end $$;
revoke execute on function system_trace(bigint, timestamptz, timestamptz, interval) from public;
grant execute on function system_trace(bigint, timestamptz, timestamptz, interval) to mw_person, mw_ingest;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop function system_trace(bigint, timestamptz, timestamptz, interval)')
}
