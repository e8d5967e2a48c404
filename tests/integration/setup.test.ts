import { randomUUID } from 'node:crypto'
import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { serverUrl } from '../support/client'
import { ACCOUNTS, CUT_IN_PA, CUT_OUT_PA, everybody, newBoat, shopOf, type People } from './api-boats'

let people: People
beforeAll(async () => {
  people = await everybody()
})

const vessel = (over: object = {}) => ({ name: 'Salt Thistle', timeZone: 'Pacific/Auckland', ...over })
const idsOf = (body: unknown) => body as { id: string; systems: { id: string }[] }

describe('a new vessel', () => {
  it('belongs to the owner named, who lets the creating shop see all of it', async () => {
    const made = await people.manager.post('/api/vessels', vessel({ ownerEmail: ACCOUNTS.owner })).expect(201)
    const { id } = idsOf(made.body)
    const seen = await people.owner.get(`/api/vessels/${id}`).expect(200)
    expect(seen.body).toMatchObject({
      name: 'Salt Thistle',
      timeZone: 'Pacific/Auckland',
      quietHours: { start: '22:00', end: '07:00' },
      owner: { email: ACCOUNTS.owner },
      keptBy: null,
      access: [{ level: 'full' }],
      rights: { giveAccess: true },
    })
    expect([43_200, 46_800]).toContain(seen.body.utcOffsetSeconds)
  })

  it('is kept by the creating shop while nobody owns it', async () => {
    for (const over of [{}, { ownerEmail: `${randomUUID()}@future.example` }]) {
      const made = await people.installer.post('/api/vessels', vessel(over)).expect(201)
      const { id } = idsOf(made.body)
      const seen = await people.manager.get(`/api/vessels/${id}`).expect(200)
      expect(seen.body).toMatchObject({ owner: null, keptBy: { name: expect.any(String) } })
      expect(seen.body.rights).toMatchObject({ fullRecord: true, changeVessel: true, giveAccess: false })
      await people.owner.get(`/api/vessels/${id}`).expect(404)
      await people.strangeManager.get(`/api/vessels/${id}`).expect(404)
    }
  })

  it('is its creator’s where no shop is about', async () => {
    const made = await people.owner.post('/api/vessels', vessel()).expect(201)
    const { id } = idsOf(made.body)
    const seen = await people.owner.get(`/api/vessels/${id}`).expect(200)
    expect(seen.body).toMatchObject({ owner: { email: ACCOUNTS.owner }, access: [], keptBy: null })
    await people.manager.get(`/api/vessels/${id}`).expect(404)
  })

  it('has one system with the figures given, and the usual ones for the rest', async () => {
    const system = {
      name: 'Aft',
      kind: 'collecting',
      cutOutPa: CUT_OUT_PA,
      cutInPa: CUT_IN_PA,
      pumpAmps: 6.5,
      parts: [
        { key: 'tank', kind: 'tank', name: 'Tank', volumeM3: 0.04 },
        { key: 'owner', kind: 'head', name: 'Owner’s head', parent: 'tank' },
      ],
    }
    const made = await people.owner.post('/api/vessels', vessel({ system, berth: 'B 12' })).expect(201)
    const { id, systems } = idsOf(made.body)
    expect(systems).toHaveLength(1)
    const seen = await people.owner.get(`/api/vessels/${id}`).expect(200)
    expect(seen.body).toMatchObject({ berth: 'B 12' })
    expect(seen.body.systems[0]).toMatchObject({
      id: systems[0]?.id,
      name: 'Aft',
      state: 'unheard',
      settings: {
        kind: 'collecting',
        cutOutPa: CUT_OUT_PA,
        cutInPa: CUT_IN_PA,
        limitSeconds: 10_800,
        aimSeconds: 28_800,
        silenceSeconds: 21_600,
        pumpAmps: 6.5,
      },
      parts: [
        { key: 'tank', kind: 'tank', volumeM3: 0.04, parent: null },
        { key: 'owner', kind: 'head', volumeM3: null, parent: 'tank' },
      ],
      logger: null,
    })
  })

  it('is refused in a zone that there is not, for a shop one is not in, and for somebody else without a shop', async () => {
    await people.owner.post('/api/vessels', vessel({ timeZone: 'Pacific/Averill' })).expect(422)
    const strange = await shopOf(people.strangeManager)
    await people.manager.post('/api/vessels', vessel({ shopId: strange })).expect(404)
    await people.owner.post('/api/vessels', vessel({ ownerEmail: ACCOUNTS.strangeOwner })).expect(422)
    await people.nobody.post('/api/vessels', vessel()).expect(401)
  })
})

describe('figures of a system', () => {
  it('change from a moment on, and what is not named stays', async () => {
    const { systemId } = await newBoat(people)
    const path = `/api/systems/${systemId}/settings`
    const changed = await people.technician.put(path, { limitSeconds: 7200, pumpAmps: 8 }).expect(200)
    expect(changed.body).toMatchObject({
      limitSeconds: 7200,
      pumpAmps: 8,
      cutOutPa: CUT_OUT_PA,
      aimSeconds: 28_800,
    })
    expect((await people.owner.get(path).expect(200)).body).toEqual(changed.body)
  })

  it('may not contradict each other, nor lie ahead', async () => {
    const { systemId } = await newBoat(people)
    const path = `/api/systems/${systemId}/settings`
    await people.owner.put(path, { cutInPa: CUT_OUT_PA + 1 }).expect(422)
    await people.owner.put(path, { limitSeconds: 40_000 }).expect(422)
    await people.owner.put(path, { pumpAmps: 5, inForceFrom: '2199-01-01T00:00:00Z' }).expect(422)
  })
})

describe('what people say', () => {
  it('of a system holds until it ends or is taken back', async () => {
    const { vesselId, systemId } = await newBoat(people)
    const statement = async () =>
      (await people.owner.get(`/api/vessels/${vesselId}`).expect(200)).body.systems[0].statement as unknown
    const until = new Date(Date.now() + 86_400_000).toISOString()
    await people.manager.put(`/api/systems/${systemId}/statement`, { value: 'laid-up', until }).expect(200)
    expect(await statement()).toMatchObject({ value: 'laid-up', until })
    await people.technician.put(`/api/systems/${systemId}/statement`, { value: 'worked-on' }).expect(200)
    expect(await statement()).toMatchObject({ value: 'worked-on', until: null })
    await people.owner.put(`/api/systems/${systemId}/statement`, { value: null }).expect(200)
    expect(await statement()).toBeNull()
    await people.owner.put(`/api/systems/${systemId}/statement`, { value: 'sunk' }).expect(422)
  })

  it('of many systems is said of all or of none', async () => {
    const [mine, other] = [await newBoat(people), await newBoat(people)]
    const strange = idsOf((await people.strangeOwner.post('/api/vessels', vessel()).expect(201)).body)
    const systems = [mine.systemId, other.systemId, strange.systems[0]?.id]
    await people.manager.put('/api/statements', { systems, value: 'laid-up' }).expect(404)
    const before = await people.owner.get(`/api/vessels/${mine.vesselId}`)
    expect(before.body.systems[0].statement).toBeNull()
    await people.manager
      .put('/api/statements', { systems: systems.slice(0, 2), value: 'laid-up' })
      .expect(200)
    for (const { vesselId } of [mine, other])
      expect((await people.owner.get(`/api/vessels/${vesselId}`)).body.systems[0].statement).toMatchObject({
        value: 'laid-up',
      })
  })

  it('of people aboard is true, false, or nothing', async () => {
    const { vesselId } = await newBoat(people)
    const aboard = async () =>
      (await people.owner.get(`/api/vessels/${vesselId}`).expect(200)).body.aboard as unknown
    await people.owner.put(`/api/vessels/${vesselId}/aboard`, { value: false }).expect(200)
    expect(await aboard()).toEqual({ value: 'away', until: null })
    await people.owner.put(`/api/vessels/${vesselId}/aboard`, { value: true }).expect(200)
    expect(await aboard()).toEqual({ value: 'aboard', until: null })
    await people.owner.put(`/api/vessels/${vesselId}/aboard`, { value: null }).expect(200)
    expect(await aboard()).toBeNull()
  })
})

const oneSample = (at = Date.now()) => `time,vacuum_pa,pump\r\n${new Date(at).toISOString()},30000,0\r\n`
const send = (key: string, body = oneSample()) =>
  request(serverUrl())
    .post('/api/ingest')
    .set('authorization', `Bearer ${key}`)
    .set('content-type', 'text/csv')
    .send(body)

describe('a logger', () => {
  const registration = () => ({
    serial: `S-${randomUUID()}`,
    intervalSeconds: 60,
    channels: ['pump', 'vacuum'],
  })

  it('shows its key once, and sends with it what it measured before it was registered too', async () => {
    const boat = await newBoat(people)
    expect((await send(boat.key, oneSample(Date.now() - 30 * 86_400_000))).status).toBe(200)
    const seen = await people.owner.get(`/api/loggers?system=${boat.systemId}`).expect(200)
    expect(JSON.stringify(seen.body)).not.toContain(boat.key)
    expect(seen.body.items).toMatchObject([
      { id: boat.loggerId, serial: boat.serial, fitted: { systemId: boat.systemId } },
    ])
  })

  it('gets a new key, and the old one is void at once', async () => {
    const boat = await newBoat(people)
    const rolled = await people.installer.post(`/api/loggers/${boat.loggerId}/key`).expect(200)
    const { key } = rolled.body as { key: string }
    expect((await send(boat.key)).status).toBe(401)
    expect((await send(key)).status).toBe(200)
  })

  it('is told that it is retired', async () => {
    const boat = await newBoat(people)
    expect((await send(boat.key)).status).toBe(200)
    await people.owner.delete(`/api/loggers/${boat.loggerId}`).expect(200)
    expect((await send(boat.key)).status).toBe(403)
    const seen = await people.owner.get(`/api/vessels/${boat.vesselId}`).expect(200)
    expect(seen.body.systems[0].logger).toBeNull()
    await people.manager.post(`/api/loggers/${boat.loggerId}/key`).expect(409)
  })

  it('is moved with its serial, and takes the place of the one that was there', async () => {
    const [from, to] = [await newBoat(people), await newBoat(people)]
    const path = `/api/systems/${to.systemId}/loggers`
    const moved = await people.installer.post(path, { ...registration(), serial: from.serial }).expect(201)
    expect(moved.body.id).toBe(from.loggerId)
    const at = async (boat: typeof from) =>
      (await people.owner.get(`/api/vessels/${boat.vesselId}`)).body.systems[0].logger as {
        serial: string
      } | null
    expect(await at(from)).toBeNull()
    expect((await at(to))?.serial).toBe(from.serial)
  })

  it('stays where it is when somebody else claims its serial', async () => {
    const boat = await newBoat(people)
    const own = idsOf((await people.strangeOwner.post('/api/vessels', vessel()).expect(201)).body)
    const path = `/api/systems/${own.systems[0]?.id}/loggers`
    await people.strangeOwner.post(path, { ...registration(), serial: boat.serial }).expect(409)
    expect((await send(boat.key)).status).toBe(200)
  })

  it('is registered with channels and a rhythm that make sense', async () => {
    const { systemId } = await newBoat(people)
    const path = `/api/systems/${systemId}/loggers`
    await people.owner.post(path, { ...registration(), channels: ['air'] }).expect(422)
    await people.owner.post(path, { ...registration(), channels: ['pump', 'sonar'] }).expect(422)
    await people.owner.post(path, { ...registration(), intervalSeconds: 0 }).expect(422)
    await people.owner.post(path, { ...registration(), serial: 'a b' }).expect(422)
  })

  it('is asked for a finer rhythm while somebody watches', async () => {
    const boat = await newBoat(people)
    const watched = await people.technician
      .post(`/api/loggers/${boat.loggerId}/watch`, { intervalSeconds: 2, minutes: 10 })
      .expect(200)
    expect(watched.body.intervalSeconds).toBe(2)
    const answer = await send(boat.key).expect(200)
    expect(answer.body.next).toEqual({ intervalSeconds: 2, until: watched.body.until })
  })
})

describe('claiming a logger (RFC 8628)', () => {
  const form = (path: string, fields: object) => request(serverUrl()).post(path).type('form').send(fields)
  const GRANT_TYPE = 'urn:ietf:params:oauth:grant-type:device_code'
  const begin = async (serial = `C-${randomUUID()}`) => {
    const answer = await form('/api/device_authorization', { client_id: serial }).expect(200)
    return { serial, ...(answer.body as { device_code: string; user_code: string }), answer }
  }
  const poll = (serial: string, deviceCode: string) =>
    form('/api/token', { grant_type: GRANT_TYPE, device_code: deviceCode, client_id: serial })

  it('goes from the code shown to a key that works, without anybody carrying it', async () => {
    const { systemId } = await newBoat(people)
    const { serial, device_code, user_code, answer } = await begin()
    expect(answer.headers['cache-control']).toBe('no-store')
    expect(answer.body).toMatchObject({
      verification_uri: expect.stringMatching(/^http/),
      verification_uri_complete: expect.stringContaining(user_code),
      expires_in: expect.any(Number),
      interval: 5,
    })
    const pending = await poll(serial, device_code).expect(400)
    expect(pending.body.error).toBe('authorization_pending')
    expect((await poll(serial, device_code).expect(400)).body.error).toBe('slow_down')

    const typed = user_code.toLowerCase().replace('-', ' ')
    const seen = await people.installer.get(`/api/claims/${encodeURIComponent(typed)}`).expect(200)
    expect(seen.body).toMatchObject({ userCode: user_code, serial })
    const approval = { answer: 'approve', systemId, intervalSeconds: 30, channels: ['pump'] }
    await people.technician.post(`/api/claims/${user_code}`, approval).expect(403)
    await people.strangeManager.post(`/api/claims/${user_code}`, approval).expect(404)
    await people.installer.post(`/api/claims/${user_code}`, approval).expect(200)
    await people.installer.post(`/api/claims/${user_code}`, approval).expect(409)

    // In the future of the poll before, as far as the server can tell.
    const later = { 'x-now': new Date(Date.now() + 60_000).toISOString() }
    const granted = await poll(serial, device_code).set(later).expect(200)
    expect(granted.body).toEqual({ access_token: expect.any(String), token_type: 'Bearer' })
    const { access_token: key } = granted.body as { access_token: string }
    expect((await send(key)).status).toBe(200)
  })

  it('may be refused', async () => {
    const { serial, device_code, user_code } = await begin()
    await people.installer.post(`/api/claims/${user_code}`, { answer: 'deny' }).expect(200)
    expect((await poll(serial, device_code).expect(400)).body.error).toBe('access_denied')
  })

  it('ends when its time is over', async () => {
    const { serial, device_code, user_code } = await begin()
    const later = { 'x-now': new Date(Date.now() + 3_600_000).toISOString() }
    expect((await poll(serial, device_code).set(later).expect(400)).body.error).toBe('expired_token')
    await people.installer.get(`/api/claims/${user_code}`).set(later).expect(404)
  })

  it('refuses in the words of RFC 6749', async () => {
    const { serial, device_code } = await begin()
    const errorOf = async (fields: object) => {
      const answer = await form('/api/token', fields)
      expect(answer.headers['content-type']).toContain('application/json')
      return [answer.status, answer.body.error]
    }
    const whole = { grant_type: GRANT_TYPE, device_code, client_id: serial }
    expect(await errorOf({})).toEqual([400, 'invalid_request'])
    expect(await errorOf({ ...whole, grant_type: 'password' })).toEqual([400, 'unsupported_grant_type'])
    expect(await errorOf({ ...whole, device_code: 'made-up' })).toEqual([400, 'invalid_grant'])
    expect(await errorOf({ ...whole, client_id: 'another' })).toEqual([400, 'invalid_grant'])
    const json = await request(serverUrl()).post('/api/token').send(whole).expect(400)
    expect(json.body.error).toBe('invalid_request')
    expect((await form('/api/device_authorization', {}).expect(400)).body.error).toBe('invalid_request')
    expect((await form('/api/device_authorization', { client_id: 'a b' }).expect(401)).body.error).toBe(
      'invalid_client',
    )
  })
})
