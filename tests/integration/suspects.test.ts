import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { getComparison } from '@/lib/reading/get-comparison'
import { getOutlookScore } from '@/lib/reading/get-outlook-score'
import { getSuspects } from '@/lib/reading/get-suspects'
import { listRuns } from '@/lib/reading/list-runs'
import { comparisonSchema, outlookScoreSchema, suspectsSchema } from '@/shared/schemas'
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
      .insert({
        vessel_id: boat.vesselId,
        shop_id: shopId,
        status: 'closed',
        started_at: changedAt,
        finished_at: changedAt,
        closed_at: changedAt,
      })
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

describe('what stands beside the suspects', () => {
  it('compares r, R, D and K of any two spans', async () => {
    const span = (first: number, last: number) => ({
      from: new Date(FROM + first * DAY_MS).toISOString(),
      to: new Date(FROM + last * DAY_MS).toISOString(),
    })
    const query = { before: span(0, 4), after: span(4, 8) }
    const found = comparisonSchema.parse(await getComparison(technician, boat.systemId, query, AT))
    for (const side of [found.before, found.after]) {
      const rate = (side.leakRatePaPerHour ?? 0) / 3600
      const recharge = side.rechargePaPerSecond ?? 0
      expect(side.flowRatio).toBeCloseTo(rate / (recharge + rate), 10)
      // 10 to 8 inHg; after a stop the gas warms and the vacuum settles a little lower.
      expect(side.differentialPa).toBeGreaterThan(6_000)
      expect(side.differentialPa).toBeLessThan(6_900)
    }
    // The valve seats at random about the same middle: nothing else than that moved.
    expect(found.because).toBeNull()
    expect(['no-change', 'too-early']).toContain(found.verdict)
  })

  it('tells each run’s recharge, and its supply only to those who see the full record', async () => {
    const runs = async (person: string) => {
      const { items } = await listRuns(person, boat.systemId, { limit: 5000 }, AT)
      return items.filter((run) => run.trigger === 'leak' && run.stoppedAt !== null)
    }
    const [whole, figures] = [await runs(boat.ownerId), await runs(technician)]
    expect(figures.length).toBeGreaterThan(20)
    expect(figures.every((run) => run.supplyV === null)).toBe(true)
    expect(whole.filter((run) => (run.supplyV ?? 0) > 11 && (run.supplyV ?? 0) < 14).length).toBeGreaterThan(
      20,
    )
    expect(figures.map((run) => run.rechargePaPerSecond)).toEqual(
      whole.slice(0, figures.length).map((run) => run.rechargePaPerSecond),
    )
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
