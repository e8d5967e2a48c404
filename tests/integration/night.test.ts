import { afterAll, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { openNotice } from '@/db/queries/notice-writes'
import { env } from '@/lib/env'
import { deliver } from '@/lib/messages/deliver'
import { openServices, type Services } from '@/lib/messages/services'
import { tell } from '@/lib/messages/tell'
import { outlookAt } from '@/lib/outlook/outlook-at'
import { giveNights } from '@/lib/ticks/night'
import { foretell } from '@/lib/ticks/tonight'
import { lookBack } from '@/lib/ticks/morning'
import { startMailFake, type MailFake } from '@/simulator/fakes/mail'
import { startSmsFake, type SmsFake } from '@/simulator/fakes/sms'
import { live, makeBoat, makePerson, type Boat, type Life } from '../support/owned-boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { SMS_TOKEN } from '../support/settings'

const HOUR = 3_600_000
const DAY = 24 * HOUR

let database: TestDatabase
let mail: MailFake
let sms: SmsFake
let services: Services

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  mail = await startMailFake({ port: 0 })
  sms = await startSmsFake({ port: 0, authToken: SMS_TOKEN, callbackDelayMs: 0 })
  services = openServices({
    smtp: { ...env().smtp, url: `smtp://127.0.0.1:${mail.port}` },
    sms: { ...env().sms, apiUrl: `http://127.0.0.1:${sms.port}` },
  })
})
afterAll(async () => {
  services.close()
  await Promise.all([mail.stop(), sms.stop()])
  await useDatabase(inject('settings').databaseUrl)
  await database.drop()
})
beforeEach(async () => {
  mail.clear()
  sms.clear()
  await database.knex.raw('truncate message, notice, vessel, logger, sample cascade')
})

let phones = 100
const owner = (name: string) => {
  phones += 1
  return makePerson(database.knex, {
    name,
    email: `${name.toLowerCase().replace(/\W+/g, '.')}.${phones}@boats.example`,
    phone: `+1202555${String(phones).padStart(4, '0')}`,
  })
}

const EVENING = Date.parse('2026-03-10T20:00:00Z')
const HABITS = { habits: { extraFlushes: [{ at: EVENING - 30 * 60_000, head: 'head-1' }] } }

/** A boat that has been heard for four days up to `until`, somebody flushing half an hour before the evening. */
async function boatOf(
  name: string,
  holdHours: number | null,
  options: { ownerId?: string; until?: number; overrides?: Life['overrides']; timeZone?: string } = {},
): Promise<Boat> {
  const until = options.until ?? EVENING
  const boat = await makeBoat(database.knex, {
    name,
    timeZone: options.timeZone ?? 'Europe/London',
    ownerId: options.ownerId ?? (await owner(`Owner of ${name}`)),
  })
  await live(database.knex, boat, {
    holdHours,
    fromMs: EVENING - 4 * DAY,
    toMs: until,
    overrides: {
      ...HABITS,
      ...options.overrides,
      logger: { intervalSeconds: 60 },
    },
  })
  return boat
}

const tick = (at: number) => asIngest((trx) => giveNights(trx, new Date(at)))

/** Sends everything that waits, as the worker would. */
async function sendAll(at: number): Promise<void> {
  const rows = await database.knex('message').orderBy('id').select('id')
  for (const row of rows) await deliver(String(row.id), new Date(at), services)
}

const outlookOf = (boat: Boat) => database.knex('outlook').where({ system_id: boat.systemId }).first()

describe('the evening of a leaking boat', () => {
  it('brings its owner exactly one mail and one text, and tight boats nothing', async () => {
    const leaking = await boatOf('Saltmarsh Hare', 1.5)
    const tight = await boatOf('Quiet Heron', null)
    await tick(EVENING)
    await sendAll(EVENING)
    expect(mail.messages().map((letter) => letter.to)).toHaveLength(1)
    expect(sms.messages()).toHaveLength(1)
    expect(mail.messages()[0]?.subject).toMatch(
      /^Saltmarsh Hare: the toilet pump is likely to run about \d times tonight$/,
    )
    const given = await outlookOf(leaking)
    expect(given.chance_if_flushed_last).toBeGreaterThan(0.9)
    expect(given.night).toBe('2026-03-10')
    expect((await outlookOf(tight)).chance_if_flushed_last).toBeLessThan(0.1)
  })

  it('is not told again by a second tick, an hour or a night later', async () => {
    await boatOf('Saltmarsh Hare', 1.5)
    await tick(EVENING)
    await Promise.all([tick(EVENING + 60_000), tick(EVENING + 60_000)])
    await tick(EVENING + HOUR)
    await sendAll(EVENING + HOUR)
    expect(mail.messages()).toHaveLength(1)
    expect(sms.messages()).toHaveLength(1)
    expect(await database.knex('notice').where({ kind: 'night-warning' })).toHaveLength(1)
  })

  it('begins two hours before quiet hours, no sooner', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    await tick(EVENING - 60_000)
    expect(await outlookOf(boat)).toBeUndefined()
    await tick(EVENING)
    expect(await outlookOf(boat)).toBeDefined()
  })

  it('is told together with what else was found that evening, and not once more when it is found later', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    const kinds = () => database.knex('notice').orderBy('id').pluck('kind')
    expect(await kinds()).toEqual(['short-hold'])
    await tick(EVENING)
    expect(await kinds()).toEqual(['short-hold', 'night-warning'])
    const waiting = await database.knex('message').whereNull('cancelled_at').pluck('channel')
    expect(waiting.sort()).toEqual(['email', 'sms'])
    const told = await database.knex('message_subject').where({ channel: 'email' })
    expect(told).toHaveLength(2)

    await database
      .knex('notice')
      .where({ kind: 'short-hold' })
      .update({ closed_at: new Date(EVENING) })
    const again = await asIngest(async (trx) => {
      const opened = await openNotice(trx, {
        ...boat,
        kind: 'short-hold',
        at: new Date(EVENING + HOUR),
        severity: 2,
        reason: 'Holds 1.5 h',
        evidence: {},
      })
      return tell(trx, [opened?.eventId ?? ''], new Date(EVENING + HOUR))
    })
    expect(again).toEqual([])
  })

  it('is silent for a system that nobody needs to hear of: off, laid up, worked on, snoozed', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    for (const value of ['off', 'laid-up', 'worked-on']) {
      await database.knex('statement').delete()
      await database.knex('statement').insert({
        vessel_id: boat.vesselId,
        system_id: boat.systemId,
        value,
        from_at: new Date(EVENING - 60_000),
      })
      await database.knex('outlook').delete()
      await tick(EVENING)
      expect((await outlookOf(boat)).detail.reason).toBe('not-expected')
    }
    expect(await database.knex('notice').where({ kind: 'night-warning' })).toEqual([])

    await database.knex('statement').delete()
    await database.knex('outlook').delete()
    // Muted by a reply to last week's warning.
    await database.knex('notice').insert({
      system_id: boat.systemId,
      vessel_id: boat.vesselId,
      kind: 'night-warning',
      night: '2026-03-05',
      opened_at: new Date(EVENING - 5 * DAY),
      closed_at: new Date(EVENING - 4 * DAY),
      reason: 'A run is likely',
      snoozed_until: new Date(EVENING + DAY),
    })
    await tick(EVENING)
    expect((await outlookOf(boat)).detail.reason).toBe('not-expected')
  })

  it('of two boats of one owner is one mail and one text', async () => {
    const ownerId = await owner('Ada Marsh')
    await boatOf('Saltmarsh Hare', 1.5, { ownerId })
    await boatOf('Brent Goose', 2, { ownerId })
    await tick(EVENING)
    await sendAll(EVENING)
    expect(mail.messages()).toHaveLength(1)
    expect(mail.messages()[0]?.subject).toBe(
      'The toilet pump is likely to run tonight on Brent Goose and Saltmarsh Hare',
    )
    expect(mail.messages()[0]?.text).toMatch(/Brent Goose\n[^]*Saltmarsh Hare\n/)
    const [text] = sms.messages()
    expect(sms.messages()).toHaveLength(1)
    expect(text?.body).toMatch(/Brent Goose \dx, Saltmarsh Hare \dx/)
    expect(text?.body.length).toBeLessThanOrEqual(160)
  })

  it('looks at an owner’s later boat in the same breath', async () => {
    const ownerId = await owner('Ada Marsh')
    await boatOf('Saltmarsh Hare', 1.5, { ownerId })
    const later = await boatOf('Brent Goose', 2, { ownerId })
    await database.knex('vessel').where({ id: later.vesselId }).update({ quiet_start: '22:45' })
    await tick(EVENING)
    await sendAll(EVENING)
    expect(mail.messages()).toHaveLength(1)
    await tick(EVENING + HOUR)
    await sendAll(EVENING + HOUR)
    expect(mail.messages()).toHaveLength(1)
  })
})

describe('by day', () => {
  it('a word on the coming night is kept for the fleet, and the evening says it for good', async () => {
    const noon = EVENING - 8 * HOUR
    const boat = await boatOf('Saltmarsh Hare', 1.5, { until: noon })
    await asIngest((trx) => foretell(trx, new Date(noon)))
    expect(await outlookOf(boat)).toMatchObject({ night: '2026-03-10', detail: { reason: 'provisional' } })
    expect((await outlookOf(boat)).chance).toBeGreaterThan(0.9)
    expect(await asIngest((trx) => foretell(trx, new Date(noon + HOUR)))).toEqual({ foretold: 0 })
    await live(database.knex, boat, {
      holdHours: 1.5,
      fromMs: noon,
      toMs: EVENING,
      overrides: { ...HABITS, logger: { intervalSeconds: 60 } },
    })
    await tick(EVENING)
    expect((await outlookOf(boat)).detail.reason).toBe('likely-even-if-flushed-last')
    await asIngest((trx) => foretell(trx, new Date(EVENING + 90 * 60_000)))
    expect((await outlookOf(boat)).detail.reason).toBe('likely-even-if-flushed-last')
  })
})

describe('an evening on which nothing is sent', () => {
  const reasonOf = async (boat: Boat) => (await outlookOf(boat))?.detail.reason

  it('since flushing last thing keeps the night quiet: an 11 h boat and a 9 h night', async () => {
    const boat = await boatOf('Quiet Heron', 11)
    await tick(EVENING)
    expect(['flush-last-thing', 'quiet-night']).toContain(await reasonOf(boat))
    expect((await outlookOf(boat)).chance_if_flushed_last).toBeLessThan(0.5)
    expect(await database.knex('notice').where({ kind: 'night-warning' })).toEqual([])
  })

  it('says to flush last thing where only that is needed', async () => {
    const boat = await boatOf('Quiet Heron', 11, {
      // The pump ran at noon: as it comes it would run in the small hours.
      overrides: { habits: { extraFlushes: HABITS.habits.extraFlushes, flushesByHour: Array(24).fill(0) } },
    })
    await tick(EVENING)
    const given = await outlookOf(boat)
    expect(given.chance).toBeGreaterThan(given.chance_if_flushed_last)
    expect(await database.knex('message').whereNull('cancelled_at')).toEqual([])
  })

  it('since the data are older than two hours, until newer ones come', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5, { until: EVENING - 3 * HOUR })
    await database.knex('system_state').update({ last_heard_at: new Date(EVENING) })
    await tick(EVENING)
    expect(await reasonOf(boat)).toBe('stale-data')
    await live(database.knex, boat, {
      holdHours: 1.5,
      fromMs: EVENING - 3 * HOUR,
      toMs: EVENING + 10 * 60_000,
      overrides: { ...HABITS, logger: { intervalSeconds: 60 } },
    })
    await tick(EVENING + 11 * 60_000)
    expect(await reasonOf(boat)).toBe('likely-even-if-flushed-last')
  })

  it('since nobody is aboard; a first flush by 23:00 sends it, a later one does not', async () => {
    const away = { habits: { aboard: 'never' as const } }
    for (const [flushAt, expected] of [
      [EVENING + 2.4 * HOUR, 1],
      [EVENING + 3.2 * HOUR, 0],
    ] as const) {
      const boat = await boatOf(`Boat ${expected}`, 1.5, { overrides: away })
      await tick(EVENING)
      expect(await reasonOf(boat)).toBe('nobody-aboard')
      await live(database.knex, boat, {
        holdHours: 1.5,
        fromMs: EVENING,
        toMs: flushAt + 10 * 60_000,
        overrides: {
          habits: { aboard: 'never', extraFlushes: [{ at: flushAt, head: 'head-1' }] },
          logger: { intervalSeconds: 60 },
        },
      })
      await tick(flushAt + 11 * 60_000)
      const warned = await database.knex('notice').where({ kind: 'night-warning', system_id: boat.systemId })
      expect(warned).toHaveLength(expected)
    }
  })

  it('since the owner said that nobody is aboard, whatever is flushed', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    await database.knex('statement').insert({
      vessel_id: boat.vesselId,
      value: 'away',
      from_at: new Date(EVENING - HOUR),
    })
    await tick(EVENING)
    expect(await reasonOf(boat)).toBe('nobody-aboard')
  })

  it('since it was said last night and has not grown by half; after seven days it is said again', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    await tick(EVENING)
    const again = async (days: number) => {
      const evening = EVENING + days * DAY
      await live(database.knex, boat, {
        holdHours: 1.5,
        fromMs: evening - 20 * HOUR,
        toMs: evening,
        overrides: {
          habits: { extraFlushes: [{ at: evening - 30 * 60_000, head: 'head-1' }] },
          logger: { intervalSeconds: 60 },
        },
      })
      await asIngest((trx) => lookBack(trx, new Date(evening)))
      await tick(evening)
      const { detail } = await database
        .knex('outlook')
        .where({ system_id: boat.systemId })
        .orderBy('night', 'desc')
        .first()
      return detail.reason
    }
    expect(await again(1)).toBe('already-said')
    expect(await again(7)).toBe('seven-days-since')
    expect(await database.knex('notice').where({ kind: 'night-warning' })).toHaveLength(2)
  })
})

describe('nights of a clock change', () => {
  it.each([
    ['spring', 'Europe/London', '2026-03-28T20:00:00Z', 8],
    ['autumn', 'Europe/London', '2026-10-24T19:00:00Z', 10],
    ['half an hour', 'Australia/Lord_Howe', '2026-04-04T09:00:00Z', 9.5],
  ])('%s, %s', async (_, timeZone, at, hours) => {
    const evening = Date.parse(at)
    const boat = await makeBoat(database.knex, {
      name: 'Clock Change',
      timeZone,
      ownerId: await owner('Ada'),
    })
    await live(database.knex, boat, {
      holdHours: 1.5,
      fromMs: evening - 3 * DAY,
      toMs: evening,
      overrides: {
        habits: { extraFlushes: [{ at: evening - 30 * 60_000, head: 'head-1' }] },
        logger: { intervalSeconds: 60 },
      },
    })
    const outlook = await asIngest((trx) => outlookAt(trx, boat.systemId, new Date(evening)))
    expect(outlook?.night.hours).toBe(hours)
    await tick(evening)
    const [notice] = await database.knex('notice').where({ kind: 'night-warning' })
    expect(notice.evidence.local).toMatchObject({ from: '22:00', to: '07:00', bedtime: '22:30' })
    expect(notice.evidence.strip.quiet).toEqual([240, 780])
  })
})

describe('the morning after', () => {
  it('ends the warning and scores the outlook by what was heard', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    const tight = await boatOf('Quiet Heron', null)
    await tick(EVENING)
    for (const [one, holdHours] of [
      [boat, 1.5],
      [tight, null],
    ] as const) {
      await live(database.knex, one, {
        holdHours,
        fromMs: EVENING,
        toMs: EVENING + 12 * HOUR,
        overrides: { habits: { aboard: 'never' }, logger: { intervalSeconds: 60 } },
      })
    }
    const morning = new Date(EVENING + 12 * HOUR)
    await asIngest((trx) => lookBack(trx, morning))
    await asIngest((trx) => lookBack(trx, morning))
    expect(await outlookOf(boat)).toMatchObject({ outcome: 'hit' })
    expect((await outlookOf(boat)).runs).toBeGreaterThan(3)
    expect(await outlookOf(tight)).toMatchObject({ outcome: 'quiet', runs: 0 })
    const warnings = await database.knex('notice').where({ kind: 'night-warning' }).whereNull('closed_at')
    expect(warnings).toEqual([])
  })

  it('leaves a night that was not heard unscored for a day and a half, then unknown', async () => {
    const boat = await boatOf('Saltmarsh Hare', 1.5)
    await tick(EVENING)
    await asIngest((trx) => lookBack(trx, new Date(EVENING + 12 * HOUR)))
    expect((await outlookOf(boat)).outcome).toBeNull()
    await asIngest((trx) => lookBack(trx, new Date(EVENING + 3 * DAY)))
    expect(await outlookOf(boat)).toMatchObject({ outcome: 'unknown', runs: null })
  })
})
