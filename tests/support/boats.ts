import { randomBytes } from 'node:crypto'
import type { Knex } from '@/db/knex'
import { hashKey } from '@/ingest/who-sends'
import { ingest } from '@/ingest/ingest'
import { answering } from '@/lib/problem'

/** A vessel with one system and one logger of its own. */
export interface Boat {
  vesselId: string
  systemId: string
  loggerId: string
  serial: string
  key: string
}

let count = 0

/** Puts a boat into the database, its logger fitted from the beginning. */
export async function newBoat(
  knex: Knex,
  options: { intervalSeconds?: number; channels?: string[]; cutOutPa?: number; cutInPa?: number } = {},
): Promise<Boat> {
  count += 1
  const serial = `SALT-${process.pid}-${count}`
  const key = randomBytes(32).toString('base64url')
  const only = <T>(rows: T[]): T => {
    const [row] = rows
    if (row === undefined) throw new Error('nothing was inserted')
    return row
  }
  const vessel = only<{ id: string }>(
    await knex('vessel')
      .insert({ name: `Saltmarsh Hare ${count}`, time_zone: 'Europe/Lisbon' })
      .returning('id'),
  )
  const system = only<{ id: string }>(await knex('system').insert({ vessel_id: vessel.id }).returning('id'))
  await knex('setting').insert({
    system_id: system.id,
    in_force_from: '2026-01-01',
    cut_out_pa: options.cutOutPa ?? 33_864,
    cut_in_pa: options.cutInPa ?? 27_091,
  })
  const logger = only<{ id: number }>(
    await knex('logger')
      .insert({
        serial,
        interval_seconds: options.intervalSeconds ?? 60,
        channels: options.channels ?? ['pump', 'vacuum', 'air', 'barometer', 'supply'],
        key_hash: hashKey(key),
      })
      .returning('id'),
  )
  await knex.raw(
    `insert into logger_fitting (logger_id, system_id, span) values (?, ?, tstzrange('1970-01-01', null))`,
    [logger.id, system.id],
  )
  return { vesselId: vessel.id, systemId: system.id, loggerId: String(logger.id), serial, key }
}

export interface Reading {
  /** Epoch seconds. */
  t: number
  vacuum?: number
  pump?: boolean
  air?: number
  barometer?: number
  supply?: number
}

const UNITS = { vacuum: 'Pa', air: 'Cel', barometer: 'Pa', supply: 'V' } as const

/** Readings as the records of a SenML pack. */
export function senml(serial: string, readings: readonly Reading[]): Record<string, unknown>[] {
  return readings.flatMap((reading) => {
    const name = (channel: string) => `urn:dev:mw:${serial}:${channel}`
    const { t } = reading
    const records: Record<string, unknown>[] = []
    if (reading.pump !== undefined) records.push({ n: name('pump'), vb: reading.pump, t })
    for (const channel of ['vacuum', 'air', 'barometer', 'supply'] as const) {
      const v = reading[channel]
      if (v !== undefined) records.push({ n: name(channel), u: UNITS[channel], v, t })
    }
    return records
  })
}

/** What an upload was answered, as its JSON is. */
export interface Sent {
  status: number
  headers: Headers
  body: {
    upload?: string
    samples?: { received: number; stored: number; duplicate: number; conflicting: number; rejected: number }
    rejected?: { index: number; reason: string }[]
    rejectedRecords?: number
    clock?: { offsetSeconds: number | null }
    serverTime?: string
    next?: { intervalSeconds: number; until: string | null }
    type?: string
    detail?: string
  }
}

const isPack = (body: unknown): body is readonly object[] => Array.isArray(body)

/** Sends an upload to ingest in this process, received at `at`. */
export async function send(
  boat: Pick<Boat, 'key'>,
  body: string | Uint8Array<ArrayBuffer> | ReadableStream | readonly object[],
  options: { at?: Date; headers?: Record<string, string> } = {},
): Promise<Sent> {
  const request = new Request('http://boat.example/api/ingest', {
    method: 'POST',
    headers: {
      authorization: `Bearer ${boat.key}`,
      'content-type': 'application/senml+json',
      ...options.headers,
    },
    body: isPack(body) ? JSON.stringify(body) : body,
    // A streamed body is sent while it is made.
    ...(body instanceof ReadableStream ? { duplex: 'half' } : {}),
  })
  const response = await answering(
    async () => Response.json(await ingest(request, options.at ?? new Date())),
    (error) => {
      throw error
    },
  )
  return { status: response.status, headers: response.headers, body: await response.json() }
}

/**
 * A boat's readings in its rhythm, with one at each pump edge: an orifice-like leak between the switch's points,
 * flushes at set hours, a short gap now and then. Whole seconds, drawn from `seed`, the same every time.
 */
export function readingsOf(options: {
  fromSeconds: number
  hours: number
  intervalSeconds?: number
  seed?: number
  leakPaPerHour?: number
  /** Seconds between readings of air, barometer and supply. */
  weatherSeconds?: number
}): Reading[] {
  const { fromSeconds, hours, intervalSeconds = 60, leakPaPerHour = 2_500, weatherSeconds = 300 } = options
  const random = lcg(options.seed ?? 1)
  const readings: Reading[] = []
  let vacuum = 33_864
  let pump = false
  let silentUntil = 0
  for (let s = 0; s < hours * 3600; s += 5) {
    const hour = (s / 3600) % 24
    if (random() < (hour > 6 && hour < 22 ? 0.0007 : 0.00005)) vacuum -= 2_500 + 1_500 * random()
    vacuum = Math.max(0, pump ? vacuum + 600 : vacuum - (leakPaPerHour * 5 * (vacuum / 30_000)) / 3600)
    const before: boolean = pump
    if (vacuum < 27_091) pump = true
    if (vacuum > 33_864) pump = false
    if (random() < 0.00003) silentUntil = s + 3_600 * random()
    if (s < silentUntil || (s % intervalSeconds !== 0 && pump === before)) continue
    const reading: Reading = { t: fromSeconds + s, vacuum: Math.round(vacuum + 40 * (random() - 0.5)), pump }
    if (s % weatherSeconds === 0) {
      reading.air = Math.round((17 + 4 * Math.sin((s / 86_400) * 2 * Math.PI)) * 10) / 10
      reading.barometer = 101_000 + Math.round(300 * Math.sin(s / 40_000))
      reading.supply = 12.6
    }
    readings.push(reading)
  }
  return readings
}

function lcg(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0
    return state / 2 ** 32
  }
}

/** Everything derived of a system and its logger's samples, without ids: two boats of one story have equal ones. */
export async function dump(knex: Knex, boat: Boat): Promise<Record<string, string[]>> {
  const texts = async (sql: string, id: string): Promise<string[]> =>
    (await knex.raw<{ rows: { t: string }[] }>(sql, [id])).rows.map((row) => row.t).sort()
  const bySystem = (table: string) =>
    texts(
      `select (to_jsonb(x) - 'system_id')::text as t from "${table}" x where system_id = ?`,
      boat.systemId,
    )
  const byLogger = (table: string) =>
    texts(
      `select (to_jsonb(x) - 'logger_id' - 'upload_id')::text as t from "${table}" x where logger_id = ?`,
      boat.loggerId,
    )
  return {
    samples: await byLogger('sample'),
    hours: await byLogger('sample_hour'),
    runs: await bySystem('run'),
    holds: await bySystem('hold'),
    legs: await bySystem('leg'),
    flushes: await bySystem('flush'),
    faults: await bySystem('fault'),
    days: await bySystem('system_day'),
    // The state names the logger, which is another one on another boat.
    checkpoints: (await bySystem('checkpoint')).map((text) =>
      text.replace(/"loggerId": "\d+"/, '"loggerId": "x"'),
    ),
    head: (
      await texts(
        `select coalesce(head_at::text || head::text, '') as t from system_state where system_id = ?`,
        boat.systemId,
      )
    ).map((text) => text.replace(/"loggerId": "\d+"/, '"loggerId": "x"')),
  }
}
