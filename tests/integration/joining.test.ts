import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import { nobody, serverUrl, signIn } from '../support/client'
import { serverDatabase } from '../support/database'
import { lastMailTo, linkIn, mailTo, secretIn } from '../support/mailbox'
import {
  acceptAsNew,
  elsewhere,
  expectStatus,
  invited,
  join,
  later,
  newEmail,
  newShop,
  ownBoat,
  PASSWORD,
  post,
} from './joining-people'

let database: Knex
beforeAll(() => {
  database = serverDatabase()
})
afterAll(() => database.destroy())

interface Me {
  person: { email: string }
  roles: string[]
  shops: { id: string; name: string; roles: string[] }[]
  ownVessels: { id: string }[]
}

describe('signing up', () => {
  it('brings a shop and its first manager by a mail, and an owner without a shop', async () => {
    const shop = await newShop()
    const me = (await shop.client.get<Me>('/api/me')).body
    expect(me.roles).toEqual(['manager'])
    expect(me.shops).toMatchObject([{ roles: ['manager'] }])
    const owner = await join()
    expect((await owner.client.get<Me>('/api/me')).body).toMatchObject({ roles: [], shops: [] })
    const { vesselId } = await ownBoat(owner)
    expect((await owner.client.get<Me>('/api/me')).body).toMatchObject({
      roles: ['owner'],
      ownVessels: [{ id: vesselId }],
    })
  })

  it('answers alike for addresses with and without an account, and tells only the mailbox', async () => {
    const known = await join()
    const [fresh, taken] = [newEmail(), known.email]
    const answers = await Promise.all(
      [fresh, taken, taken.toUpperCase()].map((email) => post('/api/sign-up', { email, name: 'Other' })),
    )
    for (const answer of answers) {
      expect(answer.status).toBe(200)
      expect(answer.body).toEqual({ done: true })
    }
    expect((await lastMailTo(fresh)).subject).toBe('Confirm your address')
    const told = await lastMailTo(taken)
    expect(told.subject).toBe('You have an account already')
    expect(linkIn(told)).toBe('/sign-in')
    await signIn(taken, PASSWORD)
  })

  it('makes no account before the link is acted on; opening it changes nothing', async () => {
    const email = newEmail()
    await expectStatus(post('/api/sign-up', { email, name: 'Scanned' }), 200)
    const mail = await lastMailTo(email)
    for (let visits = 0; visits < 2; visits += 1) {
      const page = await fetch(`${serverUrl()}${linkIn(mail)}`)
      expect(page.status).toBe(200)
      expect(await page.text()).toContain(email)
    }
    expect(await database('person').where({ email }).first('id')).toBeUndefined()
    expect((await post('/api/confirm-email', { token: secretIn(mail) })).status).toBe(422)
    expect((await post('/api/confirm-email', { token: secretIn(mail), password: 'short' })).status).toBe(422)
    await expectStatus(post('/api/confirm-email', { token: secretIn(mail), password: PASSWORD }), 200)
  })

  it('takes each link once, for two days, and of several only until the account is there', async () => {
    const email = newEmail()
    await expectStatus(post('/api/sign-up', { email, name: 'First' }), 200)
    const first = secretIn(await lastMailTo(email))
    await expectStatus(post('/api/sign-up', { email, name: 'Second' }), 200)
    const second = secretIn(await lastMailTo(email))
    const late = await post('/api/confirm-email', { token: first, password: PASSWORD }, later(2.01))
    expect(late.status).toBe(410)
    await expectStatus(post('/api/confirm-email', { token: second, password: PASSWORD }), 200)
    for (const token of [first, second, 'A'.repeat(43)]) {
      const again = await post('/api/confirm-email', { token, password: 'another password' })
      expect(again.status).toBe(410)
      expect(again.body.type).toContain('gone')
    }
  })

  it('keeps only hashes of what links hold, of 256 bits', async () => {
    const email = newEmail()
    await expectStatus(post('/api/sign-up', { email, name: 'Secret' }), 200)
    const secret = secretIn(await lastMailTo(email))
    expect(Buffer.from(secret, 'base64url')).toHaveLength(32)
    const rows = await database('sign_up').where({ email }).select('*')
    expect(JSON.stringify(rows)).not.toContain(secret)
  })

  it('refuses a zone that is none, and a flood of mail to one address', async () => {
    const zone = await post('/api/sign-up', {
      email: newEmail(),
      name: 'A',
      shop: { name: 'B', timeZone: 'Sea/Nowhere' },
    })
    expect(zone.status).toBe(422)
    const email = newEmail()
    const statuses: number[] = []
    for (let count = 0; count < 7; count += 1)
      statuses.push((await post('/api/password/forgot', { email })).status)
    expect(statuses).toEqual([200, 200, 200, 200, 200, 200, 429])
  })
})

describe('a forgotten password', () => {
  it('is answered alike and in like time for everybody', async () => {
    const known = await join()
    const times: Record<'known' | 'unknown', number[]> = { known: [], unknown: [] }
    for (let round = 0; round < 5; round += 1)
      for (const which of ['known', 'unknown'] as const) {
        const began = performance.now()
        const answer = await post('/api/password/forgot', {
          email: which === 'known' ? known.email : newEmail(),
        })
        times[which].push(performance.now() - began)
        expect(answer.status).toBe(200)
        expect(answer.body).toEqual({ done: true })
      }
    // The quickest of each: what is left when nothing else held the machine up.
    expect(Math.abs(Math.min(...times.known) - Math.min(...times.unknown))).toBeLessThan(60)
    const rows = await database('token').where({ purpose: 'reset-password' }).whereNull('person_id')
    expect(rows.length).toBeGreaterThanOrEqual(5)
  })

  it('is set by the link once, within an hour, and ends every session', async () => {
    const person = await join()
    await expectStatus(post('/api/password/forgot', { email: person.email }), 200)
    const first = secretIn(await lastMailTo(person.email))
    await expectStatus(post('/api/password/forgot', { email: person.email }), 200)
    const second = secretIn(await lastMailTo(person.email))
    const password = 'another watch entirely'
    expect((await post('/api/password/reset', { token: first, password }, later(0.05))).status).toBe(410)
    await expectStatus(post('/api/password/reset', { token: first, password }), 200)
    expect((await person.client.get('/api/me')).status).toBe(401)
    for (const token of [first, second])
      expect((await post('/api/password/reset', { token, password: PASSWORD })).status).toBe(410)
    await expect(signIn(person.email, PASSWORD)).rejects.toThrow('401')
    await signIn(person.email, password)
    expect((await lastMailTo(person.email)).subject).toBe('Your password was changed')
  })

  it('of nobody gets a mail that leads nowhere', async () => {
    const email = newEmail()
    await expectStatus(post('/api/password/forgot', { email }), 200)
    const mails = await mailTo(email)
    expect(mails.map((mail) => mail.subject)).toEqual(['No account with this address'])
    expect(mails[0]?.text).not.toContain('/reset-password/')
  })
})

describe('an invitation into a shop', () => {
  it('makes somebody new one of its people, with the role it names', async () => {
    const shop = await newShop()
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'technician' })
    const seen = await expectStatus(post<{ hasAccount: boolean }>('/api/invitations/look', { token }), 200)
    expect(seen).toMatchObject({ email, role: 'technician', hasAccount: false })
    expect((await post('/api/invitations/accept', { token })).status).toBe(422)
    const joined = await acceptAsNew(email, token)
    expect((await joined.client.get<Me>('/api/me')).body.shops).toMatchObject([
      { id: shop.shopId, roles: ['technician'] },
    ])
    expect((await post('/api/invitations/look', { token })).status).toBe(410)
    expect((await post('/api/invitations/accept', { token, name: 'X', password: PASSWORD })).status).toBe(410)
  })

  it('is the invited person’s alone', async () => {
    const [shop, known, other] = [await newShop(), await join(), await join()]
    const { token } = await invited(shop.client, known.email, { shopId: shop.shopId, role: 'installer' })
    const asNobody = await post('/api/invitations/accept', { token, name: 'X', password: PASSWORD })
    expect(asNobody.status).toBe(401)
    expect((await other.client.send('POST', '/api/invitations/accept', { token })).status).toBe(403)
    expect((await known.client.send('POST', '/api/invitations/accept', { token })).status).toBe(200)
    expect((await known.client.get<Me>('/api/me')).body.roles).toEqual(['installer'])
    expect((await other.client.get<Me>('/api/me')).body.roles).toEqual([])
  })

  it('runs out, is taken back, and sent again with another link', async () => {
    const shop = await newShop()
    const email = newEmail()
    const to = { shopId: shop.shopId, role: 'technician' }
    const first = await invited(shop.client, email, to)
    expect((await post('/api/invitations/look', { token: first.token }, later(14.1))).status).toBe(410)
    const again = await expectStatus(
      shop.client.send<{ id: string }>('POST', `/api/invitations/${first.id}/resend`, {}, elsewhere()),
      200,
    )
    expect((await post('/api/invitations/look', { token: first.token })).status).toBe(410)
    const second = secretIn(await lastMailTo(email))
    expect((await post('/api/invitations/look', { token: second })).status).toBe(200)
    await expectStatus(shop.client.send('DELETE', `/api/invitations/${again.id}`), 200)
    expect((await post('/api/invitations/look', { token: second })).status).toBe(410)
    expect((await shop.client.send('DELETE', `/api/invitations/${again.id}`)).status).toBe(409)
    const list = await shop.client.get<{ items: unknown[] }>(`/api/invitations?shop=${shop.shopId}`)
    expect(list.body.items).toEqual([])
  })

  it('is sent, seen and taken back by managers of the shop alone', async () => {
    const [shop, stranger] = [await newShop(), await newShop()]
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'technician' })
    const hand = await acceptAsNew(email, token)
    const waiting = await invited(shop.client, newEmail(), { shopId: shop.shopId, role: 'installer' })
    const asks: [string, string, object | undefined][] = [
      ['POST', '/api/invitations', { email: newEmail(), shopId: shop.shopId, role: 'manager' }],
      ['GET', `/api/invitations?shop=${shop.shopId}`, undefined],
      ['POST', `/api/invitations/${waiting.id}/resend`, {}],
      ['DELETE', `/api/invitations/${waiting.id}`, undefined],
    ]
    for (const [method, path, body] of asks) {
      expect((await hand.client.send(method, path, body)).status, `${method} ${path}`).toBe(403)
      expect((await stranger.client.send(method, path, body)).status, `${method} ${path}`).toBe(404)
      expect((await nobody().send(method, path, body)).status, `${method} ${path}`).toBe(401)
    }
    expect((await post('/api/invitations/look', { token: waiting.token })).status).toBe(200)
  })

  it('answers the inviter alike whether the address has an account or not', async () => {
    const [shop, known] = [await newShop(), await join()]
    const answers = []
    for (const email of [known.email, newEmail()])
      answers.push(
        await expectStatus(
          shop.client.send<object>('POST', '/api/invitations', {
            email,
            shopId: shop.shopId,
            role: 'technician',
          }),
          201,
        ),
      )
    const shape = (answer: object | undefined) =>
      Object.entries(answer ?? {})
        .filter(([key]) => !['id', 'email', 'createdAt', 'expiresAt'].includes(key))
        .map(([key, value]) => [key, value] as const)
    expect(shape(answers[0])).toEqual(shape(answers[1]))
  })
})

describe('people of a shop', () => {
  it('get and lose roles at once, and the last manager stays', async () => {
    const shop = await newShop()
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'technician' })
    const hand = await acceptAsNew(email, token)
    const path = `/api/shops/${shop.shopId}/people`
    const people = await shop.client.get<{ items: { personId: string; email: string; roles: string[] }[] }>(
      path,
    )
    const idOf = (address: string) => people.body.items.find((item) => item.email === address)?.personId ?? ''
    expect(people.body.items).toHaveLength(2)
    expect((await hand.client.get(path)).status).toBe(403)

    const self = `/api/shops/${shop.shopId}/people/${idOf(shop.email)}`
    for (const roles of [[], ['technician']]) {
      const refused = await shop.client.send<{ detail: string }>('PUT', self, { roles })
      expect(refused.status).toBe(409)
      expect(refused.body.detail).toContain('last manager')
    }
    expect((await shop.client.send('DELETE', `/api/me/shops/${shop.shopId}`)).status).toBe(409)

    await expectStatus(
      shop.client.send('PUT', `${path}/${idOf(email)}`, { roles: ['manager', 'installer'] }),
      200,
    )
    expect((await hand.client.get<Me>('/api/me')).body.roles).toEqual(['installer', 'manager'])
    await expectStatus(shop.client.send('DELETE', `/api/me/shops/${shop.shopId}`), 200)
    expect((await shop.client.get(path)).status).toBe(404)
    expect((await hand.client.send('PUT', self, { roles: ['manager'] })).status).toBe(404)
  })

  it('of whom two managers take each other out at once still leave one', async () => {
    const shop = await newShop()
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'manager' })
    const second = await acceptAsNew(email, token)
    const path = `/api/shops/${shop.shopId}/people`
    const { items } = (await shop.client.get<{ items: { personId: string; email: string }[] }>(path)).body
    const out = (by: typeof shop.client, address: string) =>
      by.send('PUT', `${path}/${items.find((item) => item.email === address)?.personId}`, { roles: [] })
    const answers = await Promise.all([out(shop.client, email), out(second.client, shop.email)])
    expect(answers.filter((answer) => answer.status === 200)).toHaveLength(1)
    const managers = await database('membership')
      .where({ shop_id: shop.shopId, role: 'manager' })
      .whereNull('ended_at')
    expect(managers).toHaveLength(1)
  })
})

describe('a shop', () => {
  it('is started by somebody with an account, who then manages it', async () => {
    const person = await join()
    const ask = (timeZone: string) =>
      person.client.send<{ id: string }>('POST', '/api/me/shops', { name: 'Second Holm', timeZone })
    expect((await ask('Sea/Nowhere')).status).toBe(422)
    const { id } = await expectStatus(ask('Europe/Lisbon'), 201)
    expect((await person.client.get<Me>('/api/me')).body.shops).toMatchObject([
      { id, name: 'Second Holm', roles: ['manager'] },
    ])
  })

  it('is changed by its managers: name, what it is told, quiet hours, who is on call', async () => {
    const [shop, stranger] = [await newShop(), await join()]
    const path = `/api/shops/${shop.shopId}`
    const people = await shop.client.get<{ items: { personId: string }[] }>(`${path}/people`)
    const onCallId = people.body.items[0]?.personId
    const change = {
      harbour: 'Outer Holm',
      toldKinds: ['step'],
      quietHours: { start: '21:00', end: '06:00' },
      onCallId,
    }
    const changed = await expectStatus(shop.client.send<object>('PATCH', path, change), 200)
    expect(changed).toMatchObject({
      harbour: 'Outer Holm',
      toldKinds: ['step'],
      quietHours: { start: '21:00', end: '06:00' },
      onCall: { personId: onCallId },
    })
    const outsider = await shop.client.send('PATCH', path, { onCallId: '999999999' })
    expect(outsider.status).toBe(422)
    expect((await shop.client.send('PATCH', path, { timeZone: 'Sea/Nowhere' })).status).toBe(422)
    expect((await stranger.client.get(path)).status).toBe(404)
    expect((await stranger.client.send('PATCH', path, change)).status).toBe(404)
    const log = await shop.client.get<{ items: { did: string }[] }>(`${path}/log`)
    expect(log.body.items.map((entry) => entry.did)).toContainEqual(
      'changed the shop: harbour, quiet hours, what it is told, who is on call',
    )
    expect((await stranger.client.get(`${path}/log`)).status).toBe(404)
  })

  it('never shows mails of accounts in its message log', async () => {
    const shop = await newShop()
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'technician' })
    await acceptAsNew(email, token)
    await expectStatus(post('/api/password/forgot', { email }), 200)
    await lastMailTo(email)
    const log = await shop.client.get<{ items: unknown[] }>('/api/messages?limit=5000')
    expect(log.status).toBe(200)
    expect(JSON.stringify(log.body)).not.toContain('/reset-password/')
    expect(log.body.items).toEqual([])
    const seen = await database.transaction(async (trx) => {
      const person = await trx('person').where({ email: shop.email }).first<{ id: string }>('id')
      await trx.raw('set local role mw_person')
      await trx.raw("select set_config('app.person_id', ?, true)", [person?.id])
      return trx('message').where({ purpose: 'account' }).count<{ count: string }[]>().first()
    })
    expect(seen?.count).toBe('0')
  })
})
