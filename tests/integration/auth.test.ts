import { randomUUID } from 'node:crypto'
import request, { type Response } from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import { serverUrl, signIn } from '../support/client'
import { serverDatabase } from '../support/database'
import { DEMO_PASSWORD } from '../support/settings'
import { ACCOUNTS } from './api-boats'

let database: Knex
beforeAll(() => {
  database = serverDatabase()
})
afterAll(() => database.destroy())

const cookiesOf = (answer: Response): string[] => {
  const set: unknown = answer.headers['set-cookie']
  return Array.isArray(set) ? set.map(String) : []
}

async function csrf(cookie = ''): Promise<{ token: string; cookie: string }> {
  const answer = await request(serverUrl()).get('/api/auth/csrf').set('cookie', cookie).expect(200)
  const { csrfToken } = answer.body as { csrfToken: string }
  return {
    token: csrfToken,
    cookie: cookiesOf(answer)
      .map((line) => line.split(';')[0])
      .join('; '),
  }
}

async function attempt(email: string, password: string, from = '203.0.113.9') {
  const { token, cookie } = await csrf()
  return request(serverUrl())
    .post('/api/auth/callback/credentials')
    .set('cookie', cookie)
    .set('x-forwarded-for', from)
    .type('form')
    .send({ email, password, csrfToken: token, json: 'true' })
}

describe('signing in', () => {
  it('answers 200 with a session cookie that scripts cannot read', async () => {
    const answer = await attempt(ACCOUNTS.owner, DEMO_PASSWORD)
    expect(answer.status).toBe(200)
    expect(answer.body).toEqual({ url: expect.any(String) })
    const session = cookiesOf(answer).find((line) => line.includes('session-token='))
    expect(session).toMatch(/HttpOnly/i)
    expect(session).toMatch(/SameSite=Lax/i)
  })

  it('answers 401 alike for a wrong password and for nobody', async () => {
    const wrong = await attempt(ACCOUNTS.owner, 'not-it')
    const nobody = await attempt(`${randomUUID()}@nowhere.example`, 'not-it')
    expect(wrong.status).toBe(401)
    expect(nobody.status).toBe(401)
    expect(nobody.body).toEqual(wrong.body)
    for (const answer of [wrong, nobody])
      expect(cookiesOf(answer).some((line) => line.includes('session-token='))).toBe(false)
  })

  it('answers 401 without a valid CSRF token', async () => {
    const answer = await request(serverUrl())
      .post('/api/auth/callback/credentials')
      .type('form')
      .send({ email: ACCOUNTS.owner, password: DEMO_PASSWORD, csrfToken: 'made-up', json: 'true' })
    expect(answer.status).toBe(401)
  })

  it('takes the address in any case', async () => {
    expect((await attempt(ACCOUNTS.owner.toUpperCase(), DEMO_PASSWORD)).status).toBe(200)
  })

  it.each(['has an account', 'has none'])('stops guessing at an address that %s', async (which) => {
    // A person of this test's own, so that nobody else's sign-in is slowed down.
    const email = `${randomUUID()}@guessed.example`
    if (which === 'has an account') await database('person').insert({ email, name: 'Guessed' })
    const from = '203.0.113.77'
    const answers: number[] = []
    for (let count = 0; count < 11; count += 1)
      answers.push((await attempt(email, `guess ${count}`, from)).status)
    expect(answers.slice(0, 10)).toEqual(Array(10).fill(401))
    expect(answers[10]).toBe(429)
    const stopped = await attempt(email, 'again', from)
    expect(Number(stopped.headers['retry-after'])).toBeGreaterThan(0)
    expect(stopped.headers['content-type']).toBe('application/problem+json')
    expect((await attempt(email, 'from elsewhere', '203.0.113.78')).status).toBe(401)
  })
})

describe('a session', () => {
  it('tells who it is, and for all it tells no roles in the cookie', async () => {
    const client = await signIn(ACCOUNTS.manager)
    const me = await client.get<{ person: { email: string }; roles: string[] }>('/api/me')
    expect(me.status).toBe(200)
    expect(me.body.person.email).toBe(ACCOUNTS.manager)
    expect(me.body.roles).toEqual(['manager'])
  })

  it('ends with signing out, also for a copy of its cookie', async () => {
    const client = await signIn(ACCOUNTS.owner)
    expect((await client.get('/api/me')).status).toBe(200)
    const { token, cookie } = await csrf(client.cookie)
    await request(serverUrl())
      .post('/api/auth/signout')
      .set('cookie', `${client.cookie}; ${cookie}`)
      .type('form')
      .send({ csrfToken: token, json: 'true' })
      .expect(200)
    const after = await client.get<{ type: string }>('/api/me')
    expect(after.status).toBe(401)
    expect(after.headers.get('content-type')).toBe('application/problem+json')
    const session = await request(serverUrl()).get('/api/auth/session').set('cookie', client.cookie)
    expect(session.body).toEqual({})
  })

  it('ends when its row expires', async () => {
    const client = await signIn(ACCOUNTS.strangeOwner)
    const [row] = await database('session as s')
      .join('person as p', 'p.id', 's.person_id')
      .where('p.email', ACCOUNTS.strangeOwner)
      .orderBy('s.created_at', 'desc')
      .limit(1)
      .select<{ id: string }[]>('s.id')
    await database('session')
      .where({ id: row?.id })
      .update({ created_at: '2000-01-01', expires_at: '2000-01-02' })
    expect((await client.get('/api/me')).status).toBe(401)
  })

  it('is nothing when the cookie is made up', async () => {
    for (const value of ['', 'made-up', 'a.b.c.d.e'])
      await request(serverUrl()).get('/api/me').set('cookie', `next-auth.session-token=${value}`).expect(401)
  })

  it('loses a role at once when the membership ends', async () => {
    const email = `${randomUUID()}@saltern.example`
    const [boss] = await database('person as p')
      .join('membership as m', 'm.person_id', 'p.id')
      .where('p.email', ACCOUNTS.manager)
      .select<{ password_hash: string; shop_id: string }[]>('p.password_hash', 'm.shop_id')
    const [person] = await database('person')
      .insert({ email, name: 'New Hand', password_hash: boss?.password_hash })
      .returning<{ id: string }[]>('id')
    await database('membership').insert({ shop_id: boss?.shop_id, person_id: person?.id, role: 'technician' })
    const client = await signIn(email)
    expect((await client.get<{ roles: string[] }>('/api/me')).body.roles).toEqual(['technician'])
    await database('membership')
      .where({ person_id: person?.id })
      .update({ ended_at: new Date(Date.now() + 1000) })
    expect((await client.get<{ roles: string[]; shops: unknown[] }>('/api/me')).body).toMatchObject({
      roles: [],
      shops: [],
    })
  })
})

describe('oneself', () => {
  it('changes name and units, and nothing else', async () => {
    const client = await signIn(ACCOUNTS.strangeOwner)
    const before = await client.get<{ person: { name: string }; roles: string[] }>('/api/me')
    const changed = await client.send<{ units: object; roles: string[] }>('PATCH', '/api/me', {
      units: { vacuum: 'kPa' },
      roles: ['manager'],
    })
    expect(changed.status).toBe(200)
    expect(changed.body).toMatchObject({
      person: before.body.person,
      units: { vacuum: 'kPa', temperature: 'C', volume: 'L', clock: '24h' },
    })
    expect(changed.body.roles).toEqual(before.body.roles)
    expect(changed.body.roles).not.toContain('manager')
    await client.send('PATCH', '/api/me', { units: { vacuum: 'inHg' } })
  })

  it('sets a new password with the current one, which ends other sessions', async () => {
    const email = `${randomUUID()}@saltern.example`
    const [boss] = await database('person')
      .where({ email: ACCOUNTS.manager })
      .select<{ password_hash: string }[]>('password_hash')
    await database('person').insert({ email, name: 'Careful', password_hash: boss?.password_hash })
    const [here, there] = [await signIn(email), await signIn(email)]
    const next = 'a better watchword'
    const wrong = await here.send('PUT', '/api/me/password', { current: 'not-it', next })
    expect(wrong.status).toBe(422)
    expect((await here.send('PUT', '/api/me/password', { current: DEMO_PASSWORD, next })).status).toBe(200)
    expect((await here.get('/api/me')).status).toBe(200)
    expect((await there.get('/api/me')).status).toBe(401)
    await expect(signIn(email)).rejects.toThrow('401')
    await signIn(email, next)
  })
})
