import { afterAll, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { env } from '@/lib/env'
import { deliver } from '@/lib/messages/deliver'
import { openServices, type Services } from '@/lib/messages/services'
import { outlookAt } from '@/lib/outlook/outlook-at'
import { giveNights } from '@/lib/ticks/night'
import { lookBack } from '@/lib/ticks/morning'
import { startMailFake, type MailFake } from '@/simulator/fakes/mail'
import { startSmsFake, type SmsFake } from '@/simulator/fakes/sms'
import { live, makeBoat, makePerson, type Boat, type Life } from '../support/boats'
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
    expect(await database.knex('message').count().first()).toEqual({ count: '2' })
    expect(await database.knex('notice').count().first()).toEqual({ count: '1' })
  })

  it('begins two hours before quiet hours, no sooner', async () => {
    await boatOf('Saltmarsh Hare', 1.5)
    await tick(EVENING - 60_000)
    expect(await database.knex('outlook').count().first()).toEqual({ count: '0' })
  })
})
