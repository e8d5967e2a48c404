import { afterAll, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest'
import { asIngest, asPerson } from '@/db/roles'
import { acknowledgeNotice, judgeSystem, snoozeNotice } from '@/lib/notices'
import { passOn } from '@/lib/ticks/escalation'
import { tidy } from '@/lib/ticks/housekeeping'
import { watchSilence } from '@/lib/ticks/silence'
import { lookForSteps } from '@/lib/ticks/steps'
import { joinShop, live, makeBoat, makePerson, makeShop, upload, type Boat } from '../support/owned-boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const MINUTE = 60_000
const HOUR = 60 * MINUTE
const DAY = 24 * HOUR
/** Noon: nobody's quiet hours. */
const NOON = Date.parse('2026-03-10T12:00:00Z')
const LOGGER = { logger: { intervalSeconds: 60 } }

let database: TestDatabase
let ownerId: string
let managerId: string
let shopId: string

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
})
afterAll(async () => {
  await useDatabase(inject('settings').databaseUrl)
  await database.drop()
})
beforeEach(async () => {
  await database.knex.raw('truncate message, notice, vessel, logger, shop, contact, sample cascade')
  const tag = Math.random().toString(36).slice(2)
  ownerId = await makePerson(database.knex, { name: 'Ada Marsh', email: `a.${tag}@boats.example` })
  managerId = await makePerson(database.knex, { name: 'Maren Oakes', email: `m.${tag}@shops.example` })
  shopId = await makeShop(database.knex, `Saltern Quay ${tag}`)
  await joinShop(database.knex, shopId, managerId, 'manager')
})

const boatOf = (name: string, options: object = {}) =>
  makeBoat(database.knex, { name, ownerId, shopId, ...options })
const openKinds = (boat: Boat) =>
  database
    .knex('notice')
    .where({ system_id: boat.systemId })
    .whereNull('closed_at')
    .orderBy('id')
    .pluck('kind')
const eventsOf = (boat: Boat) =>
  database
    .knex('notice_event as e')
    .join('notice as n', 'n.id', 'e.notice_id')
    .where('n.system_id', boat.systemId)
    .orderBy('e.id')
    .select('n.kind', 'e.transition')
const toldTo = async (personId: string) =>
  await database
    .knex('message')
    .where({ person_id: personId })
    .whereNull('cancelled_at')
    .orderBy('id')
    .pluck('subject')
const say = (boat: Boat, value: string, from: number, until: number | null = null) =>
  database.knex('statement').insert({
    vessel_id: boat.vesselId,
    system_id: boat.systemId,
    value,
    from_at: new Date(from),
    until_at: until === null ? null : new Date(until),
  })

describe('a leaking boat by day', () => {
  it('is one notice, told once to owner and shop, however often it uploads', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await live(database.knex, boat, { holdHours: 1.5, fromMs: NOON - 2 * DAY, toMs: NOON, overrides: LOGGER })
    expect(await openKinds(boat)).toEqual(['short-hold'])
    for (let hour = 1; hour <= 3; hour += 1) {
      await live(database.knex, boat, {
        holdHours: 1.5,
        fromMs: NOON + (hour - 1) * HOUR,
        toMs: NOON + hour * HOUR,
        overrides: LOGGER,
      })
    }
    expect(await eventsOf(boat)).toEqual([{ kind: 'short-hold', transition: 'opened' }])
    expect(await toldTo(ownerId)).toEqual([
      expect.stringMatching(/^Saltmarsh Hare: the pump now rests only 1\.\d h/),
    ])
    expect(await toldTo(managerId)).toHaveLength(1)
  })

  it('that is tight raises nothing in five days', async () => {
    const boat = await boatOf('Quiet Heron')
    await live(database.knex, boat, {
      holdHours: null,
      fromMs: NOON - 5 * DAY,
      toMs: NOON,
      overrides: LOGGER,
    })
    expect(await eventsOf(boat)).toEqual([])
    expect(await database.knex('message')).toEqual([])
  })

  it('waits with its news for the end of the receiver’s quiet hours, in their own zone', async () => {
    const boat = await boatOf('Saltmarsh Hare', { timeZone: 'America/Vancouver' })
    const night = Date.parse('2026-03-10T10:00:00Z')
    await live(database.knex, boat, {
      holdHours: 1.5,
      fromMs: night - 2 * DAY,
      toMs: night,
      overrides: LOGGER,
    })
    const rows = await database.knex('message').select('person_id', 'send_after')
    const after = new Map(rows.map((row) => [String(row.person_id), row.send_after.toISOString()]))
    // 03:00 in Vancouver: until 07:00 there (14:00 UTC, daylight time since two days); the shop is up in London.
    expect(after.get(ownerId)).toBe('2026-03-10T14:00:00.000Z')
    expect(after.get(managerId)).toBe('2026-03-10T10:01:00.000Z')
  })

  it('that brings three weeks at once is judged by how it is now', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    // Leaking for two weeks, repaired, tight for one.
    await live(database.knex, boat, {
      holdHours: null,
      fromMs: NOON - 21 * DAY,
      toMs: NOON,
      overrides: {
        leaks: [{ part: 'hose-1', kind: 'orifice', flowPaM3PerS: 0.02, curedAt: NOON - 7 * DAY }],
        logger: { intervalSeconds: 300 },
      },
    })
    expect(await eventsOf(boat)).toEqual([])
  })
})

describe('the course of a notice', () => {
  /** A boat that holds so long by its figures, as the record of the last day shows. */
  async function holds(boat: Boat, hours: number[], until: number): Promise<void> {
    let end = until
    for (const hour of [...hours].reverse()) {
      await database.knex('hold').insert({
        system_id: boat.systemId,
        started_at: new Date(end - hour * HOUR),
        ended_at: new Date(end),
        ending: 'leak',
        flushes: 0,
        edge_uncertainty_seconds: 1,
        known_at: new Date(end),
      })
      end -= hour * HOUR + MINUTE
    }
  }
  const judgeBy = (boat: Boat, seconds: number, at: number, state = 'leaking') =>
    asIngest((trx) =>
      judgeSystem(trx, boat.systemId, new Date(at), {
        at,
        state: state as 'leaking',
        reason: '',
        since: null,
        leakRate: null,
        holdTime: { seconds, low: seconds * 0.95, high: seconds * 1.05, bound: null, holds: 3 },
        method: 'legs',
        cutOutPa: null,
        settledPa: null,
        cutInPa: null,
        recharge: null,
        cause: null,
        signs: {
          now: { ratePaPerSecond: null, rechargePaPerSecond: null, differentialPa: null, ratio: null },
          usual: { ratePaPerSecond: null, rechargePaPerSecond: null, differentialPa: null, ratio: null },
        },
        current: { at, vacuumPa: 30_000, pumpOn: false, holdSoFarSeconds: 0 },
        pump: null,
        lastHeardAt: at,
        rank: 1,
        model: null,
      }),
    )
  const namesOf = async (boat: Boat) => (await eventsOf(boat)).map((event) => event.transition)

  it('opens, grows by half, and ends after three holds past the margin; each told once', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await holds(boat, [2], NOON)
    await judgeBy(boat, 7200, NOON)
    await judgeBy(boat, 6000, NOON + HOUR)
    expect(await namesOf(boat)).toEqual(['opened'])
    await judgeBy(boat, 4800, NOON + 2 * HOUR)
    await judgeBy(boat, 4700, NOON + 3 * HOUR)
    expect(await namesOf(boat)).toEqual(['opened', 'worsened'])
    await holds(boat, [3.6, 3.7], NOON + DAY)
    await judgeBy(boat, 13_200, NOON + DAY)
    expect(await openKinds(boat)).toEqual(['short-hold'])
    await holds(boat, [3.6], NOON + DAY + 4 * HOUR)
    await judgeBy(boat, 13_200, NOON + DAY + 4 * HOUR)
    expect(await namesOf(boat)).toEqual(['opened', 'worsened', 'ended'])
  })

  it('that ended before anybody was told is taken back', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await judgeBy(boat, 7200, NOON)
    await holds(boat, [3.6, 3.7, 3.6], NOON + 30_000)
    await judgeBy(boat, 13_200, NOON + 30_000)
    expect(await namesOf(boat)).toEqual(['opened', 'ended'])
    expect(await database.knex('message').whereNull('cancelled_at')).toEqual([])
  })

  it('pauses while the system is worked on, laid up, off or unheard, and goes on afterwards', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await judgeBy(boat, 7200, NOON)
    await say(boat, 'worked-on', NOON + HOUR, NOON + 2 * HOUR)
    await judgeBy(boat, 1200, NOON + 90 * MINUTE)
    await judgeBy(boat, 1200, NOON + 95 * MINUTE)
    await judgeBy(boat, 7200, NOON + 3 * HOUR)
    await judgeBy(boat, 7200, NOON + 4 * HOUR, 'unheard')
    await judgeBy(boat, 7200, NOON + 5 * HOUR)
    expect(await namesOf(boat)).toEqual(['opened', 'held', 'resumed', 'held', 'resumed'])
    expect(await toldTo(ownerId)).toHaveLength(1)
  })

  it('does not begin in a lay-up', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await say(boat, 'laid-up', NOON - DAY)
    const decisions = await judgeBy(boat, 7200, NOON)
    expect(decisions.find((decision) => decision.kind === 'short-hold')).toMatchObject({
      action: 'none',
      reason: 'still-paused',
      because: 'laid-up',
    })
    expect(await eventsOf(boat)).toEqual([])
  })

  it('is acknowledged by those who may see it, and by nobody else', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await judgeBy(boat, 7200, NOON)
    const { id } = await database.knex('notice').first('id')
    const strangerId = await makePerson(database.knex, {
      name: 'Odile',
      email: `o${Math.random()}@stranger.example`,
    })
    const by = (personId: string) =>
      asPerson(personId, (trx) =>
        acknowledgeNotice(trx, String(id), { personId, note: 'seen' }, new Date(NOON)),
      )
    expect(await by(strangerId)).toBe(false)
    expect(await by(managerId)).toBe(true)
    const row = await database.knex('notice').where({ id }).first()
    expect(row).toMatchObject({ acknowledged_note: 'seen', acknowledged_at: new Date(NOON) })
    expect(String(row.acknowledged_by)).toBe(managerId)
    // Whoever was first stays; a later note is kept.
    expect(await by(ownerId)).toBe(true)
    expect(String((await database.knex('notice').where({ id }).first()).acknowledged_by)).toBe(managerId)
  })

  it('snoozed says no more, also when it comes anew, until the snooze is over', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await judgeBy(boat, 7200, NOON)
    const { id } = await database.knex('notice').first('id')
    await asPerson(ownerId, (trx) => snoozeNotice(trx, String(id), new Date(NOON + 3 * DAY), new Date(NOON)))
    await judgeBy(boat, 1500, NOON + HOUR)
    await database.knex('notice').update({ closed_at: new Date(NOON + 2 * HOUR) })
    await judgeBy(boat, 1500, NOON + 3 * HOUR)
    expect(await namesOf(boat)).toEqual(['opened', 'snoozed'])
    await judgeBy(boat, 1500, NOON + 4 * DAY)
    expect(await openKinds(boat)).toEqual(['short-hold'])
  })
})

describe('a pump that runs on', () => {
  async function runningOn(at: number): Promise<Boat> {
    const boat = await boatOf('Saltmarsh Hare')
    const from = at - 3 * DAY
    await live(database.knex, boat, {
      holdHours: null,
      fromMs: from,
      toMs: at,
      // A bowl valve hung open: the pump draws, and the vacuum does not rise.
      overrides: { vented: [{ from: at - 30 * MINUTE, to: at + DAY }], ...LOGGER },
    })
    return boat
  }

  it('is told at once by day, and goes on to the shop’s on-call person when nobody answers', async () => {
    const boat = await runningOn(NOON)
    expect(await openKinds(boat)).toContain('running-on')
    const urgent = await database.knex('message').where({ urgency: 'now' })
    expect(urgent.map((row) => String(row.person_id)).sort()).toEqual([ownerId, managerId].sort())
    expect(urgent.every((row) => row.send_after.getTime() === NOON)).toBe(true)
    const onCallId = await makePerson(database.knex, {
      name: 'Tobias Fenn',
      email: `t${Math.random()}@shops.example`,
      phone: '+12025550177',
      settings: { urgentAtNight: true },
    })
    await joinShop(database.knex, shopId, onCallId, 'technician')
    await asIngest((trx) => passOn(trx, new Date(NOON + 29 * MINUTE)))
    expect(await toldTo(onCallId)).toEqual([])
    await asIngest((trx) => passOn(trx, new Date(NOON + 31 * MINUTE)))
    await asIngest((trx) => passOn(trx, new Date(NOON + 32 * MINUTE)))
    const called = await database.knex('message').where({ person_id: onCallId }).pluck('channel')
    expect(called.sort()).toEqual(['email', 'sms'])
  })

  it('at night wakes only those who chose it', async () => {
    const night = Date.parse('2026-03-11T01:00:00Z')
    await database.knex('contact').insert({
      person_id: managerId,
      channel: 'email',
      address: 'watch@shops.example',
      verified_at: new Date(NOON),
      settings: JSON.stringify({ urgentAtNight: true }),
    })
    await runningOn(night)
    const rows = await database.knex('message').where({ urgency: 'now' }).select('person_id', 'send_after')
    const after = new Map(rows.map((row) => [String(row.person_id), row.send_after.toISOString()]))
    expect(after.get(managerId)).toBe(new Date(night).toISOString())
    expect(after.get(ownerId)).toBe('2026-03-11T07:00:00.000Z')
  })
})

describe('supply and frost', () => {
  it('are told to the owner alone, from readings as they come', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    const samples = Array.from({ length: 40 }, (_, index) => ({
      at: NOON - (40 - index) * MINUTE,
      vacuumPa: 32_000 - index,
      pumpOn: false,
      airC: 1.5,
      barometerPa: 101_325,
      supplyV: 11.3,
    }))
    await upload(database.knex, boat, samples, new Date(NOON))
    expect(await openKinds(boat)).toEqual(['low-supply', 'freeze'])
    // Found in one upload, told in one mail.
    expect(await toldTo(ownerId)).toHaveLength(1)
    expect(await toldTo(managerId)).toEqual([])
  })
})

describe('a leak that grew at once', () => {
  it('is told to the shop with the span in which it happened, and stands for two weeks', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    const stepAt = NOON - 20 * HOUR
    await live(database.knex, boat, {
      holdHours: 12,
      fromMs: NOON - 6 * DAY,
      toMs: NOON,
      overrides: {
        leaks: [{ part: 'tank', kind: 'orifice', flowPaM3PerS: 0.004, onsetAt: stepAt }],
        ...LOGGER,
      },
    })
    await asIngest((trx) => lookForSteps(trx, new Date(NOON)))
    await asIngest((trx) => lookForSteps(trx, new Date(NOON + HOUR)))
    const notice = await database.knex('notice').where({ kind: 'step' }).first()
    expect(notice.evidence.toPaPerHour).toBeGreaterThan(1.3 * notice.evidence.fromPaPerHour)
    const [from, to] = notice.evidence.between.map(Date.parse)
    expect(from).toBeLessThanOrEqual(stepAt + HOUR)
    expect(to).toBeGreaterThanOrEqual(stepAt - HOUR)
    expect((await toldTo(managerId)).join()).toContain('the leak grew at once')
    expect((await toldTo(ownerId)).join()).not.toContain('at once')
    await asIngest((trx) => tidy(trx, new Date(NOON + 15 * DAY)))
    expect(await openKinds(boat)).not.toContain('step')
  })
})

describe('loggers that fall silent', () => {
  const tick = (at: number) => asIngest((trx) => watchSilence(trx, new Date(at)))
  const silentSince = (boat: Boat, at: number) =>
    database
      .knex('system_state')
      .where({ system_id: boat.systemId })
      .update({ last_heard_at: new Date(at) })

  it('one: told to the shop after its limit, to the owner after a day, and ended when heard', async () => {
    const boat = await boatOf('Saltmarsh Hare', { heardAt: new Date(NOON) })
    await tick(NOON + 6 * HOUR - MINUTE)
    expect(await openKinds(boat)).toEqual([])
    await tick(NOON + 6 * HOUR + MINUTE)
    await tick(NOON + 7 * HOUR)
    expect(await toldTo(managerId)).toEqual(['Saltmarsh Hare: nothing heard from the logger'])
    expect(await toldTo(ownerId)).toEqual([])
    await tick(NOON + 24 * HOUR)
    await tick(NOON + 25 * HOUR)
    expect(await toldTo(ownerId)).toHaveLength(1)
    expect(await toldTo(managerId)).toHaveLength(1)
    await silentSince(boat, NOON + 26 * HOUR)
    await tick(NOON + 26 * HOUR + MINUTE)
    expect(await openKinds(boat)).toEqual([])
  })

  it('holds what was found before, since nothing can be said of it now', async () => {
    const boat = await boatOf('Saltmarsh Hare')
    await live(database.knex, boat, { holdHours: 1.5, fromMs: NOON - 2 * DAY, toMs: NOON, overrides: LOGGER })
    await tick(NOON + 6 * HOUR + MINUTE)
    const held = await database.knex('notice').where({ kind: 'short-hold' }).first()
    expect(held.held_since).toEqual(new Date(NOON + 6 * HOUR + MINUTE))
    await live(database.knex, boat, {
      holdHours: 1.5,
      fromMs: NOON + 7 * HOUR,
      toMs: NOON + 8 * HOUR,
      overrides: LOGGER,
    })
    expect((await database.knex('notice').where({ kind: 'short-hold' }).first()).held_since).toBeNull()
  })

  it('three in one harbour within the hour: one notice, without the names of others’ boats', async () => {
    const boats = await Promise.all(
      ['One', 'Two', 'Three', 'Four'].map((name, index) =>
        boatOf(name, { harbour: 'Port Averill', heardAt: new Date(NOON + index * 15 * MINUTE) }),
      ),
    )
    await tick(NOON + 6 * HOUR + MINUTE)
    await tick(NOON + 7 * HOUR)
    const notices = await database.knex('notice')
    expect(notices).toHaveLength(1)
    expect(notices[0].evidence).toMatchObject({ harbour: 'Port Averill', loggers: 4 })
    expect(JSON.stringify(notices[0])).not.toMatch(/Two|Three|Four/)
    expect(await toldTo(managerId)).toEqual(['One: 4 loggers in Port Averill are silent'])
    for (const boat of boats) await silentSince(boat, NOON + 8 * HOUR)
    await tick(NOON + 8 * HOUR + MINUTE)
    expect(await database.knex('notice').whereNull('closed_at')).toEqual([])
  })

  it('as expected: laid up, off, away, or without a logger', async () => {
    const heardAt = new Date(NOON)
    for (const value of ['off', 'laid-up']) await say(await boatOf(value, { heardAt }), value, NOON)
    const away = await boatOf('away', { heardAt })
    await database.knex('statement').insert({ vessel_id: away.vesselId, value: 'away', from_at: heardAt })
    const bare = await boatOf('bare', { heardAt })
    await database.knex('logger_fitting').where({ system_id: bare.systemId }).delete()
    await boatOf('never heard')
    await tick(NOON + 10 * HOUR)
    expect(await database.knex('notice')).toEqual([])
  })
})
