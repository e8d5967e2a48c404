import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { rebuildSystem } from '@/ingest/rederive'
import { dump, newBoat, readingsOf, send, senml, type Boat, type Reading } from '../support/boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { times } from '@/tests/support/long'

const NOW = new Date('2026-11-20T12:00:00Z')
const FROM_SECONDS = Date.parse('2026-11-18T03:00:00Z') / 1000
const STORY = readingsOf({ fromSeconds: FROM_SECONDS, hours: 40, seed: 7 })

let database: TestDatabase
let whole: Record<string, string[]>

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  const boat = await newBoat(database.knex)
  await send(boat, senml(boat.serial, STORY), { at: NOW })
  whole = await dump(database.knex, boat)
})
afterAll(() => database.drop())

const sendAll = async (boat: Boat, uploads: readonly Reading[][]) => {
  for (const upload of uploads) {
    if (upload.length === 0) continue
    const { status } = await send(boat, senml(boat.serial, upload), { at: NOW })
    expect(status).toBe(200)
  }
}

/** Only some channels of a reading: the rest comes with another upload. */
const part = (reading: Reading, channels: number): Reading => ({
  t: reading.t,
  ...(channels & 1 && reading.vacuum !== undefined ? { vacuum: reading.vacuum } : {}),
  ...(channels & 2 && reading.pump !== undefined ? { pump: reading.pump } : {}),
  ...(channels & 4 && reading.air !== undefined
    ? { air: reading.air, barometer: reading.barometer ?? 0, supply: reading.supply ?? 0 }
    : {}),
})

/** Uploads that together say the whole story: any cuts, any order, some twice, some in halves by channel. */
const uploadsOfStory = fc
  .record({
    cuts: fc.array(fc.integer({ min: 1, max: STORY.length - 1 }), { minLength: 1, maxLength: 6 }),
    order: fc.array(fc.nat(1_000), { minLength: 16, maxLength: 16 }),
    twice: fc.array(fc.nat(6), { maxLength: 3 }),
    shuffled: fc.boolean(),
    halves: fc.option(fc.nat(6)),
  })
  .map(({ cuts, order, twice, shuffled, halves }) => {
    const edges = [0, ...[...new Set(cuts)].sort((a, b) => a - b), STORY.length]
    const pieces = edges.slice(1).map((to, i) => STORY.slice(edges[i] ?? 0, to))
    const whole = pieces.flatMap((piece, i) =>
      i === halves
        ? [piece.map((reading) => part(reading, 5)), piece.map((reading) => part(reading, 2))]
        : [piece],
    )
    const uploads = [...whole, ...twice.flatMap((i) => (whole[i] === undefined ? [] : [whole[i]]))]
    const ranked = uploads.map((upload, i) => ({ upload, rank: order[i % order.length] ?? 0 }))
    ranked.sort((a, b) => a.rank - b.rank)
    return ranked.map(({ upload }) => (shuffled ? [...upload].reverse() : upload))
  })

describe('uploads that do not contradict each other', () => {
  it('tell a story with something in it', () => {
    expect(whole.runs?.length).toBeGreaterThan(10)
    expect(whole.flushes?.length).toBeGreaterThan(2)
    expect(whole.legs?.length).toBeGreaterThan(10)
    expect(whole.checkpoints?.length).toBeGreaterThan(4)
    expect(whole.head).toHaveLength(1)
  })

  it(
    'end in the same samples, rows, checkpoints and head, whatever their order',
    { timeout: 300_000 },
    async () => {
      await fc.assert(
        fc.asyncProperty(uploadsOfStory, async (uploads) => {
          const boat = await newBoat(database.knex)
          await sendAll(boat, uploads)
          expect(await dump(database.knex, boat)).toEqual(whole)
        }),
        { numRuns: times(24), seed: 20_261 },
      )
    },
  )

  it('one by one at the end of the story, as a logger sends them', { timeout: 120_000 }, async () => {
    const boat = await newBoat(database.knex)
    const tail = STORY.length - 120
    await sendAll(boat, [STORY.slice(0, tail), ...STORY.slice(tail).map((reading) => [reading])])
    expect(await dump(database.knex, boat)).toEqual(whole)
  })

  it('rebuilding changes nothing, to the byte', async () => {
    const boat = await newBoat(database.knex)
    await sendAll(boat, [STORY.slice(900), STORY.slice(0, 900)])
    const before = await dump(database.knex, boat)
    await asIngest((trx) => rebuildSystem(trx, boat.systemId, NOW))
    expect(await dump(database.knex, boat)).toEqual(before)
    expect(before).toEqual(whole)
  })
})
