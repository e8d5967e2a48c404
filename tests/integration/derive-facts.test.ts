import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { importSamples, previewImport, undoImport } from '@/ingest/imports'
import { parseCsv } from '@/ingest/parse-csv'
import { catchUpOne, rebuildSystem, rederive } from '@/ingest/rederive'
import { retain } from '@/ingest/retention'
import { dump, newBoat, readingsOf, send, senml, type Boat } from '../support/boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const NOW = new Date('2026-11-20T12:00:00Z')
const FROM = new Date('2026-11-17T00:00:00Z')
const STORY = readingsOf({ fromSeconds: FROM.getTime() / 1000, hours: 60, seed: 11 })
const HALF = new Date('2026-11-18T06:30:17Z')

let database: TestDatabase
let plain: Record<string, string[]>

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  plain = await dump(database.knex, await told(await newBoat(database.knex)))
})
afterAll(() => database.drop())

const told = async (boat: Boat, story = STORY): Promise<Boat> => {
  const { status } = await send(boat, senml(boat.serial, story), { at: NOW })
  expect(status).toBe(200)
  return boat
}
const marked = async (boat: Boat) =>
  (await database.knex('system_state').where({ system_id: boat.systemId }).first('refold_from'))
    ?.refold_from as Date | null

/** Facts that change what is derived, each written by itself as a service writes it. */
const facts: [name: string, write: (boat: Boat) => Promise<unknown>][] = [
  [
    'a cut-in set by the installer',
    (boat) =>
      database
        .knex('setting')
        .insert({ system_id: boat.systemId, in_force_from: HALF, cut_out_pa: 30_000, cut_in_pa: 20_000 }),
  ],
  [
    'a system that is being worked on',
    (boat) =>
      database.knex('statement').insert({
        vessel_id: boat.vesselId,
        system_id: boat.systemId,
        value: 'worked-on',
        from_at: HALF,
        until_at: new Date(HALF.getTime() + 7 * 3_600_000),
      }),
  ],
  [
    'a calibration',
    (boat) =>
      database.knex('calibration').insert({
        logger_id: boat.loggerId,
        in_force_from: HALF,
        vacuum_offset_pa: -250,
        vacuum_gain: 1.02,
      }),
  ],
  [
    'a logger with another rhythm',
    (boat) => database.knex('logger').where({ id: boat.loggerId }).update({ interval_seconds: 900 }),
  ],
]

describe('a fact that is dated back', () => {
  it.each(facts)('%s: the rows end as if it had been told before', async (_name, write) => {
    const early = await newBoat(database.knex)
    await write(early)
    const expected = await dump(database.knex, await told(early))
    expect(expected).not.toEqual(plain)

    const late = await told(await newBoat(database.knex))
    expect(await marked(late)).toBeNull()
    await write(late)
    expect(await marked(late)).not.toBeNull()
    await asIngest((trx) => rederive(trx, late.systemId, HALF, NOW))
    expect(await marked(late)).toBeNull()
    expect(await dump(database.knex, late)).toEqual(expected)
  })

  it('is taken in by the next upload, or by the worker, where nobody asked', async () => {
    const [, write] = facts[0] ?? ['', () => Promise.resolve()]
    const early = await newBoat(database.knex)
    await write(early)
    const expected = await dump(database.knex, await told(early))

    const heard = await told(await newBoat(database.knex), STORY.slice(0, -1))
    await write(heard)
    await told(heard, STORY.slice(-1))
    expect(await dump(database.knex, heard)).toEqual(expected)

    const silent = await told(await newBoat(database.knex))
    await write(silent)
    while ((await asIngest((trx) => catchUpOne(trx, NOW))) !== null);
    expect(await dump(database.knex, silent)).toEqual(expected)
  })

  it('may lie ahead: a statement’s end counts when its time has come', async () => {
    const boat = await told(await newBoat(database.knex), STORY.slice(0, 2_000))
    const until = new Date(((STORY[2_500]?.t ?? 0) + 7) * 1000)
    const from = new Date((STORY[1_500]?.t ?? 0) * 1000)
    const said = { value: 'laid-up', from_at: from, until_at: until }
    await database.knex('statement').insert({ vessel_id: boat.vesselId, system_id: boat.systemId, ...said })
    await asIngest((trx) => rederive(trx, boat.systemId, from, NOW))
    await told(boat, STORY.slice(2_000))

    const early = await newBoat(database.knex)
    await database.knex('statement').insert({ vessel_id: early.vesselId, system_id: early.systemId, ...said })
    expect(await dump(database.knex, boat)).toEqual(await dump(database.knex, await told(early)))
  })

  it('moves a logger: each system keeps what was measured on it', async () => {
    const boat = await told(await newBoat(database.knex))
    const other = await newBoat(database.knex)
    await database.knex('logger_fitting').where({ logger_id: other.loggerId }).delete()
    await database.knex.raw(
      'update logger_fitting set span = tstzrange(lower(span), ?) where logger_id = ?',
      [HALF, boat.loggerId],
    )
    await database.knex.raw(
      'insert into logger_fitting (logger_id, system_id, span) values (?, ?, tstzrange(?, null))',
      [boat.loggerId, other.systemId, HALF],
    )
    await asIngest(async (trx) => {
      await rederive(trx, boat.systemId, HALF, NOW)
      await rederive(trx, other.systemId, HALF, NOW)
    })
    const lastRun = await database
      .knex('run')
      .where({ system_id: boat.systemId })
      .max('known_at as at')
      .first()
    const firstRun = await database
      .knex('run')
      .where({ system_id: other.systemId })
      .min('started_at as at')
      .first()
    expect(lastRun?.at.getTime()).toBeLessThanOrEqual(HALF.getTime() + 600_000)
    expect(firstRun?.at.getTime()).toBeGreaterThanOrEqual(HALF.getTime())
    const before = [
      await dump(database.knex, boat),
      await dump(database.knex, { ...other, loggerId: boat.loggerId }),
    ]
    await asIngest(async (trx) => {
      await rebuildSystem(trx, boat.systemId, NOW)
      await rebuildSystem(trx, other.systemId, NOW)
    })
    expect([
      await dump(database.knex, boat),
      await dump(database.knex, { ...other, loggerId: boat.loggerId }),
    ]).toEqual(before)
  })
})

describe('another version of the deriver', () => {
  it('is derived anew by the worker, and not mixed with', async () => {
    const boat = await told(await newBoat(database.knex), STORY.slice(0, 1_000))
    await database.knex('system_state').where({ system_id: boat.systemId }).update({ deriver_version: 0 })
    await database.knex('run').where({ system_id: boat.systemId }).delete()
    await told(boat, STORY.slice(1_000))
    expect(await database.knex('run').where({ system_id: boat.systemId })).toHaveLength(0)
    while ((await asIngest((trx) => catchUpOne(trx, NOW))) !== null);
    expect(await dump(database.knex, boat)).toEqual(plain)
  })
})

describe('a person’s import', () => {
  const csv = (story: typeof STORY) =>
    `time,vacuum_pa,pump\n${story.map(({ t, vacuum, pump }) => `${t},${vacuum ?? ''},${pump === undefined ? '' : Number(pump)}`).join('\n')}\n`
  const person = async () =>
    String(
      (
        await database
          .knex('person')
          .insert({ email: `p${Math.random()}@boats.example`, name: 'P' })
          .returning('id')
      )[0]?.id,
    )

  it('adds times that are not there, gives way to the logger’s own, and can be taken back', async () => {
    const gap = STORY.slice(600, 900)
    const rest = [...STORY.slice(0, 600), ...STORY.slice(900)]
    const boat = await told(await newBoat(database.knex), rest)
    const without = await dump(database.knex, boat)
    const personId = await person()
    const given = async () => ({
      loggerId: boat.loggerId,
      personId,
      records: await parseCsv(csv(STORY.slice(590, 910))),
      now: NOW,
    })
    const preview = await asIngest(async (trx) => previewImport(trx, await given()))
    expect(preview.batch.count).toBe(320)
    const imported = await asIngest(async (trx) => importSamples(trx, await given()))
    expect(imported.samples).toMatchObject({ received: 320, stored: 300, duplicate: 20 })
    expect((await dump(database.knex, boat)).samples).toHaveLength(STORY.length)

    expect(await asIngest((trx) => undoImport(trx, imported.upload, NOW))).toBe(300)
    expect(await dump(database.knex, boat)).toEqual(without)
    await expect(asIngest((trx) => undoImport(trx, imported.upload, NOW))).rejects.toThrow(/already/)

    const again = await asIngest(async (trx) => importSamples(trx, await given()))
    const own = await send(boat, senml(boat.serial, gap.slice(0, 100)), { at: NOW })
    expect(own.body.samples).toMatchObject({ received: 100, stored: 100, duplicate: 0 })
    expect(await asIngest((trx) => undoImport(trx, again.upload, NOW))).toBe(200)
    await told(boat, gap)
    expect(await dump(database.knex, boat)).toEqual(plain)
  })
})

describe('months that have served their time', () => {
  it('are sealed and dropped, and the record goes on from there', { timeout: 120_000 }, async () => {
    const kept = await newBoat(database.knex)
    const long = readingsOf({ fromSeconds: Date.parse('2026-09-29T00:00:00Z') / 1000, hours: 72, seed: 5 })
    const cut = long.findIndex(({ t }) => t >= Date.parse('2026-10-01T00:00:00Z') / 1000)
    const at = new Date('2026-10-03T00:00:00Z')
    await send(kept, senml(kept.serial, long), { at })
    const whole = await dump(database.knex, kept)

    const boat = await newBoat(database.knex)
    await send(boat, senml(boat.serial, long.slice(0, cut + 700)), { at })
    // Seen from a year and more later; the months of the other tests are not reached.
    const later = new Date('2027-11-15T00:00:00Z')
    const done = await database.knex.transaction((trx) => retain(trx, later, 400))
    expect(done.sealed).toBeGreaterThanOrEqual(2)
    expect(done.dropped).toBeGreaterThanOrEqual(1)
    expect(await database.knex('sample').where('at', '<', '2026-10-01T00:00:00Z')).toHaveLength(0)

    const late = await send(boat, senml(boat.serial, long.slice(cut - 5, cut + 5)), { at })
    expect(late.body.samples).toMatchObject({ received: 10, duplicate: 5, rejected: 5 })
    expect(late.body.rejected?.[0]?.reason).toBe('too-old')
    await send(boat, senml(boat.serial, long.slice(cut)), { at })
    const after = await dump(database.knex, boat)
    for (const table of ['runs', 'holds', 'legs', 'flushes', 'head'] as const)
      expect(after[table]).toEqual(whole[table])

    await asIngest((trx) => rebuildSystem(trx, boat.systemId, at))
    expect(await dump(database.knex, boat)).toEqual(after)
  })
})
