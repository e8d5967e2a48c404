import { randomUUID } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { lastMailTo, secretIn } from '../support/mailbox'
import {
  acceptAsNew,
  elsewhere,
  expectStatus,
  invited,
  join,
  newEmail,
  newShop,
  ownBoat,
  post,
  type Shop,
} from './joining-people'

interface Access {
  owners: { name: string }[]
  shops: { shopId: string; level: string; people: { name: string }[]; openVisits: { status: string }[] }[]
  ended: { level: string }[]
}

/** A boat that the shop set up and keeps until an owner accepts. */
async function keptBoat(shop: Shop, ownerEmail?: string): Promise<{ vesselId: string; systemId: string }> {
  const made = await expectStatus(
    shop.client.send<{ id: string; systems: { id: string }[] }>('POST', '/api/vessels', {
      name: `Kept ${randomUUID().slice(0, 8)}`,
      timeZone: 'Europe/Lisbon',
      ...(ownerEmail === undefined ? {} : { ownerEmail }),
    }),
    201,
  )
  return { vesselId: made.id, systemId: made.systems[0]?.id ?? '' }
}

const trace = (systemId: string): string => {
  const to = Date.now()
  return `/api/systems/${systemId}/trace?from=${new Date(to - 3_600_000).toISOString()}&to=${new Date(to).toISOString()}`
}

describe('a boat that a shop keeps', () => {
  it('goes over to the owner by the mail sent when it was set up; the shop then sees what the owner says', async () => {
    const shop = await newShop()
    const email = newEmail()
    const { vesselId, systemId } = await keptBoat(shop, email)
    const token = secretIn(await lastMailTo(email))
    expect(await expectStatus(post<object>('/api/invitations/look', { token }), 200)).toMatchObject({
      vesselName: expect.stringContaining('Kept'),
      keptBy: expect.stringContaining('Holm Sanitation'),
    })
    expect((await shop.client.get(trace(systemId))).status).toBe(200)
    const owner = await acceptAsNew(email, token)
    expect((await owner.client.get(`/api/vessels/${vesselId}`)).body).toMatchObject({
      keptBy: null,
      owner: { email },
      rights: { giveAccess: true },
    })
    // Leak figures, since nothing else was said.
    expect((await shop.client.get(`/api/vessels/${vesselId}`)).status).toBe(200)
    expect((await shop.client.get(trace(systemId))).status).toBe(403)
  })

  it('is hidden from the shop at once when the owner accepts and lets it see nothing', async () => {
    const shop = await newShop()
    const { vesselId } = await keptBoat(shop)
    const email = newEmail()
    const first = await invited(shop.client, email, { vesselId })
    const other = await invited(shop.client, newEmail(), { vesselId })
    await acceptAsNew(email, first.token, { keepShop: 'none' })
    expect((await shop.client.get(`/api/vessels/${vesselId}`)).status).toBe(404)
    // The shop no longer speaks for the boat: its other invitation has ended.
    expect((await post('/api/invitations/look', { token: other.token })).status).toBe(410)
    expect((await shop.client.send('DELETE', `/api/invitations/${other.id}`)).status).toBe(404)
  })

  it('is offered to an owner by managers and installers, not by technicians or strangers', async () => {
    const [shop, stranger] = [await newShop(), await newShop()]
    const { vesselId } = await keptBoat(shop)
    const statuses: Record<string, number> = {}
    for (const role of ['technician', 'installer']) {
      const email = newEmail()
      const { token } = await invited(shop.client, email, { shopId: shop.shopId, role })
      const { client } = await acceptAsNew(email, token)
      const body = { email: newEmail(), vesselId }
      statuses[role] = (await client.send('POST', '/api/invitations', body, elsewhere())).status
    }
    const asStranger = await stranger.client.send('POST', '/api/invitations', { email: newEmail(), vesselId })
    expect({ ...statuses, stranger: asStranger.status }).toEqual({
      technician: 403,
      installer: 201,
      stranger: 404,
    })
  })
})

describe('an owner’s consent', () => {
  it('is given, changed and withdrawn, and each counts from the next request on', async () => {
    const [owner, shop] = [await join(), await newShop()]
    const { vesselId, systemId } = await ownBoat(owner)
    const path = `/api/vessels/${vesselId}/access/${shop.shopId}`
    const boat = `/api/vessels/${vesselId}`
    expect((await shop.client.get(boat)).status).toBe(404)
    await expectStatus(owner.client.send('PUT', path, { level: 'figures' }), 200)
    expect((await shop.client.get(boat)).status).toBe(200)
    expect((await shop.client.get(trace(systemId))).status).toBe(403)
    await expectStatus(owner.client.send('PUT', path, { level: 'full' }), 200)
    expect((await shop.client.get(trace(systemId))).status).toBe(200)
    await expectStatus(owner.client.send('DELETE', path), 200)
    for (const hidden of [boat, trace(systemId), `/api/systems/${systemId}/summary`, `${boat}/access`])
      expect((await shop.client.get(hidden)).status, hidden).toBe(404)
    const fleet = await shop.client.get<{ items: { vesselId: string }[] }>('/api/vessels?limit=5000')
    expect(fleet.body.items.some((row) => row.vesselId === vesselId)).toBe(false)
  })

  it('is read by the owner: who sees the boat, and which visit opens the full record', async () => {
    const [owner, shop] = [await join(), await newShop()]
    const { vesselId, systemId } = await ownBoat(owner)
    await expectStatus(
      owner.client.send('PUT', `/api/vessels/${vesselId}/access/${shop.shopId}`, { level: 'figures' }),
      200,
    )
    const { id: visitId } = await expectStatus(
      owner.client.send<{ id: string }>('POST', `/api/vessels/${vesselId}/visits`, {
        complaint: 'runs at night',
        shopId: shop.shopId,
      }),
      201,
    )
    await expectStatus(shop.client.send('PATCH', `/api/visits/${visitId}`, { status: 'under-way' }), 200)
    expect((await shop.client.get(trace(systemId))).status).toBe(200)
    const access = await expectStatus(owner.client.get<Access>(`/api/vessels/${vesselId}/access`), 200)
    expect(access).toMatchObject({
      owners: [{ name: 'Wren Holm' }],
      shops: [
        {
          shopId: shop.shopId,
          level: 'figures',
          people: [{ name: 'Wren Holm', roles: ['manager'] }],
          openVisits: [{ id: visitId, status: 'under-way' }],
        },
      ],
      ended: [],
    })
    expect((await shop.client.get(`/api/vessels/${vesselId}/access`)).status).toBe(403)
    const stranger = await join()
    expect((await stranger.client.get(`/api/vessels/${vesselId}/access`)).status).toBe(404)
    expect((await stranger.client.get(`/api/vessels/${vesselId}/log`)).status).toBe(404)
  })

  it('leaves a readable trail: who was let in, who read, who changed', async () => {
    const [owner, shop] = [await join(), await newShop()]
    const { vesselId, systemId } = await ownBoat(owner)
    const path = `/api/vessels/${vesselId}/access/${shop.shopId}`
    await expectStatus(owner.client.send('PUT', path, { level: 'full' }), 200)
    for (let reads = 0; reads < 2; reads += 1) await expectStatus(shop.client.get(trace(systemId)), 200)
    await expectStatus(
      shop.client.send('POST', `/api/systems/${systemId}/loggers`, {
        serial: `L-${randomUUID()}`,
        intervalSeconds: 60,
        channels: ['pump'],
      }),
      201,
    )
    await expectStatus(owner.client.send('DELETE', path), 200)
    const log = await expectStatus(
      owner.client.get<{ items: { did: string }[] }>(`/api/vessels/${vesselId}/log`),
      200,
    )
    expect(log.items.map((entry) => entry.did)).toEqual([
      expect.stringMatching(/^withdrew the sight of Holm Sanitation/),
      'registered a logger and was shown its key',
      'read the full record',
      expect.stringMatching(/^let Holm Sanitation .* see the full record$/),
      'set the boat up',
    ])
    expect((await shop.client.get(`/api/vessels/${vesselId}/log`)).status).toBe(404)
    const shops = await shop.client.get<{ items: { did: string }[] }>(`/api/shops/${shop.shopId}/log`)
    // Out of sight, what happened on the boat is out of the shop's list too, but for what concerns the shop itself.
    expect(shops.body.items.map((entry) => entry.did)).not.toContain(
      'registered a logger and was shown its key',
    )
  })

  it('goes with the shop’s people: whoever leaves the shop sees nothing more', async () => {
    const [owner, shop] = [await join(), await newShop()]
    const { vesselId } = await ownBoat(owner)
    await expectStatus(
      owner.client.send('PUT', `/api/vessels/${vesselId}/access/${shop.shopId}`, { level: 'full' }),
      200,
    )
    const email = newEmail()
    const { token } = await invited(shop.client, email, { shopId: shop.shopId, role: 'technician' })
    const hand = await acceptAsNew(email, token)
    expect((await hand.client.get(`/api/vessels/${vesselId}`)).status).toBe(200)
    await expectStatus(hand.client.send('DELETE', `/api/me/shops/${shop.shopId}`), 200)
    expect((await hand.client.get(`/api/vessels/${vesselId}`)).status).toBe(404)
  })

  it('can be shared with a second owner, whom the first invites', async () => {
    const [owner, friend] = [await join(), await join()]
    const { vesselId } = await ownBoat(owner)
    const { token } = await invited(owner.client, friend.email, { vesselId })
    await expectStatus(friend.client.send('POST', '/api/invitations/accept', { token }), 200)
    expect((await friend.client.get(`/api/vessels/${vesselId}/access`)).body).toMatchObject({
      owners: [{ name: 'Wren Holm' }, { name: 'Wren Holm' }],
    })
  })
})
