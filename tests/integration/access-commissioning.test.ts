import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import { everybody, newBoat, type Account, type Asking, type Boat, type People } from './api-boats'

/* Fitting a logger is the owner's, an installer's and the manager's; a technician sees the boat, and may not. */

const FITTERS = ['owner', 'installer', 'manager'] as const
let people: People
let boat: Boat
beforeAll(async () => {
  people = await everybody()
  boat = await newBoat(people)
})

/** One that has its system already, and whose logger is not fitted yet. */
async function begun(): Promise<string> {
  const made = await people.installer
    .post('/api/commissionings', { way: 'key', serial: `K-${randomUUID()}`, systemId: boat.systemId })
    .expect(201)
  return (made.body as { id: string }).id
}

interface Case {
  operation: string
  ask: (person: Asking, id: string) => PromiseLike<{ status: number }>
  /** What a fitter is answered; 409 and 422 where the state of the fitting, not the right, says no. */
  success: readonly number[]
}

const CASES: Case[] = [
  {
    operation: 'get /api/commissionings/{id}',
    ask: (p, id) => p.get(`/api/commissionings/${id}`),
    success: [200],
  },
  {
    operation: 'patch /api/commissionings/{id}',
    ask: (p, id) => p.patch(`/api/commissionings/${id}`, { setAside: false }),
    success: [200],
  },
  {
    operation: 'post /api/commissionings/{id}/fitting',
    ask: (p, id) => p.post(`/api/commissionings/${id}/fitting`, { channels: ['pump', 'vacuum'] }),
    success: [201, 409],
  },
  {
    operation: 'post /api/commissionings/{id}/checks/{kind}',
    ask: (p, id) => p.post(`/api/commissionings/${id}/checks/zero`, { step: 'begin' }),
    success: [200, 409, 422],
  },
  {
    operation: 'get /api/commissionings/{id}/live',
    ask: (p, id) => p.get(`/api/commissionings/${id}/live`),
    success: [200, 409],
  },
  {
    operation: 'post /api/commissionings/{id}/finish',
    ask: (p, id) => p.post(`/api/commissionings/${id}/finish`, {}),
    success: [200, 409, 422],
  },
]

describe('a commissioning', () => {
  for (const { operation, ask, success } of CASES)
    it(operation, async () => {
      for (const name of FITTERS) {
        const { status } = await ask(people[name], await begun())
        expect(success, `${name} was answered ${status}`).toContain(status)
      }
      const id = await begun()
      const statusOf = async (name: Account | 'nobody') => (await ask(people[name], id)).status
      // A step that is not said rightly is told only to those who may take it.
      expect([403, 422]).toContain(await statusOf('technician'))
      for (const name of ['strangeManager', 'strangeOwner'] as const)
        expect([404, 422], name).toContain(await statusOf(name))
      expect(await statusOf('nobody')).toBe(401)
    })

  it('post /api/commissionings', async () => {
    const start = (person: Asking) =>
      person.post('/api/commissionings', { way: 'key', serial: `K-${randomUUID()}`, systemId: boat.systemId })
    for (const name of FITTERS) await start(people[name]).expect(201)
    await start(people.technician).expect(403)
    await start(people.strangeManager).expect(404)
    await start(people.nobody).expect(401)
  })

  it('is listed to those who may work on it', async () => {
    // 'get /api/commissionings'
    const id = await begun()
    const has = async (person: Asking) => {
      const answer = await person.get('/api/commissionings?limit=5000').expect(200)
      return (answer.body as { items: { id: string }[] }).items.some((item) => item.id === id)
    }
    for (const name of FITTERS) expect(await has(people[name]), name).toBe(true)
    for (const name of ['strangeManager', 'strangeOwner'] as const)
      expect(await has(people[name]), name).toBe(false)
    await people.nobody.get('/api/commissionings').expect(401)
  })

  it('of a logger goes with sight of the logger', async () => {
    // 'get /api/loggers/{id}/commissioning' and 'get /api/loggers/health'
    const id = await begun()
    const fitted = await people.installer
      .post(`/api/commissionings/${id}/fitting`, { channels: ['pump', 'vacuum'] })
      .expect(201)
    const { loggerId } = fitted.body as { loggerId: string }
    const record = `/api/loggers/${loggerId}/commissioning`
    for (const name of FITTERS) await people[name].get(record).expect(200)
    for (const name of ['strangeManager', 'strangeOwner'] as const) await people[name].get(record).expect(404)
    await people.nobody.get(record).expect(401)
    const listed = async (person: Asking) =>
      JSON.stringify((await person.get('/api/loggers/health?limit=5000').expect(200)).body).includes(
        `"${loggerId}"`,
      )
    expect(await listed(people.manager)).toBe(true)
    expect(await listed(people.strangeManager)).toBe(false)
    await people.nobody.get('/api/loggers/health').expect(401)
  })
})
