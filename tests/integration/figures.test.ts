import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { figuresAt, openRowsAt, storeFigures, summaryAt } from '@/lib/figures'
import { summarySchema } from '@/shared/schemas/figures'
import { newBoat, readingsOf, send, senml, type Boat } from '../support/boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const FROM_SECONDS = Date.parse('2026-11-10T00:00:00Z') / 1000
/** Loses 2.5 kPa/h at 30 kPa: from cut-out to cut-in in some two and a half hours. */
const STORY = readingsOf({ fromSeconds: FROM_SECONDS, hours: 120, seed: 21, leakPaPerHour: 2_500 })
const END_MS = (STORY.at(-1)?.t ?? 0) * 1000

let database: TestDatabase
let boat: Boat

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  boat = await newBoat(database.knex)
  await send(boat, senml(boat.serial, STORY), { at: new Date(END_MS) })
})
afterAll(() => database.drop())

const summary = (of: Boat, atMs: number) => asIngest((trx) => summaryAt(trx, of.systemId, atMs))

describe('a summary', () => {
  it('has the shape of the contract and says how the boat leaks', async () => {
    const now = summarySchema.parse(await summary(boat, END_MS))
    expect(now.state).toBe('leaking')
    // The mean rate between the switch's points; the story's law is linear in the vacuum.
    const [cutOut, cutIn] = [now.cutOutPa ?? 0, now.cutInPa ?? 0]
    expect(cutOut).toBeGreaterThan(33_800)
    expect(cutIn).toBeLessThan(27_200)
    const hours = (Math.log(cutOut / cutIn) * 30_000) / 2_500
    expect((now.holdTime?.seconds ?? 0) / 3600).toBeGreaterThan(hours * 0.9)
    expect((now.holdTime?.seconds ?? 0) / 3600).toBeLessThan(hours * 1.1)
    expect(now.lastHeardAt).toBe(new Date(END_MS).toISOString())
  })

  it('as of an instant uses what was known then and nothing else', async () => {
    for (const share of [0.13, 0.5, 0.77, 0.93]) {
      const cut = Math.floor(STORY.length * share)
      const atMs = (STORY[cut]?.t ?? 0) * 1000
      const told = await newBoat(database.knex)
      await send(told, senml(told.serial, STORY.slice(0, cut + 1)), { at: new Date(atMs) })
      const then = await summary(boat, atMs)
      const lastSample = new Date((STORY[cut]?.t ?? 0) * 1000).toISOString()
      expect(then?.lastHeardAt).toBe(lastSample)
      expect(then).toEqual({ ...(await summary(told, atMs)), lastHeardAt: lastSample })
      const open = await asIngest((trx) => openRowsAt(trx, boat.systemId, atMs))
      expect(open).toEqual(await asIngest((trx) => openRowsAt(trx, told.systemId, atMs)))
      expect(open.hold ?? open.run).not.toBeNull()
    }
  })

  it('is unheard after the silence limit, and knows nothing of a system without samples', async () => {
    expect((await summary(boat, END_MS + 6 * 3_600_000))?.state).not.toBe('unheard')
    expect((await summary(boat, END_MS + 6 * 3_600_000 + 1_000))?.state).toBe('unheard')
    const silent = await newBoat(database.knex)
    const nothing = summarySchema.parse(await summary(silent, END_MS))
    expect(nothing).toMatchObject({ leakRate: null, holdTime: null, current: null, lastHeardAt: null })
    expect(await summary({ ...silent, systemId: '999999999' }, END_MS)).toBeNull()
  })

  it('takes what was said since the last sample', async () => {
    const told = await newBoat(database.knex)
    await send(told, senml(told.serial, STORY), { at: new Date(END_MS) })
    await database.knex('statement').insert({
      vessel_id: told.vesselId,
      system_id: told.systemId,
      value: 'laid-up',
      from_at: new Date(END_MS + 30_000),
      until_at: new Date(END_MS + 90_000),
    })
    expect((await summary(told, END_MS + 20_000))?.state).toBe('leaking')
    expect((await summary(told, END_MS + 60_000))?.state).toBe('laid-up')
    expect((await summary(told, END_MS + 90_000))?.state).toBe('leaking')
  })

  it('says who is aboard: the owner’s word, else a flush since 17:00', async () => {
    const flushes = await database.knex('flush').where({ system_id: boat.systemId }).orderBy('at')
    const lisbonHour = (at: Date) => at.getUTCHours()
    const evening = flushes.find((flush) => lisbonHour(flush.at) >= 18)?.at
    expect(evening).toBeInstanceOf(Date)
    expect((await summary(boat, evening.getTime() + 60_000))?.aboard).toBe('aboard')
    await database.knex('statement').insert({ vessel_id: boat.vesselId, value: 'away', from_at: evening })
    expect((await summary(boat, evening.getTime() + 60_000))?.aboard).toBe('away')
    await database.knex('statement').where({ vessel_id: boat.vesselId }).delete()
  })
})

describe('what is kept for the fleet', () => {
  it('stands on the state row from the commit on, and is made anew by the tick', async () => {
    const row = () =>
      database.knex('system_state').where({ system_id: boat.systemId }).first('figures', 'figures_at')
    const figures = await asIngest((trx) => figuresAt(trx, boat.systemId, END_MS))
    const { figures: atCommit } = await row()
    expect(atCommit).toEqual(JSON.parse(JSON.stringify({ ...figures, aboard: atCommit.aboard })))
    const later = END_MS + 7 * 3_600_000
    await asIngest((trx) => storeFigures(trx, boat.systemId, later))
    expect(await row()).toMatchObject({ figures: { state: 'unheard' }, figures_at: new Date(later) })
  })

  it('counts days as their rows do', async () => {
    const days = await database.knex('system_day').where({ system_id: boat.systemId }).orderBy('day')
    expect(days.map(({ day }) => day)).toEqual([
      '2026-11-10',
      '2026-11-11',
      '2026-11-12',
      '2026-11-13',
      '2026-11-14',
    ])
    const runs = await database.knex('run').where({ system_id: boat.systemId })
    const flushes = await database.knex('flush').where({ system_id: boat.systemId })
    const sum = (key: string) => days.reduce((total, day) => total + Number(day[key]), 0)
    expect(sum('leak_runs')).toBe(runs.filter(({ trigger }) => trigger === 'leak').length)
    expect(sum('flush_runs')).toBe(runs.filter(({ trigger }) => trigger === 'flush').length)
    expect(sum('flushes')).toBe(flushes.length)
    const seconds = runs.reduce((total, run) => total + (run.stopped_at - run.started_at) / 1000, 0)
    expect(sum('run_seconds')).toBeCloseTo(seconds, 6)
    for (const day of days) {
      expect(day.observed_seconds).toBeLessThanOrEqual(86_400)
      expect(day.leak_pa_per_hour).toBeGreaterThan(1_800)
      expect(day.leak_pa_per_hour).toBeLessThan(3_200)
    }
  })
})
