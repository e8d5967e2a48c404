import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import type { Person } from '../support/access/actors'
import { askingServer, type Answered, type Asker } from '../support/access/ask'
import type { Method } from '../support/access/discover'
import { makeWorld, type World } from '../support/access/world'
import { serverUrl } from '../support/client'
import { serverDatabase } from '../support/database'

/* Addresses of what is one's own, with the ids of somebody else's things slipped in elsewhere: query, body, serial. */

let database: Knex
let world: World
let ask: Asker
beforeAll(() => {
  database = serverDatabase()
  ask = askingServer(serverUrl())
})
afterAll(() => database.destroy())
beforeEach(async () => {
  world = await makeWorld(database)
})

const as = (person: Person, method: Method, path: string, body?: unknown): Promise<Answered> =>
  ask(method, { path, body }, world.people[person].cookie)

/** Every row that names the boat, one of its systems, loggers or visits. */
async function boatRows(): Promise<string[]> {
  const ids = {
    vessel_id: [world.vesselId],
    system_id: [world.systemId],
    logger_id: [world.loggerId, world.leftLoggerId],
    visit_id: [world.visitId, world.doneVisitId],
  }
  const columns = await database('information_schema.columns')
    .where({ table_schema: 'public' })
    .whereIn('column_name', Object.keys(ids))
    .select<{ table_name: string; column_name: keyof typeof ids }[]>('table_name', 'column_name')
  const rows: string[] = []
  for (const { table_name: table, column_name: column } of columns) {
    const found = await database(table)
      .whereIn(column, ids[column])
      .select<{ row: string }[]>(database.raw('??::text as row', [table]))
    rows.push(...found.map(({ row }) => `${table} ${row}`))
  }
  for (const table of ['vessel', 'logger'] as const) {
    const id = table === 'vessel' ? [world.vesselId] : [world.loggerId, world.leftLoggerId]
    const found = await database(table)
      .whereIn('id', id)
      .select<{ row: string }[]>(database.raw('??::text as row', [table]))
    rows.push(...found.map(({ row }) => `${table} ${row}`))
  }
  return [...new Set(rows)].sort()
}

/** Does it, expects one of the statuses, and that nothing of the boat is other than before. */
async function refused(answer: () => Promise<Answered>, statuses: readonly number[]): Promise<Answered> {
  const before = await boatRows()
  expect(before.length).toBeGreaterThan(20)
  const given = await answer()
  expect(statuses, given.text.slice(0, 200)).toContain(given.status)
  expect(await boatRows()).toEqual(before)
  expect(given.text).not.toContain(world.marker)
  return given
}

describe('lists', () => {
  it.each(['strangeOwner', 'strangeManager', 'lapsed'] as const)(
    'asked by %s for the boat by its id are empty',
    async (person) => {
      const { vesselId, systemId, strange } = world
      for (const path of [
        `/api/vessels?vessel=${vesselId}`,
        `/api/notices?vessel=${vesselId}`,
        `/api/notices?system=${systemId}`,
        `/api/visits?vessel=${vesselId}`,
        `/api/loggers?system=${systemId}`,
        `/api/nights?systems=${systemId}&nights=2`,
      ]) {
        const { status, text } = await as(person, 'GET', path)
        expect([path, status, (JSON.parse(text) as { items: unknown[] }).items]).toEqual([path, 200, []])
      }
      const both = await as(person, 'GET', `/api/nights?systems=${strange.systemId},${systemId}&nights=2`)
      expect(both.text).not.toContain(`"systemId":"${systemId}"`)
    },
  )

  it('asked for without an id leave the boat out', async () => {
    for (const person of ['strangeOwner', 'strangeManager', 'lapsed', 'withdrawn'] as const)
      for (const path of [
        'vessels',
        'notices',
        'loggers',
        'loggers/health',
        'commissionings',
        'messages',
        'me/export',
      ]) {
        const { text } = await as(person, 'GET', `/api/${path}`)
        expect(text, `${person} ${path}`).not.toContain(world.marker)
        expect(text, `${person} ${path}`).not.toContain(`"vesselId":"${world.vesselId}"`)
      }
  })

  it('of messages leave out what a colleague is told about a boat of their own', async () => {
    // The boat's owner also works for the strange shop, which sees nothing of the boat.
    await database('membership').insert({
      shop_id: world.strangeShopId,
      person_id: world.people.owner.id,
      role: 'technician',
    })
    const { status, text } = await as('strangeManager', 'GET', '/api/messages')
    expect(status).toBe(200)
    expect(text).not.toContain(world.marker)
    expect((await as('manager', 'GET', '/api/messages')).text).toContain(world.marker)
    expect((await as('strangeManager', 'POST', `/api/messages/${world.messageId}/resend`, {})).status).toBe(
      404,
    )
  })
})

describe('somebody else’s ids in one’s own requests', () => {
  it('a logger’s serial does not take it from its boat', async () => {
    const { strange, serial } = world
    await refused(
      () =>
        as('strangeManager', 'POST', `/api/systems/${strange.systemId}/loggers`, {
          serial,
          intervalSeconds: 60,
          channels: ['pump'],
        }),
      [409],
    )
    const begun = await as('strangeManager', 'POST', '/api/commissionings', {
      way: 'known',
      serial,
      systemId: strange.systemId,
    })
    const { id } = JSON.parse(begun.text) as { id: string }
    await refused(
      () => as('strangeManager', 'POST', `/api/commissionings/${id}/fitting`, {}),
      [403, 404, 409],
    )
  })

  it('nor does the shop that lost sight take its logger back from afar', async () => {
    const { text } = await as('strangeManager', 'GET', '/api/me')
    expect(text).not.toContain(world.marker)
    const [left] = await database('logger').where({ id: world.leftLoggerId }).pluck('serial')
    const own = await as('withdrawn', 'POST', '/api/vessels', {
      name: 'Of the shop',
      timeZone: 'Europe/London',
      shopId: world.withdrawnShopId,
    })
    const { systems } = JSON.parse(own.text) as { systems: { id: string }[] }
    await refused(
      () =>
        as('withdrawn', 'POST', `/api/systems/${systems[0]?.id ?? ''}/loggers`, {
          serial: String(left),
          intervalSeconds: 60,
          channels: ['pump'],
        }),
      [409],
    )
  })

  it('a system of another boat is not claimed, chosen, stated or visited', async () => {
    const { systemId, strange, visitId, userCode, strangeShopId, shopId } = world
    const begun = await as('strangeManager', 'POST', '/api/commissionings', {
      way: 'key',
      serial: `N-${randomUUID()}`,
    })
    const { id } = JSON.parse(begun.text) as { id: string }
    for (const [person, method, path, body, statuses] of [
      ['strangeManager', 'PATCH', `/api/commissionings/${id}`, { systemId }, [404]],
      ['strangeManager', 'POST', `/api/claims/${userCode}`, { answer: 'approve', systemId }, [404]],
      [
        'strangeOwner',
        'PUT',
        '/api/statements',
        { systems: [strange.systemId, systemId], value: 'off' },
        [404],
      ],
      ['strangeManager', 'PATCH', `/api/visits/${strange.visitId}`, { systemId }, [404]],
      [
        'strangeOwner',
        'POST',
        `/api/vessels/${strange.vesselId}/visits`,
        { systemId, shopId: strangeShopId },
        [404],
      ],
      ['strangeOwner', 'POST', `/api/vessels/${strange.vesselId}/visits`, { shopId }, [422]],
      [
        'strangeOwner',
        'GET',
        `/api/systems/${strange.systemId}/comparison?visit=${visitId}`,
        undefined,
        [404],
      ],
      ['strangeManager', 'POST', '/api/vessels', { name: 'x', timeZone: 'Europe/London', shopId }, [404]],
    ] as const)
      await refused(() => as(person, method, path, body), statuses)
    const said = await database('statement').where({ system_id: strange.systemId }).select('id')
    expect(said).toEqual([])
  })

  it('people of another shop get no role, no visit and no calls at night', async () => {
    const { strange, strangeShopId, people } = world
    for (const [method, path, body, statuses] of [
      ['PUT', `/api/shops/${strangeShopId}/people/${people.technician.id}`, { roles: ['manager'] }, [404]],
      ['PATCH', `/api/visits/${strange.visitId}`, { assignedTo: people.technician.id }, [422]],
      ['PATCH', `/api/shops/${strangeShopId}`, { onCallId: people.technician.id }, [404, 422]],
    ] as const)
      await refused(() => as('strangeManager', method, path, body), statuses)
    const [row] = await database('shop').where({ id: strangeShopId }).pluck('on_call_id')
    expect(row).toBeNull()
  })

  it('an entry’s id that another visit has used changes nothing there', async () => {
    const { strange } = world
    await database('membership').insert({
      shop_id: world.strangeShopId,
      person_id: world.people.strangeManager.id,
      role: 'technician',
    })
    const used = {
      entries: await database('visit_entry').where({ visit_id: world.visitId }).pluck('id'),
      changes: await database('part_change').where({ visit_id: world.visitId }).pluck('id'),
    }
    const before = await boatRows()
    const at = new Date().toISOString()
    await as('strangeManager', 'POST', `/api/visits/${strange.visitId}/entries`, {
      id: String(used.entries[0]),
      at,
      kind: 'note',
      body: { taken: 'over' },
    })
    await as('strangeManager', 'POST', `/api/visits/${strange.visitId}/part-changes`, {
      id: String(used.changes[0]),
      at,
      partKey: 'tank',
      action: 'replaced',
    })
    expect(await boatRows()).toEqual(before)
  })

  it('a link acts on what its message tells of, whatever system is named', async () => {
    const { linkCode, strange } = world
    for (const word of ['OFF', 'LAIDUP', 'VISIT', 'MUTE'] as const)
      await as('strangeOwner', 'POST', `/api/links/${linkCode}`, { word, systemId: strange.systemId })
    expect(await database('statement').where({ system_id: strange.systemId }).select('id')).toEqual([])
    expect(await database('visit').where({ vessel_id: strange.vesselId }).pluck('id')).toEqual([
      strange.visitId,
    ])
  })
})

describe('somebody with several hats', () => {
  it('has in each shop the roles held there alone', async () => {
    // Manager in one shop, technician in the boat's: what takes a manager there is refused.
    await database('membership').insert({
      shop_id: world.shopId,
      person_id: world.people.strangeManager.id,
      role: 'technician',
    })
    for (const [method, path, body] of [
      ['GET', `/api/shops/${world.shopId}/people`, undefined],
      ['PATCH', `/api/shops/${world.shopId}`, { name: 'Taken over' }],
      ['POST', '/api/invitations', { email: 'x@matrix.example', shopId: world.shopId, role: 'manager' }],
      ['DELETE', `/api/loggers/${world.loggerId}`, undefined],
      ['POST', `/api/loggers/${world.loggerId}/key`, {}],
      ['PATCH', `/api/visits/${world.visitId}`, { assignedTo: world.people.technician.id }],
      ['PATCH', `/api/vessels/${world.vesselId}`, { berth: 'x' }],
    ] as const)
      expect((await as('strangeManager', method, path, body)).status, `${method} ${path}`).toBe(403)
    expect((await as('strangeManager', 'GET', `/api/vessels/${world.vesselId}`)).status).toBe(200)
  })
})
