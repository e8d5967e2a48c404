import type { Trx } from '@/db/roles'

export const TRACE_CHANNELS = ['vacuum', 'air', 'barometer', 'supply'] as const
export type TraceChannelName = (typeof TRACE_CHANNELS)[number]

/** One bucket; a channel that was not measured in it is null. Times epoch milliseconds. */
export type TraceBucket = { at: number; firstAt: number; lastAt: number } & Record<
  TraceChannelName,
  { min: number; max: number; mean: number } | null
>

const MS = (column: string) => `(extract(epoch from ${column}) * 1000)::float8`

type RawBucket = { at: number; first_at: number; last_at: number } & Record<string, number | null>

/**
 * The record of a system in buckets on multiples of the resolution; nothing for those without the full record.
 * @param resolutionMs from an hour on a whole number of hours
 */
export async function readTraceBuckets(
  trx: Trx,
  systemId: string,
  span: { from: Date; to: Date; resolutionMs: number },
): Promise<TraceBucket[]> {
  const figures = TRACE_CHANNELS.flatMap((name) => [`${name}_min`, `${name}_max`, `${name}_mean`])
  const { rows } = await trx.raw<{ rows: RawBucket[] }>(
    `select ${MS('bucket')} as at, ${MS('first_at')} as first_at, ${MS('last_at')} as last_at, ${figures.join(', ')}
     from system_trace(?, ?, ?, make_interval(secs => ?))`,
    [systemId, span.from, span.to, span.resolutionMs / 1000],
  )
  const channel = (row: RawBucket, name: TraceChannelName) => {
    const [min, max, mean] = [row[`${name}_min`], row[`${name}_max`], row[`${name}_mean`]]
    return min == null || max == null || mean == null ? null : { min, max, mean }
  }
  return rows.map((row) => ({
    at: row.at,
    firstAt: row.first_at,
    lastAt: row.last_at,
    vacuum: channel(row, 'vacuum'),
    air: channel(row, 'air'),
    barometer: channel(row, 'barometer'),
    supply: channel(row, 'supply'),
  }))
}

export interface TraceRun {
  startedAt: number
  stoppedAt: number | null
  trigger: 'leak' | 'flush' | 'startup' | 'unknown'
}

/** Runs that touch [from, to), as many as the person sees. */
export async function readTraceRuns(trx: Trx, systemId: string, from: Date, to: Date): Promise<TraceRun[]> {
  const { rows } = await trx.raw<{ rows: TraceRun[] }>(
    `select ${MS('started_at')} as "startedAt", ${MS('stopped_at')} as "stoppedAt", trigger from run
     where system_id = ? and started_at < ? and stopped_at >= ? order by started_at`,
    [systemId, to, from],
  )
  return rows
}

export interface TraceFlush {
  at: number
  dropPa: number
  startedPump: boolean
}

export async function readTraceFlushes(
  trx: Trx,
  systemId: string,
  from: Date,
  to: Date,
): Promise<TraceFlush[]> {
  const { rows } = await trx.raw<{ rows: TraceFlush[] }>(
    `select ${MS('at')} as at, drop_pa as "dropPa", started_pump as "startedPump" from flush
     where system_id = ? and at >= ? and at < ? order by at`,
    [systemId, from, to],
  )
  return rows
}

/** Zone of the system's vessel and rhythm of the logger now fitted (or fitted last). */
export async function readTracePlace(
  trx: Trx,
  systemId: string,
): Promise<{ timeZone: string; intervalSeconds: number }> {
  const { rows } = await trx.raw<{ rows: { timeZone: string; intervalSeconds: number }[] }>(
    `select v.time_zone as "timeZone", coalesce((select l.interval_seconds from logger_fitting f
       join logger l on l.id = f.logger_id where f.system_id = s.id order by lower(f.span) desc limit 1), 60) as "intervalSeconds"
     from system s join vessel v on v.id = s.vessel_id where s.id = ?`,
    [systemId],
  )
  return rows[0] ?? { timeZone: 'Etc/UTC', intervalSeconds: 60 }
}
