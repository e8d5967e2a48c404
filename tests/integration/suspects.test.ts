import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { getOutlookScore } from '@/lib/reading/get-outlook-score'
import { getSuspects } from '@/lib/reading/get-suspects'
import { outlookScoreSchema, suspectsSchema } from '@/shared/schemas'
import { defaultBoat, flowForBoatHold, type BoatOverrides } from '@/simulator/boat'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { joinShop, live, makeBoat, makePerson, makeShop, type Boat } from '../support/owned-boats'

const FROM = Date.parse('2026-08-02T12:00:00Z')
const DAY_MS = 86_400_000
const AT = new Date(FROM + 8 * DAY_MS)

/** A pump's check valve that seats anew with each run, on a boat that would hold for two hours. */
const CHECK_VALVE: BoatOverrides = {
  seed: 11,
  logger: { intervalSeconds: 30 },
  leaks: [
    {
      part: 'pump',
      kind: 'laminar',
      flowPaM3PerS: flowForBoatHold(defaultBoat(), 'laminar', 2 * 3600),
      reseatsAtRun: 0.4,
    },
  ],
}

let database: TestDatabase
let boat: Boat
let shopId: string
let technician: string
let stranger: string

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  const { knex } = database
  shopId = await makeShop(knex, 'Averill Sanitation')
  technician = await makePerson(knex, { name: 'Wren Ashdown', email: 'wren@averill.example' })
  stranger = await makePerson(knex, { name: 'Ivo Tarn', email: 'ivo@elsewhere.example' })
  await joinShop(knex, shopId, technician, 'technician')
  boat = await makeBoat(knex, { name: 'Grey Heron', shopId })
  await knex('part').insert([
    { system_id: boat.systemId, key: 'pump', kind: 'pump', name: 'Pump' },
    { system_id: boat.systemId, key: 'forward', kind: 'head', name: 'Forward head' },
  ])
  await live(knex, boat, { holdHours: null, fromMs: FROM, toMs: AT.getTime(), overrides: CHECK_VALVE })
})
afterAll(() => database.drop())

const suspects = async (at = AT, person = boat.ownerId) =>
  suspectsSchema.parse(await getSuspects(person, boat.systemId, at, AT))

describe('suspects', () => {
  it('name the check valve of a leak that changes with every run, with its counts and its weight', async () => {
    const found = await suspects()
    expect(found.verdict).toBe('named')
    const [first] = found.suspects
    expect(first).toMatchObject({ family: 'check-valve', parts: ['pump'] })
    expect(first?.basis.join(' ')).toMatch(/after leak runs \d+ of \d+/)
    expect(first?.overturnedBy.length).toBeGreaterThan(0)
    expect(found.priorFactors.pump).toBe(first?.strength)
    expect(found.priorFactors.pump).toBeGreaterThan(1)
    expect(found.priorFactors.forward ?? 1).toBeLessThan(found.priorFactors.pump ?? 0)
  })

  it('are as of an instant: on the first day there is not enough to name anybody', async () => {
    const early = await suspects(new Date(FROM + 4 * 3_600_000))
    expect(early).toMatchObject({ verdict: 'not-enough', suspects: [], priorFactors: {} })
    expect(early.notEnough.map(({ signature }) => signature)).toContain('changes-across-flushes')
    expect(early.notEnough.every(({ missing }) => missing !== '')).toBe(true)
  })

  it('belong to the full record: leak figures are not enough, and a stranger sees no such system', async () => {
    await expect(suspects(AT, technician)).rejects.toMatchObject({ kind: 'not-allowed' })
    await expect(suspects(AT, stranger)).rejects.toMatchObject({ kind: 'not-found' })
    await expect(getSuspects(boat.ownerId, '999999999', AT, AT)).rejects.toMatchObject({ kind: 'not-found' })
    const access = { vessel_id: boat.vesselId, shop_id: shopId }
    await database.knex('shop_access').where(access).update({ level: 'full' })
    expect((await suspects(AT, technician)).suspects[0]?.family).toBe('check-valve')
    const seen = database.knex('audit_entry').where({ person_id: technician, action: 'record.seen' })
    await expect(seen.select('vessel_id')).resolves.toHaveLength(1)
    await database.knex('shop_access').where(access).update({ level: 'figures' })
  })

  it('forget what was before a part was changed', async () => {
    const changedAt = new Date(AT.getTime() - 5 * 3_600_000)
    const [visit] = await database
      .knex('visit')
      .insert({ vessel_id: boat.vesselId, shop_id: shopId, status: 'under-way', started_at: changedAt })
      .returning<{ id: string }[]>('id')
    await database.knex('part_change').insert({
      id: '6f1f8f6e-5a4b-4a37-9a67-0f6f5a3f7c11',
      visit_id: visit?.id,
      part_key: 'pump',
      at: changedAt,
      action: 'replaced',
    })
    expect(await suspects()).toMatchObject({ from: changedAt.toISOString(), verdict: 'not-enough' })
    const before = await suspects(new Date(changedAt.getTime() - 60_000))
    expect(before.suspects[0]?.family).toBe('check-valve')
  })
})

describe('the outlook’s running score', () => {
  it('counts nights as they came out and sets the chance against the base rate, for those who see the boat', async () => {
    const nights: [number, string, number | null][] = [
      [1, 'hit', 0.9],
      [2, 'missed', 0.4],
      [3, 'quiet', 0.1],
      [4, 'quiet', 0.2],
      [5, 'false', 0.7],
      [6, 'unknown', 0.5],
      [7, 'quiet', null],
      [40, 'missed', 0.1],
    ]
    await database.knex('outlook').insert(
      nights.map(([ago, outcome, chance]) => {
        const quietTo = new Date(AT.getTime() - ago * DAY_MS)
        const quietFrom = new Date(quietTo.getTime() - 9 * 3_600_000)
        return {
          system_id: boat.systemId,
          night: quietFrom.toISOString().slice(0, 10),
          given_at: new Date(quietFrom.getTime() - 7_200_000),
          quiet_from: quietFrom,
          quiet_to: quietTo,
          chance,
          aboard: 'unknown',
          detail: '{}',
          outcome,
          scored_at: AT,
        }
      }),
    )
    const score = outlookScoreSchema.parse(await getOutlookScore(technician, AT))
    expect(score.nights).toBe(6)
    expect(score.outcomes).toEqual({ hit: 1, false: 1, missed: 1, quiet: 3 })
    expect(score.rated).toBe(5)
    const errors = [0.9 - 1, 0.4 - 1, 0.1, 0.2, 0.7].map((error) => error * error)
    expect(score.brier).toBeCloseTo(errors.reduce((sum, each) => sum + each, 0) / 5, 5)
    expect(score.baseRateBrier).toBeCloseTo(0.4 * 0.6, 10)
    expect(await getOutlookScore(stranger, AT)).toMatchObject({ nights: 0, brier: null, baseRateBrier: null })
  })
})
