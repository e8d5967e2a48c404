import type { Trx } from '@/db/roles'

/** A vessel's quiet hours of one night as instants. Hours differ from the usual where the clocks change. */
export interface NightWindow {
  vesselId: string
  /** Calendar date of the evening in the boat's zone, `2026-12-01`; a window that begins after midnight belongs to the evening before. */
  night: string
  from: Date
  to: Date
  timeZone: string
  /** Elapsed, not wall-clock: 8, 8.5, 9, 9.5 or 10 for 22:00 to 07:00. */
  hours: number
}

interface WindowRow {
  vessel_id: string
  night: string
  from_at: Date
  to_at: Date
  time_zone: string
}

const toWindow = (row: WindowRow): NightWindow => ({
  vesselId: row.vessel_id,
  night: row.night,
  from: row.from_at,
  to: row.to_at,
  timeZone: row.time_zone,
  hours: (row.to_at.getTime() - row.from_at.getTime()) / 3_600_000,
})

/** Windows of the days around an instant, one row a day; `d` is the date on which the window begins. */
const WINDOWS = `
  select v.id as vessel_id, v.time_zone,
    (d.day - case when v.quiet_start < '12:00' then 1 else 0 end)::date as night,
    (d.day + v.quiet_start) at time zone v.time_zone as from_at,
    (d.day + case when v.quiet_end <= v.quiet_start then 1 else 0 end + v.quiet_end) at time zone v.time_zone as to_at
  from vessel v, lateral (
    select (cast(:at as timestamptz) at time zone v.time_zone)::date + n as day from generate_series(cast(:first as int), 1) n
  ) d
  where v.id = any (cast(:vessels as bigint[]))`

/**
 * The night each vessel is in at `at`, or else the coming one: the first window that ends after `at`.
 * Zone rules are the database's. In a gap of the clock a wall time means the one an hour later; in an
 * overlap the second of the two.
 */
export async function nightWindows(trx: Trx, vesselIds: string[], at: Date): Promise<NightWindow[]> {
  const { rows } = await trx.raw<{ rows: WindowRow[] }>(
    `select distinct on (vessel_id) * from (${WINDOWS}) w where to_at > :at order by vessel_id, from_at`,
    { vessels: vesselIds, at, first: -1 },
  )
  return rows.map(toWindow)
}

/** @throws Error when there is no such vessel (or none visible). */
export async function nightWindow(trx: Trx, vesselId: string, at: Date): Promise<NightWindow> {
  const [window] = await nightWindows(trx, [vesselId], at)
  if (window === undefined) throw new Error(`no vessel ${vesselId}`)
  return window
}

/** The last `count` nights that have begun at `at`, oldest first for each vessel. */
export async function pastNightWindows(
  trx: Trx,
  vesselIds: string[],
  at: Date,
  count: number,
): Promise<NightWindow[]> {
  const { rows } = await trx.raw<{ rows: WindowRow[] }>(
    `select vessel_id, night, from_at, to_at, time_zone from (
       select *, row_number() over (partition by vessel_id order by from_at desc) as back
       from (${WINDOWS}) w where from_at <= :at) w
     where back <= :count order by vessel_id, from_at`,
    { vessels: vesselIds, at, first: -count - 1, count },
  )
  return rows.map(toWindow)
}

/** Seconds to add to UTC for the wall clock, from an instant on. */
export interface ZoneOffset {
  from: Date
  seconds: number
}

const OFFSET = `extract(epoch from (t at time zone :zone) - (t at time zone 'UTC'))::int`

/**
 * Every offset of a zone in [from, to): the first entry is `from` itself, each further one a change of the
 * clock, exact to the minute. Looks every six hours and then closer; two changes within six hours that undo
 * each other would be missed (there are none).
 */
export async function zoneOffsets(trx: Trx, timeZone: string, from: Date, to: Date): Promise<ZoneOffset[]> {
  const { rows } = await trx.raw<{ rows: { at: Date; seconds: number }[] }>(
    `with coarse as (
       select t, ${OFFSET} as seconds from (
         select generate_series(cast(:from as timestamptz), cast(:to as timestamptz), interval '6 hours') as t
         union select cast(:to as timestamptz)) grid
     ), pairs as (
       select t, seconds, lag(t) over w as t0, lag(seconds) over w as seconds0 from coarse window w as (order by t)
     ), changes as (
       select (select min(t) from (
           select generate_series(date_trunc('minute', t0), date_trunc('minute', pairs.t) + interval '1 minute', interval '1 minute') as t) fine
         where t > t0 and ${OFFSET} <> seconds0) as at, seconds
       from pairs where seconds <> seconds0
     )
     select cast(:from as timestamptz) as at, seconds from coarse where t = :from
     union all select at, seconds from changes where at < :to
     order by at`,
    { zone: timeZone, from, to },
  )
  return rows.map((row) => ({ from: row.at, seconds: row.seconds }))
}

/** A zone's offset in seconds at one instant. */
export async function zoneOffsetAt(trx: Trx, timeZone: string, at: Date): Promise<number> {
  const { rows } = await trx.raw<{ rows: { seconds: number }[] }>(
    `select ${OFFSET} as seconds from (select cast(:at as timestamptz) as t) x`,
    { zone: timeZone, at },
  )
  return rows[0]?.seconds ?? 0
}

/** Wall-clock text of an instant in a zone, `2026-12-01T23:40`. */
export async function localText(trx: Trx, timeZone: string, at: Date): Promise<string> {
  const { rows } = await trx.raw<{ rows: { local: string }[] }>(
    `select to_char(cast(? as timestamptz) at time zone ?, 'YYYY-MM-DD"T"HH24:MI') as local`,
    [at, timeZone],
  )
  return rows[0]?.local ?? ''
}

/** Whether the database's zone data hold this IANA name. */
export async function zoneKnown(trx: Trx, timeZone: string): Promise<boolean> {
  const { rows } = await trx.raw<{ rows: { known: boolean }[] }>(
    'select exists (select 1 from pg_timezone_names where name = ?) as known',
    [timeZone],
  )
  return rows[0]?.known ?? false
}

export interface KnownZone {
  name: string
  utcOffsetSeconds: number
}

/**
 * Zones whose name holds the words, those that begin with them first; places before abbreviations. What the
 * system's zone files hold twice under another folder is left out.
 */
export async function findZones(trx: Trx, search: string, limit: number): Promise<KnownZone[]> {
  const { rows } = await trx.raw<{ rows: KnownZone[] }>(
    `select name, extract(epoch from utc_offset)::int as "utcOffsetSeconds"
     from pg_timezone_names, lateral (select lower(translate(name, '_', ' ')) as said,
       lower(translate(cast(:search as text), '_', ' ')) as asked) words
     where name !~ '^(posix|right)/' and name !~ '^(localtime|posixrules|Factory)$' and position(asked in said) > 0
     order by position('/' in name) = 0, name ~ '^Etc/',
       not (said like asked || '%' or split_part(said, '/', -1) like asked || '%'), name
     limit :limit`,
    { search, limit },
  )
  return rows
}
