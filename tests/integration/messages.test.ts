import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest'
import { asIngest } from '@/db/roles'
import { openNotice } from '@/db/queries/notice-writes'
import { deliver } from '@/lib/messages/deliver'
import { env } from '@/lib/env'
import { openServices, SendError, type Services } from '@/lib/messages/services'
import { tell } from '@/lib/messages/tell'
import { startMailFake, type MailFake } from '@/simulator/fakes/mail'
import { startSmsFake, type SmsFake } from '@/simulator/fakes/sms'
import { makeBoat, makePerson, type Boat } from '../support/owned-boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { SMS_TOKEN } from '../support/settings'

const NOW = new Date('2026-03-10T20:00:00Z')
const PHONE = '+12025550123'

let database: TestDatabase
let mail: MailFake
let sms: SmsFake
let services: Services
let ownerId: string
let boat: Boat

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  mail = await startMailFake({ port: 0 })
  sms = await startSmsFake({ port: 0, authToken: SMS_TOKEN, callbackDelayMs: 0 })
  const settings = env()
  services = openServices({
    smtp: { ...settings.smtp, url: `smtp://127.0.0.1:${mail.port}` },
    sms: { ...settings.sms, apiUrl: `http://127.0.0.1:${sms.port}` },
  })
})
afterAll(async () => {
  services.close()
  await Promise.all([mail.stop(), sms.stop()])
  await useDatabase(inject('settings').databaseUrl)
  await database.drop()
})
beforeEach(async () => {
  ownerId = await makePerson(database.knex, {
    name: 'Ada Marsh',
    email: `ada.${Math.random().toString(36).slice(2)}@boats.example`,
    phone: PHONE,
  })
  boat = await makeBoat(database.knex, { name: 'Saltmarsh Hare', ownerId })
})
afterEach(async () => {
  mail.clear()
  sms.clear()
  await database.knex.raw('truncate message, notice, contact cascade')
})

const EVIDENCE = {
  quiet: { from: '2026-03-10T22:00:00.000Z', to: '2026-03-11T07:00:00.000Z' },
  local: { from: '22:00', to: '07:00', bedtime: '22:30', firstAt: null, firstAfterBedtime: '00:00' },
  chance: 0.97,
  chanceIfFlushedLast: 0.99,
  expectedRuns: 6.2,
  expectedRunsIfFlushedLast: 5.6,
  holdSeconds: 5400,
  heardAtLocal: '19:59',
  strip: { quiet: [240, 780], expected: [360, 450, 540, 630, 720] },
}

/** A night warning with its messages, in one transaction. @returns the messages' ids. */
function warned(at = NOW, of = boat): Promise<string[]> {
  return asIngest(async (trx) => {
    const opened = await openNotice(trx, {
      systemId: of.systemId,
      vesselId: of.vesselId,
      kind: 'night-warning',
      night: '2026-03-10',
      at,
      severity: 0.99,
      reason: 'A run is likely',
      evidence: EVIDENCE,
    })
    return opened === null ? [] : tell(trx, [opened.eventId], at)
  })
}

const rowsOf = () => database.knex('message').orderBy('id').select()

describe('telling an owner of a night', () => {
  it('writes one mail and one text, queued with what they tell', async () => {
    const ids = await warned()
    expect(ids).toHaveLength(2)
    const rows = await rowsOf()
    expect(rows.map((row) => row.channel)).toEqual(['email', 'sms'])
    const jobs = await database.knex('queue.job').where({ name: 'message' }).select('data')
    expect(
      jobs
        .map((job) => job.data.messageId)
        .filter((id) => ids.includes(id))
        .sort(),
    ).toEqual(ids.sort())
    expect(rows.map((row) => row.useful_until.toISOString())).toEqual(Array(2).fill(EVIDENCE.quiet.to))
  })

  it('leaves neither message nor job behind when the change it tells of is taken back', async () => {
    const before = await database.knex('queue.job').count().first()
    await expect(
      asIngest(async (trx) => {
        const opened = await openNotice(trx, {
          systemId: boat.systemId,
          vesselId: boat.vesselId,
          kind: 'freeze',
          at: NOW,
          severity: 1,
          reason: 'cold',
          evidence: { airC: 1 },
        })
        await tell(trx, [opened?.eventId ?? ''], NOW)
        throw new Error('taken back')
      }),
    ).rejects.toThrow('taken back')
    expect(await rowsOf()).toEqual([])
    expect(await database.knex('queue.job').count().first()).toEqual(before)
  })

  it('tells the same event once, however often it is asked to', async () => {
    await warned()
    const events = await database.knex('notice_event').select('id')
    await asIngest((trx) =>
      tell(
        trx,
        events.map((event) => String(event.id)),
        NOW,
      ),
    )
    expect(await rowsOf()).toHaveLength(2)
  })

  it('sends both, each accepted by its service and naming what a receipt belongs to', async () => {
    const ids = await warned()
    for (const id of ids) expect(await deliver(id, NOW, services)).toBe('accepted')
    expect(mail.messages()).toHaveLength(1)
    expect(sms.messages()).toHaveLength(1)
    const [letter] = mail.messages()
    const [text] = sms.messages()
    expect(letter?.subject).toBe('Saltmarsh Hare: the toilet pump is likely to run about 6 times tonight')
    expect(letter?.messageId).toContain(`message-${ids[0]}@`)
    expect(letter?.text).toContain('cup of water')
    expect(letter?.html).toContain('role="img"')
    expect(text?.to).toBe(PHONE)
    expect(text?.body.length).toBeLessThanOrEqual(160)
    expect(text?.body).toMatch(/^Saltmarsh Hare: .*6x tonight/)
    expect(text?.statusCallback).toMatch(new RegExp(`/api/sms/status\\?message=${ids[1]}$`))
    expect((await rowsOf()).every((row) => row.accepted_at?.getTime() === NOW.getTime())).toBe(true)
  })

  it('sends nothing a second time', async () => {
    const ids = await warned()
    for (const id of ids) await deliver(id, NOW, services)
    for (const id of ids) expect(await deliver(id, NOW, services)).toBe('already-accepted')
    expect(mail.messages().length + sms.messages().length).toBe(2)
  })
})

describe('when a service does not take a message', () => {
  it('a passing refusal leaves it to be sent, and is written down', async () => {
    const [letterId, textId] = await warned()
    mail.failNext('refuse')
    sms.failNext('refuse')
    for (const id of [letterId, textId]) {
      await expect(deliver(id ?? '', NOW, services)).rejects.toBeInstanceOf(SendError)
      expect(await deliver(id ?? '', NOW, services)).toBe('accepted')
    }
    const attempts = await database.knex('delivery_attempt').orderBy('id').select('outcome')
    expect(attempts.map((attempt) => attempt.outcome)).toEqual(['failed', 'accepted', 'failed', 'accepted'])
    expect(mail.messages().length + sms.messages().length).toBe(2)
  })

  it('a lasting refusal ends it', async () => {
    const [letterId, textId] = await warned()
    mail.failNext('reject')
    sms.failNext('reject')
    for (const id of [letterId, textId]) {
      expect(await deliver(id ?? '', NOW, services)).toBe('refused-for-good')
      expect(await deliver(id ?? '', NOW, services)).toBe('given-up-before')
    }
    expect((await rowsOf()).every((row) => row.failed_at !== null && row.failure !== null)).toBe(true)
  })

  it('a mail whose acceptance was lost on the way is sent once more, under the same Message-ID', async () => {
    const [letterId = ''] = await warned()
    mail.failNext('drop')
    await expect(deliver(letterId, NOW, services)).rejects.toBeInstanceOf(SendError)
    expect(await deliver(letterId, NOW, services)).toBe('accepted')
    const ids = mail.messages().map((letter) => letter.messageId)
    expect(ids).toHaveLength(2)
    expect(new Set(ids).size).toBe(1)
  })

  it('a text whose acceptance was lost is not sent again once its receipt is there', async () => {
    const [, textId = ''] = await warned()
    sms.failNext('drop')
    await expect(deliver(textId, NOW, services)).rejects.toBeInstanceOf(SendError)
    await database.knex('delivery_attempt').insert({ message_id: textId, at: NOW, outcome: 'delivered' })
    expect(await deliver(textId, NOW, services)).toBe('receipt-was-there')
    expect(sms.messages()).toHaveLength(1)
  })

  it('a night that is over is not warned of any more', async () => {
    const [letterId = ''] = await warned()
    expect(await deliver(letterId, new Date('2026-03-11T07:00:01Z'), services)).toBe('night-is-over')
    expect(mail.messages()).toHaveLength(0)
  })

  it('a number that has said STOP gets nothing, also what was queued before', async () => {
    const [, textId = ''] = await warned()
    await database.knex('contact').where({ person_id: ownerId }).update({ stopped_at: NOW })
    expect(await deliver(textId, NOW, services)).toBe('stopped-by-receiver')
    expect(sms.messages()).toHaveLength(0)
  })
})
