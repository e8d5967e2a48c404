import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import type { Client } from 'pg'
import { from as copyFrom } from 'pg-copy-streams'
import { arrayLiteral } from '@/db/array-literal'
import type { Trx } from '@/db/roles'

/** Samples of one logger as parallel columns; NaN (pump: -1) = not measured. Times ascending, epoch milliseconds. */
export interface SampleColumns {
  count: number
  at: Float64Array
  vacuumPa: Float64Array
  airC: Float64Array
  barometerPa: Float64Array
  supplyV: Float64Array
  pumpOn: Int8Array
}

export interface StoredSample {
  atMs: number
  vacuumPa: number | null
  airC: number | null
  barometerPa: number | null
  supplyV: number | null
  pumpOn: boolean | null
  /** It came with a person's import, so the logger's own takes its place. */
  imported: boolean
}

/** Above this COPY is the faster way; below it the round trips of COPY cost more than they save. */
export const COPY_ABOVE = 5_000

const instant = (ms: number): string => new Date(ms).toISOString()
const orNull = (value: number): number | null => (Number.isNaN(value) ? null : value)

/** True when the logger has any sample in [fromMs, toMs]. */
export async function anyStored(trx: Trx, loggerId: string, fromMs: number, toMs: number): Promise<boolean> {
  const { rows } = await trx.raw<{ rows: unknown[] }>(
    'select 1 from sample where logger_id = ? and at between ? and ? limit 1',
    [loggerId, instant(fromMs), instant(toMs)],
  )
  return rows.length > 0
}

/** What is stored at these times, ascending. Times as epoch milliseconds, at most a few thousand. */
export async function storedAt(trx: Trx, loggerId: string, times: number[]): Promise<StoredSample[]> {
  const first = times[0]
  const last = times.at(-1)
  if (first === undefined || last === undefined) return []
  // The range is said beside the list so that months outside it are never looked at.
  const { rows } = await trx.raw<{ rows: RawStored[] }>(
    `select (extract(epoch from s.at) * 1000)::float8 as at_ms, s.vacuum_pa, s.air_c, s.barometer_pa, s.supply_v,
       s.pump_on, coalesce(u.format = 'import', false) as imported
     from sample s left join upload u on u.id = s.upload_id
     where s.logger_id = ? and s.at between ? and ? and s.at = any (?::timestamptz[]) order by s.at`,
    [loggerId, instant(first), instant(last), arrayLiteral(times.map(instant))],
  )
  return rows.map((row) => ({
    atMs: row.at_ms,
    vacuumPa: row.vacuum_pa,
    airC: row.air_c,
    barometerPa: row.barometer_pa,
    supplyV: row.supply_v,
    pumpOn: row.pump_on,
    imported: row.imported,
  }))
}

interface RawStored {
  at_ms: number
  vacuum_pa: number | null
  air_c: number | null
  barometer_pa: number | null
  supply_v: number | null
  pump_on: boolean | null
  imported: boolean
}

const ARRAYS = `unnest(?::timestamptz[], ?::real[], ?::real[], ?::real[], ?::real[], ?::bool[])
  as n (at, vacuum_pa, air_c, barometer_pa, supply_v, pump_on)`

function arrays(samples: SampleColumns): string[] {
  const column = (values: Float64Array) => arrayLiteral(Array.from(values.subarray(0, samples.count), orNull))
  return [
    arrayLiteral(Array.from(samples.at.subarray(0, samples.count), instant)),
    column(samples.vacuumPa),
    column(samples.airC),
    column(samples.barometerPa),
    column(samples.supplyV),
    arrayLiteral(
      Array.from(samples.pumpOn.subarray(0, samples.count), (on) => (on === -1 ? null : on === 1)),
    ),
  ]
}

/** Adds samples at times that are not stored yet: by COPY when they are many. The logger must be locked. */
export async function insertSamples(
  trx: Trx,
  loggerId: string,
  uploadId: string,
  samples: SampleColumns,
): Promise<void> {
  if (samples.count === 0) return
  if (samples.count > COPY_ABOVE) return copySamples(trx, loggerId, uploadId, samples)
  await trx.raw(
    `insert into sample (logger_id, upload_id, at, vacuum_pa, air_c, barometer_pa, supply_v, pump_on)
     select ?, ?, n.* from ${ARRAYS}`,
    [loggerId, uploadId, ...arrays(samples)],
  )
}

/** Puts values where stored samples have none, and leaves those that stand. */
export async function fillSamples(trx: Trx, loggerId: string, samples: SampleColumns): Promise<void> {
  if (samples.count === 0) return
  await trx.raw(
    `update sample s set vacuum_pa = coalesce(s.vacuum_pa, n.vacuum_pa), air_c = coalesce(s.air_c, n.air_c),
       barometer_pa = coalesce(s.barometer_pa, n.barometer_pa), supply_v = coalesce(s.supply_v, n.supply_v),
       pump_on = coalesce(s.pump_on, n.pump_on)
     from ${ARRAYS}
     where s.logger_id = ? and s.at = n.at and s.at between ? and ?`,
    [...arrays(samples), loggerId, ...ends(samples)],
  )
}

/** Replaces stored samples whole, provenance included: a logger's own word over an import's. */
export async function replaceSamples(
  trx: Trx,
  loggerId: string,
  uploadId: string,
  samples: SampleColumns,
): Promise<void> {
  if (samples.count === 0) return
  await trx.raw(
    `update sample s set upload_id = ?, vacuum_pa = n.vacuum_pa, air_c = n.air_c, barometer_pa = n.barometer_pa,
       supply_v = n.supply_v, pump_on = n.pump_on
     from ${ARRAYS}
     where s.logger_id = ? and s.at = n.at and s.at between ? and ?`,
    [uploadId, ...arrays(samples), loggerId, ...ends(samples)],
  )
}

const ends = (samples: SampleColumns): [string, string] => [
  instant(samples.at[0] ?? 0),
  instant(samples.at[samples.count - 1] ?? 0),
]

/** Takes back what an upload brought; answers the first and last time taken, or null when nothing was left of it. */
export async function deleteSamplesOf(
  trx: Trx,
  loggerId: string,
  uploadId: string,
  span: { fromMs: number; toMs: number },
): Promise<{ count: number; fromMs: number; toMs: number } | null> {
  const { rows } = await trx.raw<{ rows: { count: number; from_ms: number; to_ms: number }[] }>(
    `with gone as (delete from sample where logger_id = ? and at between ? and ? and upload_id = ? returning at)
     select count(*)::int as count, (extract(epoch from min(at)) * 1000)::float8 as from_ms,
       (extract(epoch from max(at)) * 1000)::float8 as to_ms from gone`,
    [loggerId, instant(span.fromMs), instant(span.toMs), uploadId],
  )
  const row = rows[0]
  return row === undefined || row.count === 0
    ? null
    : { count: row.count, fromMs: row.from_ms, toMs: row.to_ms }
}

/** Makes the hourly extremes of these hours (epoch milliseconds of their starts) anew from the samples. */
export async function rollUpHours(trx: Trx, loggerId: string, hoursMs: number[]): Promise<void> {
  if (hoursMs.length === 0) return
  const hours = arrayLiteral(hoursMs.map(instant))
  await trx.raw('delete from sample_hour where logger_id = ? and hour = any (?::timestamptz[])', [
    loggerId,
    hours,
  ])
  // An hour at a time by the key, whatever the planner thinks of freshly loaded months; summed in the order of
  // time, since a sum of floats depends on its order.
  await trx.raw(
    `insert into sample_hour
     select ?::integer, h.hour, s.*
     from unnest(?::timestamptz[]) as h (hour)
     cross join lateral (
       select count(*) as samples, min(vacuum_pa), max(vacuum_pa), avg(vacuum_pa), min(air_c), max(air_c), avg(air_c),
         min(supply_v), max(supply_v), avg(supply_v), min(barometer_pa), max(barometer_pa), avg(barometer_pa)
       from (select vacuum_pa, air_c, supply_v, barometer_pa from sample
             where logger_id = ? and at >= h.hour and at < h.hour + interval '1 hour' order by at) o) s
     where s.samples > 0`,
    [loggerId, hours, loggerId],
  )
}

const COPY_CHUNK_BYTES = 1024 * 1024
const COPY_SIGNATURE = Buffer.from('PGCOPY\n\xff\r\n\0\0\0\0\0\0\0\0\0', 'latin1')
/** PostgreSQL counts microseconds from the year 2000. */
const PG_EPOCH_MS = Date.UTC(2000, 0, 1)
/** Field count, then length and bytes of logger, upload, time, four reals and the pump. */
const MAX_TUPLE_BYTES = 2 + 8 + 8 + 12 + 4 * 8 + 5

async function copySamples(
  trx: Trx,
  loggerId: string,
  uploadId: string,
  samples: SampleColumns,
): Promise<void> {
  const client: Client = await trx.client.acquireConnection()
  const target = client.query(
    copyFrom(
      `copy sample (logger_id, upload_id, at, vacuum_pa, air_c, barometer_pa, supply_v, pump_on)
       from stdin with (format binary)`,
    ),
  )
  await pipeline(Readable.from(binaryTuples(Number(loggerId), Number(uploadId), samples)), target)
}

function* binaryTuples(loggerId: number, uploadId: number, samples: SampleColumns): Generator<Buffer> {
  const { count, at, vacuumPa, airC, barometerPa, supplyV, pumpOn } = samples
  const reals = [vacuumPa, airC, barometerPa, supplyV]
  let buffer = Buffer.allocUnsafe(COPY_CHUNK_BYTES)
  let offset = COPY_SIGNATURE.copy(buffer)
  for (let i = 0; i < count; i += 1) {
    if (offset + MAX_TUPLE_BYTES > COPY_CHUNK_BYTES) {
      yield buffer.subarray(0, offset)
      buffer = Buffer.allocUnsafe(COPY_CHUNK_BYTES)
      offset = 0
    }
    offset = buffer.writeInt16BE(8, offset)
    offset = buffer.writeInt32BE(4, offset)
    offset = buffer.writeInt32BE(loggerId, offset)
    offset = buffer.writeInt32BE(4, offset)
    offset = buffer.writeInt32BE(uploadId, offset)
    offset = buffer.writeInt32BE(8, offset)
    // Microseconds of this century stay under 2**53, so the two halves are exact.
    const micros = ((at[i] ?? 0) - PG_EPOCH_MS) * 1000
    offset = buffer.writeInt32BE(Math.floor(micros / 2 ** 32), offset)
    offset = buffer.writeUInt32BE(((micros % 2 ** 32) + 2 ** 32) % 2 ** 32, offset)
    for (const column of reals) {
      const value = column[i] ?? NaN
      offset = buffer.writeInt32BE(Number.isNaN(value) ? -1 : 4, offset)
      if (!Number.isNaN(value)) offset = buffer.writeFloatBE(value, offset)
    }
    const pump = pumpOn[i] ?? -1
    offset = buffer.writeInt32BE(pump === -1 ? -1 : 1, offset)
    if (pump !== -1) offset = buffer.writeUInt8(pump, offset)
  }
  if (offset + 2 > COPY_CHUNK_BYTES) {
    yield buffer.subarray(0, offset)
    buffer = Buffer.allocUnsafe(2)
    offset = 0
  }
  offset = buffer.writeInt16BE(-1, offset)
  yield buffer.subarray(0, offset)
}

/** A span of samples: from inclusive, before exclusive, last inclusive; epoch milliseconds, may be infinite. */
export interface SampleSpan {
  fromMs: number
  beforeMs: number
  lastMs: number
}

/** Epoch milliseconds, vacuum Pa, pump, air °C, barometer Pa, supply V. */
export type SampleTuple = [number, number | null, boolean | null, number | null, number | null, number | null]

/** One page of a logger's samples as stored, ascending: the first `limit` of the span. */
export async function pageOfSamples(
  trx: Trx,
  loggerId: string,
  span: SampleSpan,
  limit: number,
): Promise<SampleTuple[]> {
  const { rows } = await trx
    .raw<{ rows: SampleTuple[] }>(
      `select (extract(epoch from at) * 1000)::float8, vacuum_pa, pump_on, air_c, barometer_pa, supply_v
       from sample where logger_id = ? and at >= ? and at < ? and at <= ? order by at limit ?`,
      [loggerId, bound(span.fromMs), bound(span.beforeMs), bound(span.lastMs), limit],
    )
    .options({ rowMode: 'array' })
  return rows
}

const bound = (ms: number): string =>
  ms === Infinity ? 'infinity' : ms === -Infinity ? '-infinity' : instant(ms)
