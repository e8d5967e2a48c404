import { randomInt, randomUUID } from 'node:crypto'
import { Secret, TOTP } from 'otpauth'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import { forgetAccountBodies } from '@/db/queries/joining'
import { serverUrl, signIn } from '../support/client'
import { serverDatabase } from '../support/database'
import { lastMailTo, mailTo, secretIn } from '../support/mailbox'
import {
  expectStatus,
  invited,
  join,
  later,
  newEmail,
  newShop,
  ownBoat,
  PASSWORD,
  post,
  acceptAsNew,
} from './joining-people'

let database: Knex
beforeAll(() => {
  database = serverDatabase()
})
afterAll(() => database.destroy())

/** From the range kept for fiction; a fresh line each time would need more than it has, so codes are asked sparingly. */
const newNumber = (): string => `+1${randomInt(201, 989)}55501${String(randomInt(100)).padStart(2, '0')}`

describe('the account’s address', () => {
  it('changes by the link sent to the new one, once, and the old one is told', async () => {
    const person = await join()
    const next = newEmail()
    const ask = (password: string) => person.client.send('PUT', '/api/me/email', { email: next, password })
    expect((await ask('not the password')).status).toBe(422)
    await expectStatus(ask(PASSWORD), 200)
    const token = secretIn(await lastMailTo(next))
    expect((await post('/api/confirm-email', { token }, later(1.01))).status).toBe(410)
    await signIn(person.email, PASSWORD)
    await expectStatus(post('/api/confirm-email', { token }), 200)
    expect((await post('/api/confirm-email', { token })).status).toBe(410)
    await signIn(next, PASSWORD)
    await expect(signIn(person.email, PASSWORD)).rejects.toThrow('401')
    expect((await lastMailTo(person.email)).subject).toBe('Your address was changed')
    const contacts = await person.client.get<{ items: { address: string }[] }>('/api/me/contacts')
    expect(contacts.body.items.map((contact) => contact.address)).toEqual([next])
  })

  it('answers alike when somebody else has the address, and changes nothing', async () => {
    const [person, other] = [await join(), await join()]
    const answer = await person.client.send('PUT', '/api/me/email', {
      email: other.email,
      password: PASSWORD,
    })
    expect(answer).toMatchObject({ status: 200, body: { done: true } })
    const told = await lastMailTo(other.email)
    expect(told.subject).toBe('You have an account already')
    expect(told.text).not.toContain('/confirm/')
  })
})

describe('sessions', () => {
  it('are listed, and end one by one or all but this', async () => {
    const person = await join()
    const [second, third] = [await signIn(person.email, PASSWORD), await signIn(person.email, PASSWORD)]
    const list = await expectStatus(
      person.client.get<{ items: { id: string; current: boolean }[] }>('/api/me/sessions'),
      200,
    )
    expect(list.items.map((item) => item.current)).toEqual([true, false, false])
    const theirs = await second.get<{ items: { id: string; current: boolean }[] }>('/api/me/sessions')
    const secondId = theirs.body.items.find((item) => item.current)?.id
    await expectStatus(person.client.send('DELETE', `/api/me/sessions/${secondId}`), 200)
    expect((await second.get('/api/me')).status).toBe(401)
    const stranger = await join()
    const ownId = list.items[0]?.id
    expect((await stranger.client.send('DELETE', `/api/me/sessions/${ownId}`)).status).toBe(404)
    await expectStatus(person.client.send('DELETE', '/api/me/sessions'), 200)
    expect((await third.get('/api/me')).status).toBe(401)
    expect((await person.client.get('/api/me')).status).toBe(200)
  })
})

/** The credentials flow with a code; answers the status and the error its address names. */
async function tryWithCode(email: string, code?: string): Promise<{ status: number; error: string | null }> {
  const csrf = await fetch(`${serverUrl()}/api/auth/csrf`)
  const { csrfToken } = (await csrf.json()) as { csrfToken: string }
  const cookie = csrf.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ')
  const answer = await fetch(`${serverUrl()}/api/auth/callback/credentials`, {
    method: 'POST',
    redirect: 'manual',
    headers: { 'content-type': 'application/x-www-form-urlencoded', cookie },
    body: new URLSearchParams({
      email,
      password: PASSWORD,
      csrfToken,
      json: 'true',
      ...(code === undefined ? {} : { code }),
    }),
  })
  const { url } = (await answer.json()) as { url: string }
  return { status: answer.status, error: new URL(url).searchParams.get('error') }
}

describe('the second factor', () => {
  const device = (secret: string) =>
    new TOTP({ secret: Secret.fromBase32(secret), algorithm: 'SHA1', digits: 6, period: 30 })

  it('is turned on by a code of the device, asked at sign-in, each code once, and off again', async () => {
    const person = await join()
    const other = await signIn(person.email, PASSWORD)
    expect((await person.client.send('POST', '/api/me/second-factor', { password: 'wrong' })).status).toBe(
      422,
    )
    const begun = await expectStatus(
      person.client.send<{ secret: string; uri: string; qr: string }>('POST', '/api/me/second-factor', {
        password: PASSWORD,
      }),
      200,
    )
    expect(begun.uri).toMatch(/^otpauth:\/\/totp\/Middlewatch/)
    expect(begun.qr).toMatch(/^data:image\/svg\+xml;base64,/)
    // Begun is not on: nothing is asked yet.
    expect((await tryWithCode(person.email)).status).toBe(200)
    const totp = device(begun.secret)
    expect((await person.client.send('PUT', '/api/me/second-factor', { code: '000000' })).status).toBe(422)
    const { recoveryCodes } = await expectStatus(
      person.client.send<{ recoveryCodes: string[] }>('PUT', '/api/me/second-factor', {
        code: totp.generate(),
      }),
      200,
    )
    expect(new Set(recoveryCodes).size).toBe(10)
    expect((await other.get('/api/me')).status).toBe(401)

    expect(await tryWithCode(person.email)).toEqual({ status: 401, error: 'SecondFactor' })
    expect(await tryWithCode(person.email, '000000')).toEqual({ status: 401, error: 'SecondFactorWrong' })
    // The next one: the device's first code was spent on turning it on.
    const code = totp.generate({ timestamp: Date.now() + 30_000 })
    expect((await tryWithCode(person.email, code)).status).toBe(200)
    expect(await tryWithCode(person.email, code)).toEqual({ status: 401, error: 'SecondFactorWrong' })
    expect((await tryWithCode(person.email, recoveryCodes[0])).status).toBe(200)
    expect((await tryWithCode(person.email, recoveryCodes[0])).status).toBe(401)
    expect((await person.client.get('/api/me/second-factor')).body).toMatchObject({
      on: true,
      recoveryCodesLeft: 9,
    })

    const rows = await database('person').where({ email: person.email }).select('totp_secret', 'totp_pending')
    expect(JSON.stringify(rows)).not.toContain(begun.secret)
    const hashes = await database('recovery_code').select('hash')
    expect(hashes.some(({ hash }) => recoveryCodes.includes(String(hash)))).toBe(false)

    const off = (body: object) => person.client.send('POST', '/api/me/second-factor/off', body)
    expect((await off({ password: PASSWORD, code: '000000' })).status).toBe(422)
    const renewed = await expectStatus(
      person.client.send<{ recoveryCodes: string[] }>('POST', '/api/me/second-factor/recovery-codes', {
        password: PASSWORD,
        code: recoveryCodes[1],
      }),
      200,
    )
    // The old ones no longer work, also those that were never used.
    expect((await off({ password: PASSWORD, code: recoveryCodes[2] })).status).toBe(422)
    await expectStatus(off({ password: PASSWORD, code: renewed.recoveryCodes[0] }), 200)
    expect((await tryWithCode(person.email)).status).toBe(200)
    expect((await lastMailTo(person.email)).subject).toBe('The second factor was turned off')
  })

  it('says nothing of itself to who has not the password', async () => {
    const person = await join()
    const { secret } = await expectStatus(
      person.client.send<{ secret: string }>('POST', '/api/me/second-factor', { password: PASSWORD }),
      200,
    )
    await expectStatus(
      person.client.send('PUT', '/api/me/second-factor', { code: device(secret).generate() }),
      200,
    )
    await expect(signIn(person.email, 'not the password')).rejects.toThrow('401')
    expect((await tryWithCode(newEmail())).error).toBe('CredentialsSignin')
  })
})

describe('contacts', () => {
  const codeOf = async (number: string) => /\d{6}/.exec((await lastMailTo(number)).text)?.[0] ?? ''

  it('take a number by six digits sent to it: not before, not late, not after five wrong ones', async () => {
    const person = await join()
    const number = newNumber()
    const { id } = await expectStatus(
      person.client.send<{ id: string }>('POST', '/api/me/contacts', { channel: 'sms', address: number }),
      201,
    )
    const path = `/api/me/contacts/${id}`
    const verify = (code: string, headers = {}) =>
      person.client.send('POST', `/api/me/contacts/${id}/verify`, { code }, headers)
    const code = await codeOf(number)
    expect(code).toMatch(/^\d{6}$/)
    const wrong = code === '123456' ? '654321' : '123456'
    expect((await verify(code, later(0.01))).status).toBe(410)
    for (let tries = 0; tries < 5; tries += 1) expect((await verify(wrong)).status).toBe(422)
    expect((await verify(code)).status).toBe(410)
    await expectStatus(person.client.send('POST', `${path}/proof`), 200)
    const verified = await expectStatus(
      person.client.send<{ verifiedAt: string | null }>('POST', `${path}/verify`, {
        code: await codeOf(number),
      }),
      200,
    )
    expect(verified.verifiedAt).not.toBeNull()
    const stranger = await join()
    expect((await stranger.client.send('PATCH', path, { stopped: true })).status).toBe(404)
    expect((await stranger.client.send('DELETE', path)).status).toBe(404)
    expect((await stranger.client.send('POST', `${path}/verify`, { code })).status).toBe(404)
  })

  it('are told what one chooses, and stopped and started', async () => {
    const person = await join()
    const { items } = (
      await person.client.get<{ items: { id: string; address: string }[] }>('/api/me/contacts')
    ).body
    expect(items).toMatchObject([{ address: person.email }])
    const path = `/api/me/contacts/${items[0]?.id}`
    const settings = { kinds: ['night-warning'], urgentAtNight: true, nightWarningChance: 0.2 }
    expect((await person.client.send('PATCH', path, { settings })).body).toMatchObject({ settings })
    expect((await person.client.send('PATCH', path, { stopped: true })).body).toMatchObject({
      stoppedAt: expect.any(String),
      settings,
    })
    expect((await person.client.send('PATCH', path, { stopped: false })).body).toMatchObject({
      stoppedAt: null,
    })
    expect((await person.client.send('DELETE', path)).status).toBe(409)
    const bad = await person.client.send('PATCH', path, { settings: { nightWarningChance: 2 } })
    expect(bad.status).toBe(422)
  })

  it('take a further mailbox by the link sent to it', async () => {
    const person = await join()
    const address = newEmail()
    await expectStatus(person.client.send('POST', '/api/me/contacts', { channel: 'email', address }), 201)
    const token = secretIn(await lastMailTo(address))
    await expectStatus(post('/api/confirm-email', { token }), 200)
    const { items } = (
      await person.client.get<{ items: { address: string; verifiedAt: string | null }[] }>('/api/me/contacts')
    ).body
    expect(items.find((item) => item.address === address)?.verifiedAt).not.toBeNull()
  })

  it('send no more codes to a number than an hour allows', async () => {
    const person = await join()
    const { id } = await expectStatus(
      person.client.send<{ id: string }>('POST', '/api/me/contacts', {
        channel: 'sms',
        address: newNumber(),
      }),
      201,
    )
    const statuses: number[] = []
    for (let count = 0; count < 5; count += 1)
      statuses.push((await person.client.send('POST', `/api/me/contacts/${id}/proof`)).status)
    expect(statuses.slice(0, 3)).toEqual([200, 200, 200])
    expect(statuses[4]).toBe(429)
  })
})

describe('aboard', () => {
  it('is said for spans to come, cut where they meet, and taken back', async () => {
    const owner = await join()
    const { vesselId } = await ownBoat(owner)
    const path = `/api/vessels/${vesselId}/aboard`
    const day = (days: number) =>
      new Date(Math.round(Date.now() / 1000) * 1000 + days * 86_400_000).toISOString()
    const say = (value: boolean | null, from: number, until: number) =>
      expectStatus(owner.client.send('PUT', path, { value, from: day(from), until: day(until) }), 200)
    const spans = async () =>
      (
        await owner.client.get<{ items: { value: string; from: string; until: string }[] }>(path)
      ).body.items.map(({ value, from, until }) => [
        value,
        Math.round((Date.parse(from) - Date.now()) / 86_400_000),
        Math.round((Date.parse(until) - Date.now()) / 86_400_000),
      ])
    await say(true, 10, 20)
    await say(true, 30, 40)
    await say(false, 14, 16)
    expect(await spans()).toEqual([
      ['aboard', 10, 14],
      ['away', 14, 16],
      ['aboard', 16, 20],
      ['aboard', 30, 40],
    ])
    await say(null, 12, 35)
    expect(await spans()).toEqual([
      ['aboard', 10, 12],
      ['aboard', 35, 40],
    ])
    const backwards = await owner.client.send('PUT', path, { value: true, from: day(5), until: day(4) })
    expect(backwards.status).toBe(422)
    const stranger = await join()
    expect((await stranger.client.get(path)).status).toBe(404)
  })
})

describe('mails of the account', () => {
  it('are blanked once they have left, so that no link stays in a table', async () => {
    const email = newEmail()
    await expectStatus(post('/api/password/forgot', { email }), 200)
    await lastMailTo(email)
    const bodies = async (trx: Knex) =>
      (await trx('message').where({ address: email }).select<{ body_text: string }[]>('body_text')).map(
        (row) => row.body_text,
      )
    const undo = new Error('only tried')
    // Other tests read their mails yet: what is blanked here comes back.
    await expect(
      database.transaction(async (trx) => {
        await forgetAccountBodies(trx, new Date(Date.now() - 60_000))
        expect(await bodies(trx)).not.toEqual([''])
        await forgetAccountBodies(trx, new Date(Date.now() + 60_000))
        expect(await bodies(trx)).toEqual([''])
        throw undo
      }),
    ).rejects.toBe(undo)
  })
})

describe('one’s data', () => {
  it('leave as a file without secrets', async () => {
    const owner = await join()
    const { vesselId } = await ownBoat(owner)
    const file = await expectStatus(
      owner.client.get<Record<string, { [key: string]: unknown }[]>>('/api/me/export'),
      200,
    )
    expect(file.person).toMatchObject([{ email: owner.email, name: 'Wren Holm' }])
    expect(file.vessels).toMatchObject([{ id: vesselId }])
    for (const subject of ['contacts', 'sessions', 'consents', 'messages', 'log', 'flushes', 'runs'])
      expect(Array.isArray(file[subject]), subject).toBe(true)
    expect(JSON.stringify(file)).not.toMatch(/argon2|password_hash|\/confirm\//)
  })

  it('go with the account: no name, no address, no sight, no record; the shop keeps its visit', async () => {
    const [owner, shop] = [await join(), await newShop()]
    const { vesselId, systemId } = await ownBoat(owner)
    await expectStatus(
      owner.client.send('PUT', `/api/vessels/${vesselId}/access/${shop.shopId}`, { level: 'full' }),
      200,
    )
    const { id: visitId } = await expectStatus(
      owner.client.send<{ id: string }>('POST', `/api/vessels/${vesselId}/visits`, {
        complaint: 'runs at night',
        shopId: shop.shopId,
      }),
      201,
    )
    const { key } = await expectStatus(
      owner.client.send<{ key: string }>('POST', `/api/systems/${systemId}/loggers`, {
        serial: `G-${randomUUID()}`,
        intervalSeconds: 60,
        channels: ['pump', 'vacuum'],
      }),
      201,
    )
    const upload = (vacuum: number) =>
      fetch(`${serverUrl()}/api/ingest`, {
        method: 'POST',
        headers: { authorization: `Bearer ${key}`, 'content-type': 'text/csv' },
        body: `time,vacuum_pa,pump\r\n${new Date(Date.now() - 5000).toISOString()},${vacuum},0\r\n`,
      })
    expect((await upload(30_000)).status).toBe(200)
    const fitting = await database('logger_fitting')
      .where({ system_id: systemId })
      .first<{ logger_id: number }>()
    const samples = () => database('sample').where({ logger_id: fitting?.logger_id })
    expect(await samples()).toHaveLength(1)
    const person = await database('person').where({ email: owner.email }).first<{ id: string }>('id')

    expect((await owner.client.get('/api/account/delete')).body).toMatchObject({
      vessels: [{ id: vesselId }],
      shared: [],
      blocked: [],
      visitsKept: 1,
    })
    const end = (body: object) => owner.client.send('POST', '/api/account/delete', body)
    expect((await end({ email: 'other@harbour.example', password: PASSWORD })).status).toBe(422)
    expect((await end({ email: owner.email, password: 'wrong' })).status).toBe(422)
    await expectStatus(end({ email: owner.email, password: PASSWORD }), 200)

    expect((await owner.client.get('/api/me')).status).toBe(401)
    await expect(signIn(owner.email, PASSWORD)).rejects.toThrow('401')
    expect(await database('person').where({ id: person?.id }).first()).toMatchObject({
      name: 'Somebody who left',
      password_hash: null,
      deleted_at: expect.any(Date),
    })
    for (const table of ['contact', 'session', 'token', 'recovery_code'])
      expect(await database(table).where({ person_id: person?.id }), table).toEqual([])
    const left = await database('message').whereRaw('lower(address) = lower(?)', [owner.email])
    expect(left.map((message: { subject: string }) => message.subject)).toEqual(['Your account is gone'])
    expect((await mailTo(owner.email)).at(-1)?.subject).toBe('Your account is gone')
    expect(await samples()).toEqual([])
    expect([401, 403]).toContain((await upload(29_000)).status)
    expect((await shop.client.get(`/api/vessels/${vesselId}`)).status).toBe(404)
    expect(await database('visit').where({ id: visitId }).first()).toMatchObject({
      complaint: 'runs at night',
    })
    // The address is free again.
    await expectStatus(post('/api/sign-up', { email: owner.email, name: 'Anew' }), 200)
    expect((await lastMailTo(owner.email)).subject).toBe('Confirm your address')
  })

  it('stay while one is the last manager of a shop with others in it', async () => {
    const shop = await newShop()
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'technician' })
    await acceptAsNew(email, token)
    const refused = await shop.client.send('POST', '/api/account/delete', {
      email: shop.email,
      password: PASSWORD,
    })
    expect(refused.status).toBe(409)
    expect((await shop.client.get('/api/me')).status).toBe(200)
  })
})
