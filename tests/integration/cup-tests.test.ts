import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { eraseRecord } from '@/db/queries/deletion'
import { readExport } from '@/db/queries/export'
import { asIngest } from '@/db/roles'
import { listCupTests, startCupTest, takeBackCupTest } from '@/lib/cup-tests'
import { getSuspects } from '@/lib/reading/get-suspects'
import { cupTestSchema } from '@/shared/schemas'
import { defaultBoat, flowForBoatHold, type BoatOverrides } from '@/simulator/boat'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { joinShop, live, makeBoat, makePerson, makeShop, type Boat } from '../support/owned-boats'

const MINUTE = 60_000
const HOUR = 60 * MINUTE
const FROM = Date.parse('2026-08-02T12:00:00Z')
const WATER = FROM + 8 * HOUR
const FLUSH = WATER + HOUR
const LAST = FLUSH + 5 * HOUR

/** Nobody flushes but as said; a cup goes into the forward bowl, and a flush takes it an hour later. */
const boatWith = (part: 'head-1' | 'hose-1'): BoatOverrides => ({
  seed: 5,
  logger: { intervalSeconds: 30 },
  habits: {
    flushesByHour: Array.from({ length: 24 }, () => 0),
    tapsPerDay: 0,
    extraFlushes: [
      { at: FROM + HOUR, head: 'head-1' },
      { at: FLUSH, head: 'head-1' },
    ],
    cups: [{ at: WATER, head: 'head-1' }],
  },
  leaks: [
    {
      part,
      kind: 'laminar',
      flowPaM3PerS: flowForBoatHold(defaultBoat(), 'laminar', 3 * 3600),
      ...(part === 'head-1' ? { wetting: { wetShare: 1 / 30, wetSeconds: 5400, dryingSeconds: 600 } } : {}),
    },
  ],
})

let database: TestDatabase
let shopId: string
let technician: string
let installer: string
let stranger: string
let sealed: Boat
let fixed: Boat

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  const { knex } = database
  shopId = await makeShop(knex, 'Averill Sanitation')
  technician = await makePerson(knex, { name: 'Wren Ashdown', email: 'wren@cups.example' })
  installer = await makePerson(knex, { name: 'Ada Fenn', email: 'ada@cups.example' })
  stranger = await makePerson(knex, { name: 'Ivo Tarn', email: 'ivo@cups.example' })
  await joinShop(knex, shopId, technician, 'technician')
  await joinShop(knex, shopId, installer, 'installer')
  sealed = await makeBoat(knex, { name: 'Grey Heron', shopId })
  fixed = await makeBoat(knex, { name: 'Brown Otter', shopId })
  for (const { systemId } of [sealed, fixed])
    await knex('part').insert([
      { system_id: systemId, key: 'pump', kind: 'pump', name: 'Pump' },
      { system_id: systemId, key: 'forward', kind: 'head', name: 'Forward head' },
    ])
  await hear(sealed, 'head-1', FROM, WATER + 4 * MINUTE)
  await hear(fixed, 'hose-1', FROM, WATER + 4 * MINUTE)
})
afterAll(() => database.drop())

const hear = (boat: Boat, part: 'head-1' | 'hose-1', fromMs: number, toMs: number) =>
  live(database.knex, boat, { holdHours: null, fromMs, toMs, overrides: boatWith(part) })
const listed = async (boat: Boat, atMs: number, person = boat.ownerId) =>
  (await listCupTests(person, boat.systemId, new Date(atMs), new Date(atMs))).items
const newest = async (boat: Boat, atMs: number) => cupTestSchema.parse((await listed(boat, atMs))[0])
const start = (boat: Boat, atMs: number, said: Parameters<typeof startCupTest>[2], person = boat.ownerId) =>
  startCupTest(person, boat.systemId, said, new Date(atMs))
const bowlSeal = async (boat: Boat, atMs: number) => {
  const found = await getSuspects(boat.ownerId, boat.systemId, new Date(atMs), new Date(atMs))
  const named = [...found.suspects, ...found.cleared].find(({ family }) => family === 'bowl-seal')
  return { named, missing: found.notEnough.map(({ signature }) => signature) }
}

describe('a cup test of the bowl that leaks', () => {
  it('begins with the instant the server keeps, and asks for half an hour without a flush', async () => {
    const begun = await start(sealed, WATER, { partKey: 'forward' })
    expect(begun).toMatchObject({
      partKey: 'forward',
      headName: 'Forward head',
      waterAt: new Date(WATER).toISOString(),
      open: true,
      verdict: null,
      minutesLeft: 30,
      wet: null,
    })
    expect(begun.before?.paPerHour).toBeGreaterThan(1500)
    expect(begun.sentence).toBe('Not told yet: about 30 more minutes without a flush.')
    expect((await bowlSeal(sealed, WATER)).missing).toContain('cup-test')
  })

  it('is one at a time', async () => {
    await expect(start(sealed, WATER + 5 * MINUTE, { name: 'Aft head' })).rejects.toMatchObject({
      kind: 'conflict',
    })
    const open = () =>
      database.knex('cup_test').insert({
        system_id: sealed.systemId,
        head_name: 'Aft head',
        water_at: new Date(WATER),
        said_by: sealed.ownerId,
        said_at: new Date(WATER),
      })
    await expect(open()).rejects.toMatchObject({ code: '23505' })
  })

  it('finds the seal while the water is in, and surely once a flush brought the leak back', async () => {
    await hear(sealed, 'head-1', WATER + 4 * MINUTE, FLUSH - 5 * MINUTE)
    const wet = await newest(sealed, FLUSH - 5 * MINUTE)
    expect(wet).toMatchObject({ verdict: 'seal', open: true, flushedAt: null, after: null })
    expect(wet.wet?.paPerHour).toBeLessThan(0.3 * (wet.before?.paPerHour ?? 0))
    const once = await bowlSeal(sealed, FLUSH - 5 * MINUTE)
    expect(once.named?.basis.join(' ')).toMatch(/water in Forward head took \d+ % of the leak away/)

    await hear(sealed, 'head-1', FLUSH - 5 * MINUTE, LAST)
    const back = await newest(sealed, LAST)
    expect(back).toMatchObject({ verdict: 'seal', open: false })
    expect(Math.abs(Date.parse(back.flushedAt ?? '') - FLUSH)).toBeLessThan(2 * MINUTE)
    expect(back.sentence).toMatch(/and a flush brought it back\.$/)
    const surely = await bowlSeal(sealed, LAST)
    expect(surely.named?.strength ?? 0).toBeGreaterThan(once.named?.strength ?? Infinity)
    expect(surely.missing).not.toContain('cup-test')
  })

  it('is read as it was known then', async () => {
    expect(await listed(sealed, WATER - MINUTE)).toEqual([])
    expect(await newest(sealed, WATER + 4 * MINUTE)).toMatchObject({ verdict: null, flushedAt: null })
  })
})

describe('a cup test of a bowl that holds', () => {
  it('clears it, and the next bowl may be named by hand', async () => {
    await start(fixed, WATER + 4 * MINUTE, { partKey: 'forward', at: new Date(WATER).toISOString() })
    await hear(fixed, 'hose-1', WATER + 4 * MINUTE, LAST)
    const cleared = await newest(fixed, LAST)
    expect(cleared).toMatchObject({ verdict: 'cleared', open: false })
    expect(cleared.sentence).toMatch(/Forward head: its seal is cleared/)
    expect((await bowlSeal(fixed, LAST)).named?.strength).toBe(0.5)
    await start(fixed, LAST, { name: 'Aft head' })
    expect((await listed(fixed, LAST)).map(({ headName }) => headName)).toEqual(['Aft head', 'Forward head'])
  })

  it('can be taken back, once, and is still there as of then', async () => {
    const { id } = await newest(fixed, LAST)
    const later = new Date(LAST + MINUTE)
    await takeBackCupTest(fixed.ownerId, fixed.systemId, id, later)
    const twice = takeBackCupTest(fixed.ownerId, fixed.systemId, id, later)
    await expect(twice).rejects.toMatchObject({ kind: 'not-found' })
    expect((await newest(fixed, later.getTime())).headName).toBe('Forward head')
    expect((await newest(fixed, LAST)).headName).toBe('Aft head')
    const elsewhere = takeBackCupTest(sealed.ownerId, sealed.systemId, id, later)
    await expect(elsewhere).rejects.toMatchObject({ kind: 'not-found' })
  })

  it('is refused for a bowl that is not there and for an hour that is not', async () => {
    const at = LAST + 2 * MINUTE
    const refused = (said: Parameters<typeof startCupTest>[2]) =>
      expect(start(fixed, at, said)).rejects.toMatchObject({ kind: 'invalid' })
    await refused({ partKey: 'pump' })
    await refused({ name: 'Aft head', at: new Date(at + MINUTE).toISOString() })
    await refused({ name: 'Aft head', at: new Date(at - 13 * HOUR).toISOString() })
    await refused({ name: 'Aft head', at: new Date(WATER - HOUR).toISOString() })
  })
})

describe('the right', () => {
  it('is the owner’s, and the technician’s who may see the full record', async () => {
    await expect(listed(sealed, LAST, stranger)).rejects.toMatchObject({ kind: 'not-found' })
    await expect(listed(sealed, LAST, technician)).rejects.toMatchObject({ kind: 'not-allowed' })
    await database.knex('shop_access').where({ vessel_id: sealed.vesselId }).update({ level: 'full' })
    expect(await listed(sealed, LAST, technician)).toHaveLength(1)
    await expect(listed(sealed, LAST, installer)).rejects.toMatchObject({ kind: 'not-allowed' })
    await expect(start(sealed, LAST, { name: 'Aft head' }, stranger)).rejects.toMatchObject({
      kind: 'not-found',
    })
    await expect(start(sealed, LAST, { name: 'Aft head' }, technician)).resolves.toMatchObject({ open: true })
  })
})

describe('the end of an account', () => {
  it('hands out the cup tests of its boats and erases them with the record', async () => {
    const exported = await asIngest((trx) => readExport(trx, fixed.ownerId))
    expect(exported.cupTests?.map((test) => test.head_name)).toEqual(['Forward head', 'Aft head'])
    await asIngest((trx) => eraseRecord(trx, fixed.vesselId, new Date(LAST + HOUR)))
    expect(await database.knex('cup_test').where({ system_id: fixed.systemId })).toEqual([])
    expect(await database.knex('cup_test').where({ system_id: sealed.systemId })).not.toEqual([])
  })
})
