import { afterAll, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest'
import { POST as inbound } from '@/app/api/sms/inbound/route'
import { POST as status } from '@/app/api/sms/status/route'
import { openNotice } from '@/db/queries/notice-writes'
import { asIngest } from '@/db/roles'
import { env } from '@/lib/env'
import { deliver } from '@/lib/messages/deliver'
import { actOnLink, messageOfLink } from '@/lib/messages/links'
import { SendError, type Services } from '@/lib/messages/services'
import { tell } from '@/lib/messages/tell'
import { webhookSignature } from '@/simulator/fakes/sms-signature'
import { joinShop, makeBoat, makePerson, makeShop, type Boat } from '../support/owned-boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'
import { SMS_TOKEN } from '../support/settings'

const NOW = new Date('2026-03-10T20:00:00Z')
const later = (minutes: number) => new Date(NOW.getTime() + minutes * 60_000)
const PHONE = '+12025550141'

let database: TestDatabase
let ownerId: string
let managerId: string
let shopId: string
let boat: Boat
/** Texts that the service took, as far as this file cares. */
let taken: { to: string; body: string; statusCallback: string }[] = []
const services: Services = {
  sendMail: () => Promise.resolve('mail'),
  sendText: (text) => {
    taken.push(text)
    return Promise.resolve(`SM${taken.length}`)
  },
  close: () => {},
}

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
})
afterAll(async () => {
  await useDatabase(inject('settings').databaseUrl)
  await database.drop()
})
beforeEach(async () => {
  taken = []
  await database.knex.raw('truncate message, notice, vessel, logger, shop, inbound_text, contact cascade')
  const tag = Math.random().toString(36).slice(2)
  ownerId = await makePerson(database.knex, {
    name: 'Ada Marsh',
    email: `a.${tag}@boats.example`,
    phone: PHONE,
  })
  managerId = await makePerson(database.knex, { name: 'Maren Oakes', email: `m.${tag}@shops.example` })
  shopId = await makeShop(database.knex, `Saltern Quay ${tag}`)
  await joinShop(database.knex, shopId, managerId, 'manager')
  boat = await makeBoat(database.knex, { name: 'Saltmarsh Hare', ownerId, shopId })
})

/** A text about trouble on a boat, sent. @returns the message's id. */
async function texted(of: Boat = boat, kind: 'no-start' | 'running-on' = 'no-start'): Promise<string> {
  const ids = await asIngest(async (trx) => {
    const opened = await openNotice(trx, {
      systemId: of.systemId,
      vesselId: of.vesselId,
      kind,
      at: NOW,
      severity: 1,
      reason: 'The pump did not start after a flush',
      evidence: {},
    })
    return tell(trx, [opened?.eventId ?? ''], NOW)
  })
  for (const id of ids) await deliver(id, later(10), services)
  const row = await database.knex('message').whereIn('id', ids).where({ channel: 'sms' }).first()
  return String(row.id)
}

function signedRequest(path: string, fields: Record<string, string>, token = SMS_TOKEN): Request {
  const url = `${env().appUrl}${path}`
  return new Request(url, {
    method: 'POST',
    headers: {
      'content-type': 'application/x-www-form-urlencoded',
      'x-twilio-signature': webhookSignature(token, url, fields),
      'x-now': later(15).toISOString(),
    },
    body: new URLSearchParams(fields),
  })
}

let sid = 0
async function reply(body: string, id = `SMin${(sid += 1)}`): Promise<number> {
  const request = signedRequest('/api/sms/inbound', {
    MessageSid: id,
    From: PHONE,
    To: '+12025550100',
    Body: body,
  })
  return (await inbound(request, { params: Promise.resolve({}) })).status
}
const receipt = async (messageId: string, word: string, token?: string) =>
  (
    await status(
      signedRequest(
        `/api/sms/status?message=${messageId}`,
        { MessageSid: 'SM1', MessageStatus: word, To: PHONE },
        token,
      ),
      { params: Promise.resolve({}) },
    )
  ).status

const noticeOf = (of: Boat) => database.knex('notice').where({ system_id: of.systemId }).first()
const answers = () => database.knex('message').where({ purpose: 'reply' }).orderBy('id').pluck('body_text')

describe('replies', () => {
  it('OK acknowledges', async () => {
    await texted()
    expect(await reply('ok thanks')).toBe(200)
    const notice = await noticeOf(boat)
    expect(String(notice.acknowledged_by)).toBe(ownerId)
    expect(await answers()).toEqual([expect.stringContaining('Noted for Saltmarsh Hare')])
  })

  it('handed in twice are done once', async () => {
    await texted()
    await reply('OK', 'SMtwice')
    await reply('OK', 'SMtwice')
    expect(await answers()).toHaveLength(1)
    const events = await database.knex('notice_event').where({ transition: 'acknowledged' })
    expect(events).toHaveLength(1)
  })

  it('VISIT asks the shop once, and its manager hears of it', async () => {
    await texted()
    await reply('VISIT')
    await reply('visit please')
    const visits = await database.knex('visit')
    expect(visits).toHaveLength(1)
    expect(visits[0]).toMatchObject({ status: 'asked', vessel_id: boat.vesselId, shop_id: shopId })
    expect(String(visits[0].asked_by)).toBe(ownerId)
    const mails = await database.knex('message').where({ person_id: managerId, purpose: 'account' })
    expect(mails).toHaveLength(1)
    expect(await answers()).toEqual([
      expect.stringMatching(/is asked for a visit to Saltmarsh Hare/),
      expect.stringMatching(/already/),
    ])
  })

  it('MUTE silences the kind for a week, beyond the notice itself', async () => {
    await texted()
    await reply('Mute')
    const notice = await noticeOf(boat)
    expect(notice.snoozed_until).toEqual(later(15 + 7 * 24 * 60))
  })

  it.each([
    ['OFF', 'off'],
    ['laid up', 'laid-up'],
    ['LAIDUP', 'laid-up'],
  ])('%s says so of the system', async (word, value) => {
    await texted()
    await reply(word)
    const said = await database.knex('statement')
    expect(said).toHaveLength(1)
    expect(said[0]).toMatchObject({ value, system_id: boat.systemId, until_at: null })
  })

  it('STOP ends texts without an answer, START brings them back, HELP explains', async () => {
    await texted()
    await reply('STOP')
    expect(await answers()).toEqual([])
    const other = await makeBoat(database.knex, { name: 'Brent Goose', ownerId, shopId })
    const ids = await asIngest(async (trx) => {
      const opened = await openNotice(trx, {
        ...other,
        kind: 'no-start',
        at: NOW,
        severity: 1,
        reason: 'The pump did not start',
        evidence: {},
      })
      return tell(trx, [opened?.eventId ?? ''], NOW)
    })
    expect(await database.knex('message').whereIn('id', ids).pluck('channel')).toEqual(['email'])
    await reply('start')
    expect((await database.knex('contact').where({ person_id: ownerId }).first()).stopped_at).toBeNull()
    await reply('what is this?')
    expect(await answers()).toEqual([
      expect.stringMatching(/on again/),
      expect.stringMatching(/^Middlewatch\. Reply OK/),
    ])
  })

  it('never answers more than 160 letters, nor a machine without end', async () => {
    await texted()
    for (let count = 0; count < 25; count += 1) await reply('beep')
    const said = await answers()
    expect(said).toHaveLength(20)
    expect(Math.max(...said.map((text: string) => text.length))).toBeLessThanOrEqual(160)
  })

  it('without the service’s signature change nothing', async () => {
    await texted()
    const forged = signedRequest(
      '/api/sms/inbound',
      { MessageSid: 'SMx', From: PHONE, Body: 'STOP' },
      'another token',
    )
    const answer = await inbound(forged, { params: Promise.resolve({}) })
    expect(answer.status).toBe(403)
    expect((await database.knex('contact').where({ person_id: ownerId }).first()).stopped_at).toBeNull()
    expect(await database.knex('inbound_text')).toEqual([])
  })

  it('from somebody who no longer owns the boat do nothing', async () => {
    await texted()
    await database.knex('vessel_owner').where({ vessel_id: boat.vesselId }).update({ ended_at: NOW })
    await reply('OFF')
    expect(await database.knex('statement')).toEqual([])
  })
})

describe('receipts', () => {
  it('note delivery', async () => {
    const id = await texted()
    expect(await receipt(id, 'sent')).toBe(204)
    expect(await receipt(id, 'delivered')).toBe(204)
    const row = await database.knex('message').where({ id }).first()
    expect(row.delivered_at).not.toBeNull()
    expect(row.accepted_at.getTime()).toBe(later(10).getTime())
  })

  it('that say "undelivered" show the message as failed, with the service’s code', async () => {
    const id = await texted()
    await receipt(id, 'undelivered')
    expect((await database.knex('message').where({ id }).first()).failure).toMatch(/not delivered/)
  })

  it('prove acceptance where our own note of it is missing: no double', async () => {
    const id = await texted()
    await database.knex('message').where({ id }).update({ accepted_at: null, service_id: null })
    await database.knex('delivery_attempt').delete()
    await receipt(id, 'sent')
    taken = []
    expect(['already-accepted', 'receipt-was-there']).toContain(await deliver(id, later(11), services))
    expect(taken).toEqual([])
  })

  it('are refused without the signature, and for messages there are not', async () => {
    const id = await texted()
    expect(await receipt(id, 'delivered', 'another token')).toBe(403)
    expect((await database.knex('message').where({ id }).first()).delivered_at).toBeNull()
    expect(await receipt('999999999', 'delivered')).toBe(404)
    expect(await receipt('1x', 'delivered')).toBe(404)
  })

  it('come through while the message is still being sent', async () => {
    const id = await texted()
    await database.knex('message').where({ id }).update({ accepted_at: null, service_id: null })
    await database.knex('delivery_attempt').delete()
    const slow: Services = {
      ...services,
      sendText: async () => {
        await database.knex('delivery_attempt').insert({ message_id: id, at: NOW, outcome: 'accepted' })
        throw new SendError('the answer was lost', false)
      },
    }
    await expect(deliver(id, later(11), slow)).rejects.toBeInstanceOf(SendError)
    expect(await deliver(id, later(12), services)).toBe('receipt-was-there')
  })
})

describe('the link in a message', () => {
  const codeOf = async (id: string): Promise<string> =>
    (await database.knex('message').where({ id }).first()).link_code

  it('shows without changing anything, and acts when asked to', async () => {
    const code = await codeOf(await texted())
    const shown = await asIngest((trx) => messageOfLink(trx, code, later(20)))
    expect(shown?.notices.map((notice) => notice.vesselName)).toEqual(['Saltmarsh Hare'])
    expect((await noticeOf(boat)).acknowledged_at).toBeNull()
    const outcome = await asIngest((trx) => actOnLink(trx, code, 'OK', later(20)))
    expect(outcome?.did).toBe('acknowledged')
    expect((await noticeOf(boat)).acknowledged_at).toEqual(later(20))
  })

  it('runs out after two weeks, and a made-up one is none', async () => {
    const code = await codeOf(await texted())
    expect(await asIngest((trx) => actOnLink(trx, code, 'OK', later(15 * 24 * 60)))).toBeNull()
    expect(await asIngest((trx) => messageOfLink(trx, 'a7', later(1)))).toBeNull()
  })

  it('is hard to guess: ten letters of thirty-one', async () => {
    expect(await codeOf(await texted())).toMatch(/^[2-9a-hj-km-np-z]{10}$/)
  })
})
