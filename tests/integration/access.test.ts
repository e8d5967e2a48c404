import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import { OPERATIONS } from '@/lib/api/operations'
import {
  everybody,
  newBoat,
  sawTooth,
  shopOf,
  upload,
  type Account,
  type Asking,
  type Boat,
  type People,
} from './api-boats'
import { HANDLERS } from '../support/access/matrix'

/*
 * Who may do what, on a boat of `owner` that the shop of manager, technician and installer sees; the second shop's
 * manager and the second owner are the strangers. For every address: 404 to who may not see, 403 to who sees
 * without the right, 401 to nobody.
 */

const STRANGERS = ['strangeManager', 'strangeOwner'] as const
const INSIDERS = ['owner', 'technician', 'installer', 'manager'] as const
type Insider = (typeof INSIDERS)[number]

let people: People
let shopId: string
let strangeShopId: string

interface Place extends Boat {
  noticeId: string
  visitId: string
}

async function setConsent(boat: Boat, level: 'figures' | 'full'): Promise<void> {
  await people.owner.put(`/api/vessels/${boat.vesselId}/access/${shopId}`, { level }).expect(200)
}

/** A boat with half a day of record that leaks enough for a notice, and a visit that was asked for. */
async function newPlace(level: 'figures' | 'full'): Promise<Place> {
  const boat = await newBoat(people)
  const to = Date.now() - 60_000
  await upload(
    boat,
    sawTooth({ from: to - 12 * 3_600_000, to, paPerHour: 6000, flushes: [to - 6 * 3_600_000] }),
  )
  const notices = await people.owner.get(`/api/notices?state=open&vessel=${boat.vesselId}`).expect(200)
  const [notice] = (notices.body as { items: { id: string }[] }).items
  const visit = await people.owner
    .post(`/api/vessels/${boat.vesselId}/visits`, { complaint: 'runs' })
    .expect(201)
  await setConsent(boat, level)
  return { ...boat, noticeId: notice?.id ?? '', visitId: (visit.body as { id: string }).id }
}

let full: Place
let figures: Place
beforeAll(async () => {
  people = await everybody()
  shopId = await shopOf(people.manager)
  strangeShopId = await shopOf(people.strangeManager)
  full = await newPlace('full')
  figures = await newPlace('figures')
  expect(full.noticeId).not.toBe('')
})

const span = () => {
  const to = new Date()
  return `from=${new Date(to.getTime() - 86_400_000).toISOString()}&to=${to.toISOString()}`
}

interface Case {
  /** As the OpenAPI document names it. */
  operation: string
  ask: (person: Asking, place: Place) => PromiseLike<{ status: number }>
  /** Who is answered with success; the other insiders with 403. */
  may: readonly Insider[]
  /** What success is, where it is not 200; 409 and 422 count where the state of the place, not the right, says no. */
  success?: readonly number[]
}

const ALL = INSIDERS
const READING: Case[] = [
  { operation: 'get /api/vessels/{id}', ask: (p, b) => p.get(`/api/vessels/${b.vesselId}`), may: ALL },
  {
    operation: 'get /api/systems/{id}/settings',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/settings`),
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/summary',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/summary`),
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/runs',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/runs`),
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/holds',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/holds`),
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/outlook',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/outlook`),
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/trend',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/trend`),
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/comparison',
    ask: (p, b) => {
      const at = (days: number) => new Date(Date.now() - days * 86_400_000).toISOString()
      return p.get(`/api/systems/${b.systemId}/comparison?before=${at(2)}/${at(1)}&after=${at(1)}/${at(0)}`)
    },
    may: ALL,
  },
  {
    operation: 'get /api/systems/{id}/trace',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/trace?${span()}`),
    may: ['owner', 'technician', 'manager'],
  },
  {
    operation: 'get /api/systems/{id}/suspects',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/suspects`),
    may: ['owner', 'technician', 'manager'],
  },
  {
    operation: 'get /api/systems/{id}/cup-tests',
    ask: (p, b) => p.get(`/api/systems/${b.systemId}/cup-tests`),
    may: ['owner', 'technician', 'manager'],
  },
  { operation: 'get /api/notices/{id}', ask: (p, b) => p.get(`/api/notices/${b.noticeId}`), may: ALL },
  { operation: 'get /api/visits/{id}', ask: (p, b) => p.get(`/api/visits/${b.visitId}`), may: ALL },
]

const WRITING: Case[] = [
  {
    operation: 'post /api/systems/{id}/cup-tests',
    ask: (p, b) => p.post(`/api/systems/${b.systemId}/cup-tests`, { name: 'Aft head' }),
    may: ['owner', 'technician', 'manager'],
    // One at a time: the first bowl is wet when the next is asked for.
    success: [201, 409],
  },
  {
    operation: 'delete /api/systems/{id}/cup-tests/{testId}',
    ask: async (p, b) => {
      const list = await people.owner.get(`/api/systems/${b.systemId}/cup-tests`)
      const [newest] = (list.body as { items: { id: string }[] }).items
      return p.delete(`/api/systems/${b.systemId}/cup-tests/${newest?.id ?? 1}`)
    },
    may: ['owner', 'technician', 'manager'],
    // The owner takes it back; for the others there is none left.
    success: [200, 404],
  },
  {
    operation: 'patch /api/vessels/{id}',
    ask: (p, b) => p.patch(`/api/vessels/${b.vesselId}`, { quietHours: { start: '21:30', end: '06:30' } }),
    may: ['owner'],
  },
  {
    operation: 'put /api/vessels/{id}/aboard',
    ask: (p, b) => p.put(`/api/vessels/${b.vesselId}/aboard`, { value: null }),
    may: ['owner', 'technician', 'manager'],
  },
  {
    operation: 'put /api/vessels/{id}/access/{shopId}',
    ask: (p, b) => p.put(`/api/vessels/${b.vesselId}/access/${shopId}`, { level: 'full' }),
    may: ['owner'],
  },
  {
    operation: 'delete /api/vessels/{id}/access/{shopId}',
    ask: async (p, b) => {
      await setConsent(b, 'full')
      return p.delete(`/api/vessels/${b.vesselId}/access/${shopId}`)
    },
    may: ['owner'],
  },
  {
    operation: 'post /api/vessels/{id}/systems',
    ask: (p, b) => p.post(`/api/vessels/${b.vesselId}/systems`, { name: randomUUID() }),
    may: ALL,
    success: [201],
  },
  {
    operation: 'put /api/systems/{id}/settings',
    ask: (p, b) => p.put(`/api/systems/${b.systemId}/settings`, { pumpAmps: 6 }),
    may: ALL,
  },
  {
    operation: 'put /api/systems/{id}/parts',
    ask: (p, b) =>
      p.put(`/api/systems/${b.systemId}/parts`, { parts: [{ key: 'tank', kind: 'tank', name: 'Tank' }] }),
    may: ALL,
  },
  {
    operation: 'put /api/systems/{id}/statement',
    ask: (p, b) => p.put(`/api/systems/${b.systemId}/statement`, { value: null }),
    may: ALL,
  },
  {
    operation: 'put /api/statements',
    ask: (p, b) => p.put('/api/statements', { systems: [b.systemId], value: null }),
    may: ALL,
  },
  {
    operation: 'post /api/notices/{id}/acknowledge',
    ask: (p, b) => p.post(`/api/notices/${b.noticeId}/acknowledge`, { note: 'seen' }),
    may: ['owner', 'technician', 'manager'],
  },
  {
    operation: 'patch /api/notices/{id}',
    ask: (p, b) => p.patch(`/api/notices/${b.noticeId}`, { snoozedUntil: null }),
    may: ['owner', 'technician', 'manager'],
  },
  {
    operation: 'post /api/vessels/{id}/visits',
    ask: (p, b) => p.post(`/api/vessels/${b.vesselId}/visits`, { complaint: 'again' }),
    may: ['owner', 'technician', 'manager'],
    success: [201],
  },
  {
    operation: 'patch /api/visits/{id}',
    ask: (p, b) => p.patch(`/api/visits/${b.visitId}`, { complaint: 'runs at night' }),
    may: ['technician', 'manager'],
  },
  {
    operation: 'patch /api/visits/{id}',
    ask: async (p, b) => {
      const me = await people.technician.get('/api/me')
      const assignedTo = (me.body as { person: { id: string } }).person.id
      return p.patch(`/api/visits/${b.visitId}`, { assignedTo })
    },
    // A technician takes the visit for themselves; giving it to somebody is the manager's.
    may: ['technician', 'manager'],
  },
  {
    operation: 'post /api/visits/{id}/gauge-tests',
    ask: (p, b) =>
      p.post(`/api/visits/${b.visitId}/gauge-tests`, {
        id: randomUUID(),
        startedAt: '2026-11-01T10:00:00Z',
        endedAt: '2026-11-01T10:30:00Z',
        partKeys: ['tank'],
        startPa: 33_000,
        endPa: 32_000,
      }),
    may: ['technician', 'manager'],
    // The boat has by now several systems, and the visit says of which it is not.
    success: [200, 422],
  },
  {
    operation: 'post /api/visits/{id}/entries',
    ask: (p, b) =>
      p.post(`/api/visits/${b.visitId}/entries`, {
        id: randomUUID(),
        at: '2026-11-01T10:00:00Z',
        kind: 'water-off',
        body: {},
      }),
    may: ['technician', 'manager'],
  },
  {
    operation: 'post /api/visits/{id}/part-changes',
    ask: (p, b) =>
      p.post(`/api/visits/${b.visitId}/part-changes`, {
        id: randomUUID(),
        at: '2026-11-01T10:00:00Z',
        partKey: 'tank',
        action: 'tightened',
      }),
    may: ['technician', 'manager'],
  },
  {
    operation: 'post /api/loggers/{id}/calibrations',
    ask: (p, b) => p.post(`/api/loggers/${b.loggerId}/calibrations`, { vacuumOffsetPa: 0 }),
    may: ALL,
  },
  {
    operation: 'post /api/loggers/{id}/watch',
    ask: (p, b) => p.post(`/api/loggers/${b.loggerId}/watch`, {}),
    may: ['owner', 'technician', 'manager'],
  },
  {
    operation: 'post /api/loggers/{id}/key',
    ask: (p, b) => p.post(`/api/loggers/${b.loggerId}/key`),
    may: ['owner', 'installer', 'manager'],
  },
  {
    operation: 'post /api/systems/{id}/loggers',
    ask: (p, b) =>
      p.post(`/api/systems/${b.systemId}/loggers`, {
        serial: `A-${randomUUID()}`,
        intervalSeconds: 60,
        channels: ['pump'],
      }),
    may: ['owner', 'installer', 'manager'],
    success: [201],
  },
]

describe('the matrix', () => {
  it('has a row for every address of the document', () => {
    const missing = OPERATIONS.filter(
      ({ method, path: address }) => !(`${method.toUpperCase()} ${address}` in HANDLERS),
    )
    expect(missing.map(({ method, path: address }) => `${method} ${address}`)).toEqual([])
  })

  it('lets nobody in who is not signed in, and no stranger near what is not theirs, at any address', async () => {
    const addressOf = (template: string): string =>
      template
        .replace('/systems/{id}', `/systems/${full.systemId}`)
        .replace('/vessels/{id}', `/vessels/${full.vesselId}`)
        .replace('/loggers/{id}', `/loggers/${full.loggerId}`)
        .replace('/notices/{id}', `/notices/${full.noticeId}`)
        .replace('/visits/{id}', `/visits/${full.visitId}`)
        .replace('/shops/{id}', `/shops/${shopId}`)
        .replace(/\{\w+\}/g, '1')
    const signedIn = OPERATIONS.filter((operation) => operation.access === 'signed-in')
    for (const { method, path: template } of signedIn) {
      const { status } = await people.nobody[method](addressOf(template))
      expect(status, `nobody: ${method} ${template}`).toBe(401)
      if (!/\/(systems|vessels|loggers|notices|visits|shops)\/\{id\}/.test(template)) continue
      // An empty body or query may be refused for itself, before anything is looked for.
      const strange = await people.strangeManager[method](addressOf(template))
      expect([404, 400, 422], `stranger: ${method} ${template}`).toContain(strange.status)
    }
  })

  for (const line of [...READING, ...WRITING]) {
    it(line.operation, async () => {
      for (const name of INSIDERS) {
        const { status } = await line.ask(people[name], full)
        const expected = line.may.includes(name) ? (line.success ?? [200]) : [403]
        expect(expected, `${name} was answered ${status}`).toContain(status)
      }
      for (const name of STRANGERS) expect((await line.ask(people[name], full)).status, name).toBe(404)
      expect((await line.ask(people.nobody, full)).status).toBe(401)
    })
  }

  it('delete /api/loggers/{id}', async () => {
    for (const name of [...STRANGERS, 'technician'] as Account[]) {
      const boat = await newBoat(people)
      const { status } = await people[name].delete(`/api/loggers/${boat.loggerId}`)
      expect(status, name).toBe(name === 'technician' ? 403 : 404)
    }
    for (const name of ['owner', 'installer', 'manager'] as Account[]) {
      const boat = await newBoat(people)
      await people[name].delete(`/api/loggers/${boat.loggerId}`).expect(200)
    }
    await people.nobody.delete(`/api/loggers/${full.loggerId}`).expect(401)
  })
})

describe('lists', () => {
  it('hold only what the asker sees', async () => {
    const lists: [string, (item: { vesselId?: string; id?: string }) => boolean][] = [
      ['/api/vessels?limit=5000', (item) => item.vesselId === full.vesselId],
      ['/api/notices?limit=5000', (item) => item.id === full.noticeId],
      ['/api/visits?limit=5000', (item) => item.id === full.visitId],
      ['/api/loggers?limit=5000', (item) => item.id === full.loggerId],
    ]
    for (const [path, isIt] of lists) {
      const has = async (person: Asking) => {
        const answer = await person.get(path).expect(200)
        return (answer.body as { items: { vesselId?: string; id?: string }[] }).items.some(isIt)
      }
      for (const name of INSIDERS) expect(await has(people[name]), `${name} ${path}`).toBe(true)
      for (const name of STRANGERS) expect(await has(people[name]), `${name} ${path}`).toBe(false)
      await people.nobody.get(path).expect(401)
    }
  })

  it('of nights leave out systems that the asker does not see', async () => {
    const path = `/api/nights?systems=${full.systemId},${figures.systemId}&nights=2`
    expect((await people.owner.get(path).expect(200)).body).toMatchObject({
      items: [{ systemId: full.systemId }, { systemId: figures.systemId }],
    })
    expect((await people.strangeOwner.get(path).expect(200)).body).toEqual({ items: [] })
    await people.nobody.get(path).expect(401)
  })

  it('of messages are for managers, and of their own shop', async () => {
    const log = await people.manager.get('/api/messages?limit=5000').expect(200)
    const told = (log.body as { items: { noticeIds: string[] }[] }).items
    expect(told.some((message) => message.noticeIds.includes(full.noticeId))).toBe(true)
    const strange = await people.strangeManager.get('/api/messages?limit=5000').expect(200)
    const theirs = (strange.body as { items: { noticeIds: string[] }[] }).items
    expect(theirs.some((message) => message.noticeIds.includes(full.noticeId))).toBe(false)
    for (const name of ['owner', 'technician', 'installer'] as const)
      await people[name].get('/api/messages').expect(403)
    await people.nobody.get('/api/messages').expect(401)
  })
})

describe('consent in two steps', () => {
  const trace = (person: Asking, boat: Boat) => person.get(`/api/systems/${boat.systemId}/trace?${span()}`)
  const listed = async (person: Asking, boat: Boat, what: 'runs' | 'holds') =>
    (await person.get(`/api/systems/${boat.systemId}/${what}?limit=5000`).expect(200)).body.items as {
      trigger?: string
      flushes?: number
    }[]

  it('shows the shop leak figures alone at the first', async () => {
    for (const name of ['technician', 'manager', 'installer'] as const) {
      await trace(people[name], figures).expect(403)
      const runs = await listed(people[name], figures, 'runs')
      expect(runs.length).toBeGreaterThan(0)
      expect(runs.some((run) => run.trigger === 'flush')).toBe(false)
      const holds = await listed(people[name], figures, 'holds')
      expect(holds.some((hold) => (hold.flushes ?? 0) > 0)).toBe(false)
      const summary = await people[name].get(`/api/systems/${figures.systemId}/summary`).expect(200)
      expect(summary.body).toMatchObject({ aboard: 'unknown', current: null })
      const nights = await people[name].get(`/api/nights?systems=${figures.systemId}&nights=3`).expect(200)
      const strips = (nights.body as { items: { nights: { flushes: number[] }[] }[] }).items[0]?.nights ?? []
      expect(strips.flatMap((night) => night.flushes)).toEqual([])
      expect((await people[name].get(`/api/vessels/${figures.vesselId}`)).body.rights.fullRecord).toBe(false)
      await people[name].put(`/api/vessels/${figures.vesselId}/aboard`, { value: true }).expect(403)
    }
  })

  it('shows the owner everything, and the shop too at the second', async () => {
    for (const [name, boat] of [
      ['owner', figures],
      ['technician', full],
      ['manager', full],
    ] as const) {
      await trace(people[name], boat).expect(200)
      expect((await listed(people[name], boat, 'runs')).some((run) => run.trigger === 'flush')).toBe(true)
      const summary = await people[name].get(`/api/systems/${boat.systemId}/summary`).expect(200)
      expect(summary.body.current).not.toBeNull()
    }
  })

  it('opens the full record for as long as a visit is under way', async () => {
    const boat = await newPlace('figures')
    await trace(people.technician, boat).expect(403)
    await people.technician.patch(`/api/visits/${boat.visitId}`, { status: 'under-way' }).expect(200)
    await trace(people.technician, boat).expect(200)
    await trace(people.installer, boat).expect(403)
    await people.technician.patch(`/api/visits/${boat.visitId}`, { status: 'proving' }).expect(200)
    await trace(people.technician, boat).expect(200)
    await people.technician.patch(`/api/visits/${boat.visitId}`, { status: 'closed' }).expect(200)
    await trace(people.technician, boat).expect(403)
  })

  it('opens it for the installer while fitting', async () => {
    const boat = await newBoat(people)
    await trace(people.installer, boat).expect(403)
    await people.installer
      .post(`/api/systems/${boat.systemId}/loggers`, {
        serial: `F-${randomUUID()}`,
        intervalSeconds: 60,
        channels: ['pump', 'vacuum'],
      })
      .expect(201)
    await trace(people.installer, boat).expect(200)
  })

  it('ends at once when withdrawn, but for the visits that the shop did', async () => {
    const boat = await newPlace('full')
    await people.owner.delete(`/api/vessels/${boat.vesselId}/access/${shopId}`).expect(200)
    for (const name of ['technician', 'installer', 'manager'] as const) {
      await people[name].get(`/api/vessels/${boat.vesselId}`).expect(404)
      await people[name].get(`/api/systems/${boat.systemId}/summary`).expect(404)
      await trace(people[name], boat).expect(404)
      await people[name].get(`/api/notices/${boat.noticeId}`).expect(404)
      const visit = await people[name].get(`/api/visits/${boat.visitId}`).expect(200)
      expect(visit.body.vesselName).toMatch(/^Boat /)
    }
    await people.owner.get(`/api/vessels/${boat.vesselId}`).expect(200)
  })

  it('lets in the second shop and nobody else when it is given to it', async () => {
    const boat = await newBoat(people)
    await people.strangeManager.get(`/api/vessels/${boat.vesselId}`).expect(404)
    await people.owner
      .put(`/api/vessels/${boat.vesselId}/access/${strangeShopId}`, { level: 'figures' })
      .expect(200)
    await people.strangeManager.get(`/api/vessels/${boat.vesselId}`).expect(200)
    await people.strangeOwner.get(`/api/vessels/${boat.vesselId}`).expect(404)
    await people.owner.put(`/api/vessels/${boat.vesselId}/access/999999`, { level: 'full' }).expect(404)
  })
})

describe('a visit', () => {
  it('is given to somebody by the manager alone, and to nobody outside the shop', async () => {
    const { visitId } = full
    const idOf = async (person: Asking) =>
      ((await person.get('/api/me')).body as { person: { id: string } }).person.id
    const manager = await idOf(people.manager)
    await people.technician.patch(`/api/visits/${visitId}`, { assignedTo: manager }).expect(403)
    await people.manager.patch(`/api/visits/${visitId}`, { assignedTo: manager }).expect(200)
    const stranger = await idOf(people.strangeManager)
    await people.manager.patch(`/api/visits/${visitId}`, { assignedTo: stranger }).expect(422)
  })
})
