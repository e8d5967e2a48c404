import { gzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { newBoat, send, senml, type Boat, type Reading } from '../support/boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const NOW = new Date('2026-11-20T12:00:00.000Z')
const T = NOW.getTime() / 1000 - 3600

let database: TestDatabase
let boat: Boat

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
})
afterAll(() => database.drop())

const fresh = async () => (boat = await newBoat(database.knex))
const post = (readings: Reading[], headers: Record<string, string> = {}, at = NOW) =>
  send(boat, senml(boat.serial, readings), { at, headers })
const stored = (): Promise<Record<string, unknown>[]> =>
  database
    .knex('sample')
    .where({ logger_id: boat.loggerId })
    .orderBy('at')
    .select('at', 'vacuum_pa', 'air_c', 'barometer_pa', 'supply_v', 'pump_on')
const uploads = async () =>
  Number((await database.knex('upload').where({ logger_id: boat.loggerId }).count())[0]?.count)

describe('what an upload is answered', () => {
  it('merges records of one time into a sample and rounds', async () => {
    await fresh()
    const { status, body } = await post([
      { t: T + 0.00049, vacuum: 30000.04, pump: false, air: 18.004, barometer: 101325.06, supply: 12.605 },
      { t: T + 60, vacuum: 29_990 },
    ])
    expect(status).toBe(200)
    expect(body).toMatchObject({
      samples: { received: 2, stored: 2, duplicate: 0, conflicting: 0, rejected: 0 },
      rejected: [],
      rejectedRecords: 0,
      clock: { offsetSeconds: null },
      serverTime: NOW.toISOString(),
      next: { intervalSeconds: 60, until: null },
    })
    expect(body.upload).toMatch(/^\d+$/)
    expect(await stored()).toEqual([
      {
        at: new Date(T * 1000),
        vacuum_pa: 30_000,
        air_c: 18,
        barometer_pa: 101_325.1,
        supply_v: 12.61,
        pump_on: false,
      },
      {
        at: new Date((T + 60) * 1000),
        vacuum_pa: 29_990,
        air_c: null,
        barometer_pa: null,
        supply_v: null,
        pump_on: null,
      },
    ])
  })

  it('counts a sample once: duplicate, filled in, conflicting, rejected', async () => {
    await fresh()
    await post([
      { t: T, vacuum: 30_000 },
      { t: T + 60, vacuum: 29_900 },
      { t: T + 120, vacuum: 29_800 },
    ])
    const { body } = await post([
      { t: T, vacuum: 30_000.04 },
      { t: T + 60, vacuum: 29_900, air: 18 },
      { t: T + 120, vacuum: 29_700, air: 19 },
      { t: T + 180, vacuum: -30_000 },
      { t: T + 240, vacuum: 29_600 },
    ])
    expect(body.samples).toEqual({ received: 5, stored: 2, duplicate: 1, conflicting: 1, rejected: 1 })
    const rows = await stored()
    expect(rows.map((row) => [row.vacuum_pa, row.air_c])).toEqual([
      [30_000, null],
      [29_900, 18],
      [29_800, 19],
      [29_600, null],
    ])
  })

  it('lets the first of two values within one upload stand', async () => {
    await fresh()
    const { body } = await post([
      { t: T, vacuum: 30_000 },
      { t: T, vacuum: 31_000 },
    ])
    expect(body.samples).toEqual({ received: 1, stored: 0, duplicate: 0, conflicting: 1, rejected: 0 })
    expect((await stored())[0]?.vacuum_pa).toBe(30_000)
  })

  it('names the reason of every refused record', async () => {
    await fresh()
    const other = await newBoat(database.knex)
    const vacuum = { n: `${boat.serial}:vacuum`, u: 'Pa', v: 30_000, t: T }
    const { status, body } = await send(
      boat,
      [
        vacuum,
        { ...vacuum, t: NOW.getTime() / 1000 + 121 },
        { ...vacuum, t: NOW.getTime() / 1000 - 400 * 86_400 - 1 },
        { ...vacuum, v: -20_001, t: T + 1 },
        { ...vacuum, v: 101_400, t: T + 2 },
        { ...vacuum, n: 'air', u: 'Cel', v: 85.1, t: T + 3 },
        { ...vacuum, n: 'barometer', v: 110_001, t: T + 4 },
        { ...vacuum, n: 'supply', u: 'V', v: 60.1, t: T + 5 },
        { ...vacuum, n: 'bilge', t: T + 6 },
        { ...vacuum, u: 'inHg', t: T + 7 },
        { n: 'pump', v: 1, t: T + 8 },
        { ...vacuum, n: `urn:dev:mw:${other.serial}:vacuum`, t: T + 9 },
      ],
      { at: NOW },
    )
    expect(status).toBe(200)
    expect(body.rejected).toEqual([
      { index: 1, reason: 'future' },
      { index: 2, reason: 'too-old' },
      { index: 3, reason: 'impossible' },
      { index: 4, reason: 'impossible' },
      { index: 5, reason: 'impossible' },
      { index: 6, reason: 'impossible' },
      { index: 7, reason: 'impossible' },
      { index: 8, reason: 'unknown-channel' },
      { index: 9, reason: 'unknown-unit' },
      { index: 10, reason: 'bad-value' },
      { index: 11, reason: 'other-logger' },
    ])
    expect(body.rejectedRecords).toBe(11)
    expect(body.samples).toEqual({ received: 12, stored: 1, duplicate: 0, conflicting: 0, rejected: 11 })
  })

  it('judges vacuum by the barometer of the same sample', async () => {
    await fresh()
    const { body } = await post([
      { t: T, vacuum: 95_000, barometer: 96_000 },
      { t: T + 60, vacuum: 95_000, barometer: 94_000 },
    ])
    expect(body.samples).toMatchObject({ stored: 2, rejected: 0 })
    expect(body.rejected).toEqual([{ index: 2, reason: 'impossible' }])
    expect((await stored()).map((row) => row.vacuum_pa)).toEqual([95_000, null])
  })

  it('lists the first hundred refused records and counts all', async () => {
    await fresh()
    const bad = Array.from({ length: 150 }, (_, i) => ({ n: 'vacuum', u: 'psi', v: 4, t: T + i }))
    const { body } = await send(boat, [...bad, { n: 'vacuum', u: 'Pa', v: 30_000, t: T }], { at: NOW })
    expect(body.rejected).toHaveLength(100)
    expect(body.rejectedRecords).toBe(150)
    expect(body.samples).toEqual({ received: 150, stored: 1, duplicate: 0, conflicting: 0, rejected: 149 })
  })

  it('asks for a finer rhythm while somebody watches', async () => {
    await fresh()
    const until = new Date(NOW.getTime() + 600_000)
    await database
      .knex('logger')
      .where({ id: boat.loggerId })
      .update({ fine_interval_seconds: 1, fine_until: until })
    expect((await post([{ t: T, vacuum: 30_000 }])).body.next).toEqual({
      intervalSeconds: 1,
      until: until.toISOString(),
    })
    expect((await post([{ t: T, vacuum: 30_000 }], {}, new Date(until.getTime() + 1))).body.next).toEqual({
      intervalSeconds: 60,
      until: null,
    })
  })
})

describe('the clock', () => {
  const off = (seconds: number) => ({ date: new Date(NOW.getTime() + seconds * 1000).toUTCString() })

  it('says how far it is off, and leaves two minutes be', async () => {
    await fresh()
    const { body } = await post([{ t: T, vacuum: 30_000 }], off(90))
    expect(body.clock?.offsetSeconds).toBe(90)
    expect((await stored())[0]?.at).toEqual(new Date(T * 1000))
  })

  it('takes the offset off before a time is called future', async () => {
    await fresh()
    const ahead = NOW.getTime() / 1000 + 200
    expect((await post([{ t: ahead, vacuum: 30_000 }], off(100))).body.samples?.stored).toBe(1)
    expect((await post([{ t: ahead + 30, vacuum: 30_000 }], off(100))).status).toBe(422)
  })

  it('shifts what is over two minutes off and keeps both', async () => {
    await fresh()
    const { body } = await post([{ t: T + 7200, vacuum: 30_000 }], off(7200))
    expect(body.clock?.offsetSeconds).toBe(7200)
    expect((await stored())[0]?.at).toEqual(new Date(T * 1000))
    expect(
      await database
        .knex('upload')
        .where({ logger_id: boat.loggerId })
        .first('clock_offset_seconds', 'shift_seconds'),
    ).toEqual({ clock_offset_seconds: 7200, shift_seconds: 7200 })
  })

  it('puts a pack that is sent again on the same times, however long the way took', async () => {
    await fresh()
    const pack = [
      { t: T - 86_400, vacuum: 30_000 },
      { t: T - 86_340, vacuum: 29_990 },
    ]
    await post(pack, off(-86_400))
    const later = new Date(NOW.getTime() + 4_600)
    const { body } = await post(pack, off(-86_400), later)
    expect(body.samples).toMatchObject({ received: 2, stored: 0, duplicate: 2 })
  })

  it('counts relative times from receipt, whatever the logger takes the time to be', async () => {
    await fresh()
    const { body } = await post(
      [
        { t: -60, vacuum: 30_000 },
        { t: 0, vacuum: 29_990 },
      ],
      off(86_400),
    )
    expect(body.samples?.stored).toBe(2)
    expect((await stored()).map((row) => row.at)).toEqual([new Date(NOW.getTime() - 60_000), NOW])
  })
})

describe('Idempotency-Key', () => {
  it('gives the same answer again for seven days', async () => {
    await fresh()
    const key = { 'idempotency-key': 'pack-1' }
    const first = await post([{ t: -60, vacuum: 30_000 }], key)
    const again = await post([{ t: -60, vacuum: 30_000 }], key, new Date(NOW.getTime() + 90_000))
    expect(again.body).toEqual(first.body)
    expect(await stored()).toHaveLength(1)
    const after = new Date(NOW.getTime() + 7 * 86_400_000 + 1)
    expect((await post([{ t: -60, vacuum: 30_000 }], key, after)).body.upload).not.toBe(first.body.upload)
    expect(await stored()).toHaveLength(2)
  })

  it('belongs to one logger', async () => {
    await fresh()
    const first = await post([{ t: T, vacuum: 30_000 }], { 'idempotency-key': 'same' })
    await fresh()
    const second = await post([{ t: T, vacuum: 30_000 }], { 'idempotency-key': 'same' })
    expect(second.body.upload).not.toBe(first.body.upload)
    expect(second.body.samples?.stored).toBe(1)
  })
})

describe('CSV', () => {
  const csv = (text: string | Uint8Array<ArrayBuffer>, headers: Record<string, string> = {}) =>
    send(boat, text, { at: NOW, headers: { 'content-type': 'text/csv; charset=utf-8', ...headers } })

  it('takes columns in any order, both kinds of time and empty cells', async () => {
    await fresh()
    const { status, body } = await csv(
      `supply_v,time,pump,vacuum_pa\r\n12.6,${T},true,30000.04\r\n,2026-11-20T11:01:00.5Z,0,\r\n,2026-11-20T12:02:00+01:00,1,29980\r\n`,
    )
    expect(status).toBe(200)
    expect(body.samples).toEqual({ received: 3, stored: 3, duplicate: 0, conflicting: 0, rejected: 0 })
    expect((await stored()).map((row) => [row.at, row.vacuum_pa, row.pump_on, row.supply_v])).toEqual([
      [new Date(T * 1000), 30_000, true, 12.6],
      [new Date('2026-11-20T11:01:00.500Z'), null, false, null],
      [new Date('2026-11-20T11:02:00.000Z'), 29_980, true, null],
    ])
  })

  it('counts a row once, however many of its cells are refused', async () => {
    await fresh()
    const { body } = await csv(
      `time,vacuum_pa,air_cel,note\n${T},30000,99,\n${T + 60},x,-41,\nbanana,30000,,\n${T + 120},29000,18,windy\n`,
    )
    expect(body.rejected).toEqual([
      { index: 0, reason: 'impossible' },
      { index: 1, reason: 'bad-value' },
      { index: 2, reason: 'bad-value' },
      { index: 3, reason: 'unknown-channel' },
    ])
    expect(body.rejectedRecords).toBe(4)
    expect(body.samples).toEqual({ received: 3, stored: 2, duplicate: 0, conflicting: 0, rejected: 1 })
  })

  it('is the same as SenML of the same readings', async () => {
    await fresh()
    await post([{ t: T, vacuum: 30_000, pump: false, air: 18 }])
    const { body } = await csv(gzipSync(`time,vacuum_pa,pump,air_cel\n${T},30000,false,18.00\n`), {
      'content-encoding': 'gzip',
    })
    expect(body.samples).toMatchObject({ received: 1, duplicate: 1 })
  })
})

describe('many samples at once', () => {
  const many = (n: number, from = T - 86_400): Reading[] =>
    Array.from({ length: n }, (_, i) => ({
      t: from + i,
      vacuum: 30_000 - (i % 5_000),
      pump: i % 7 === 0,
      air: (i % 40) + 0.25,
    }))

  it('go in by the quick way, to the last digit, and are known again', async () => {
    await fresh()
    const first = await post(many(12_000))
    expect(first.body.samples).toEqual({
      received: 12_000,
      stored: 12_000,
      duplicate: 0,
      conflicting: 0,
      rejected: 0,
    })
    const second = await post(many(12_000))
    expect(second.body.samples).toEqual({
      received: 12_000,
      stored: 0,
      duplicate: 12_000,
      conflicting: 0,
      rejected: 0,
    })
    const [row] = (await stored()).slice(7_777)
    expect(row).toMatchObject({
      at: new Date((T - 86_400 + 7_777) * 1000),
      vacuum_pa: 27_223,
      air_c: 17.25,
      pump_on: true,
    })
    const [hour] = await database
      .knex('sample_hour')
      .where({ logger_id: boat.loggerId })
      .orderBy('hour')
      .limit(1)
    expect(hour).toMatchObject({
      samples: 3600,
      vacuum_min_pa: 26_401,
      vacuum_max_pa: 30_000,
      air_max_c: 39.25,
    })
  })

  it('merge with what lies between them', async () => {
    await fresh()
    await post(
      many(6_000)
        .filter((_, i) => i % 3 === 0)
        .map(({ t, vacuum }) => (vacuum === undefined ? { t } : { t, vacuum })),
    )
    const wrong = many(6_000).map((reading, i) => (i === 9 ? { ...reading, vacuum: 1_000 } : reading))
    const { body } = await post(wrong)
    expect(body.samples).toEqual({
      received: 6_000,
      stored: 5_999,
      duplicate: 0,
      conflicting: 1,
      rejected: 0,
    })
    const rows = await stored()
    expect(rows).toHaveLength(6_000)
    expect(rows[9]).toMatchObject({ vacuum_pa: 29_991, air_c: 9.25 })
  })
})

describe('refusals', () => {
  const refused = async (
    answer: Awaited<ReturnType<typeof send>>,
    status: number,
    kind: string,
  ): Promise<Awaited<ReturnType<typeof send>>> => {
    expect(answer.status).toBe(status)
    expect(answer.headers.get('content-type')).toBe('application/problem+json')
    expect(answer.body.type).toMatch(new RegExp(`/${kind}$`))
    expect(answer.body.detail).toMatch(/\.$/)
    return answer
  }
  const raw = (
    body: string | Uint8Array<ArrayBuffer> | ReadableStream,
    headers: Record<string, string> = {},
  ) => send(boat, body, { at: NOW, headers })

  it('401 without a known key', async () => {
    await fresh()
    const answer = await refused(await raw('[]', { authorization: 'Bearer nothing' }), 401, 'unknown-key')
    expect(answer.headers.get('www-authenticate')).toMatch(/^Bearer/)
    await refused(await raw('[]', { authorization: 'Basic abc' }), 401, 'unknown-key')
  })

  it('403 when retired', async () => {
    await fresh()
    await database.knex('logger').where({ id: boat.loggerId }).update({ retired_at: NOW })
    await refused(await post([{ t: T, vacuum: 30_000 }]), 403, 'retired')
  })

  it('415 for another kind of body or encoding', async () => {
    await fresh()
    await refused(await raw('[]', { 'content-type': 'application/json' }), 415, 'wrong-media-type')
    await refused(await raw('[]', { 'content-encoding': 'br' }), 415, 'wrong-media-type')
    await refused(
      await raw('[]', { 'content-type': 'text/csv; charset=iso-8859-1' }),
      415,
      'wrong-media-type',
    )
  })

  it('400 with the place of what cannot be parsed', async () => {
    await fresh()
    const place = async (body: string) => (await refused(await raw(body), 400, 'not-parseable')).body.detail
    expect(await place('[{"n":"vacuum",]')).toMatch(/position 15|line 1/)
    expect(await place('{"n":"vacuum"}')).toMatch(/array/)
    expect(await place('[{"n":"vacuum","u":"Pa","v":1},7]')).toMatch(/Record 1 /)
    expect(await place('[{"n":"vacuum","u":"Pa","v":1,"must_":1}]')).toMatch(/must_/)
    expect(await place('[{"bver":11,"n":"vacuum","u":"Pa","v":1}]')).toMatch(/version 11/)
    expect(await place('[{"bt":"now","n":"vacuum","u":"Pa","v":1}]')).toMatch(/base time/)
    await refused(await raw(new Uint8Array([0x5b, 0xff, 0x5d])), 400, 'not-parseable')
    await refused(await raw(new Uint8Array([1, 2, 3]), { 'content-encoding': 'gzip' }), 400, 'not-parseable')
    const csv = { 'content-type': 'text/csv' }
    expect((await refused(await raw('a,b\n1,2', csv), 400, 'not-parseable')).body.detail).toMatch(/"time"/)
    await refused(await raw('', csv), 400, 'not-parseable')
  })

  it('413 beyond 8 MiB as sent and 64 MiB unpacked, stopped on the way', async () => {
    await fresh()
    let sent = 0
    const endless = new ReadableStream({
      pull: (controller) => {
        sent += 1
        controller.enqueue(new Uint8Array(1024 * 1024))
      },
    })
    await refused(await raw(endless), 413, 'too-large')
    expect(sent).toBeLessThan(15)
    const bomb = gzipSync(Buffer.alloc(65 * 1024 * 1024, ' '))
    await refused(await raw(new Uint8Array(bomb), { 'content-encoding': 'gzip' }), 413, 'too-large')
  })

  it('422 when nothing is usable, and nothing is changed', async () => {
    await fresh()
    await refused(await raw('[]'), 422, 'nothing-usable')
    const answer = await refused(await raw('[{"n":"vacuum","u":"psi","v":4}]'), 422, 'nothing-usable')
    expect(answer.body.rejected).toEqual([{ index: 0, reason: 'unknown-unit' }])
    expect(await uploads()).toBe(0)
    expect(await database.knex('logger').where({ id: boat.loggerId }).first('last_heard_at')).toEqual({
      last_heard_at: null,
    })
  })

  it('503 with Retry-After while another writer holds the system', { timeout: 30_000 }, async () => {
    await fresh()
    await post([{ t: T, vacuum: 30_000 }])
    const holder = await database.knex.transaction()
    await holder.raw('select 1 from system_state where system_id = ? for update', [boat.systemId])
    const answer = await refused(await post([{ t: T + 60, vacuum: 29_990 }]), 503, 'busy')
    expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0)
    await holder.rollback()
    expect(await stored()).toHaveLength(1)
    expect((await post([{ t: T + 60, vacuum: 29_990 }])).status).toBe(200)
  })

  it('429 with Retry-After for a logger in a loop, and for no other', { timeout: 60_000 }, async () => {
    await fresh()
    const other = await newBoat(database.knex)
    let answer = await raw('x')
    for (let i = 0; i < 1_300 && answer.status !== 429; i += 1) answer = await raw('x')
    await refused(answer, 429, 'too-many-requests')
    expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0)
    expect((await send(other, senml(other.serial, [{ t: T, vacuum: 30_000 }]), { at: NOW })).status).toBe(200)
  })
})
