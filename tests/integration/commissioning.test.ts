import { randomUUID } from 'node:crypto'
import type { Knex } from 'knex'
import { beforeAll, describe, expect, it } from 'vitest'
import type { CheckKind, Commissioning, Fitted, StepCheck } from '@/shared/schemas'
import { inHgToPa } from '@/shared/units'
import { nobody, signIn, type Client } from '../support/client'
import { serverDatabase } from '../support/database'
import { Device, type DeviceSample } from '../support/fitted-device'

const CUT_OUT_PA = inHgToPa(10)
const CUT_IN_PA = inHgToPa(8.2)

let installer: Client
let manager: Client
let technician: Client
let owner: Client
let stranger: Client
beforeAll(async () => {
  ;[installer, manager, technician, owner, stranger] = (await Promise.all(
    ['installer@saltern', 'manager@saltern', 'technician@saltern', 'owner@saltern', 'manager@stranger'].map(
      (name) => signIn(`${name}.example`),
    ),
  )) as [Client, Client, Client, Client, Client]
})

/** One fitting with a clock of its own: everybody in it lives at `now`. */
class Fitting {
  now = Math.floor(Date.now() / 1000) * 1000
  readonly device = new Device(`C-${randomUUID().slice(0, 8)}`, () => this.now)
  id = ''
  /** The sensor's own error: read = true × 1 / gain + offset. */
  offsetPa = 0
  gain = 1

  headers = () => ({ 'x-now': new Date(this.now).toISOString() })
  async ask<T>(client: Client, method: string, path: string, body?: unknown) {
    return client.send<T>(method, path, body, this.headers())
  }
  async step(kind: CheckKind, step: StepCheck, client = installer): Promise<Commissioning> {
    const { status, body } = await this.ask<Commissioning>(
      client,
      'POST',
      `/api/commissionings/${this.id}/checks/${kind}`,
      step,
    )
    expect(status, JSON.stringify(body)).toBe(200)
    return body
  }
  /** Time goes on by so many seconds with a sample each `every`; the vacuum is a function of seconds gone. */
  async live(
    seconds: number,
    every: number,
    vacuumPa: (s: number) => number,
    pumpOn: (s: number) => boolean = () => false,
  ): Promise<void> {
    const samples: DeviceSample[] = []
    for (let s = every; s <= seconds; s += every)
      samples.push({
        at: this.now + s * 1000,
        vacuumPa: Math.round((vacuumPa(s) / this.gain + this.offsetPa) * 10) / 10,
        pumpOn: pumpOn(s),
        airC: 18,
        supplyV: 12.7,
      })
    this.now += seconds * 1000
    await this.device.send(samples)
  }
  async conclude(kind: CheckKind, given: Partial<Extract<StepCheck, { step: 'done' }>> = {}) {
    const body = await this.step(kind, { step: 'done', ...given })
    return body.checks.findLast((check) => check.kind === kind)
  }
}

const newSystem = async (
  fitting: Fitting,
  over: object = {},
): Promise<{ vesselId: string; systemId: string }> => {
  const { status, body } = await fitting.ask<{ id: string; systems: { id: string }[] }>(
    installer,
    'POST',
    '/api/vessels',
    {
      name: `Dunlin ${randomUUID().slice(0, 6)}`,
      timeZone: 'America/New_York',
      system: { cutOutPa: CUT_OUT_PA, cutInPa: CUT_IN_PA },
      ...over,
    },
  )
  expect(status).toBe(201)
  return { vesselId: body.id, systemId: body.systems[0]?.id ?? '' }
}

/** Registered to a new boat: by the code it shows, or with a key that is carried to it. */
async function fitted(
  way: 'claim' | 'key' = 'key',
): Promise<Fitting & { systemId: string; vesselId: string; loggerId: string }> {
  const fitting = new Fitting()
  const { device } = fitting
  if (way === 'claim') await device.askToBeClaimed()
  const start =
    way === 'claim'
      ? { way, userCode: device.userCode.toLowerCase().replace('-', ' ') }
      : { way, serial: device.serial }
  const started = await fitting.ask<Commissioning>(installer, 'POST', '/api/commissionings', start)
  expect(started.status, JSON.stringify(started.body)).toBe(201)
  fitting.id = started.body.id
  const place = await newSystem(fitting)
  const chosen = await fitting.ask(installer, 'PATCH', `/api/commissionings/${fitting.id}`, {
    systemId: place.systemId,
  })
  expect(chosen.status).toBe(200)
  if (way === 'claim') expect(await device.poll()).toBe('authorization_pending')
  const granted = await fitting.ask<Fitted>(installer, 'POST', `/api/commissionings/${fitting.id}/fitting`, {
    intervalSeconds: 60,
    channels: ['pump', 'vacuum', 'air', 'supply'],
  })
  expect(granted.status, JSON.stringify(granted.body)).toBe(201)
  expect(granted.body.key === null).toBe(way === 'claim')
  fitting.now += 6_000
  if (way === 'claim') expect(await device.poll()).toBeNull()
  else device.key = granted.body.key ?? ''
  return Object.assign(fitting, { ...place, loggerId: granted.body.loggerId })
}

describe('a logger is registered from its code to its record', () => {
  it('passes every check on a fitting that is right, and corrects the sensor', async () => {
    const fitting = await fitted('claim')
    fitting.offsetPa = 120
    fitting.gain = 1.03

    await fitting.step('first-reading', { step: 'begin' })
    expect(await fitting.conclude('first-reading')).toMatchObject({ outcome: null, reason: /powered/ })
    const stateOf = async () =>
      (await manager.get<{ state: string }>(`/api/systems/${fitting.systemId}/summary`, fitting.headers()))
        .body.state
    await fitting.live(10, 2, () => 0)
    expect(await fitting.conclude('first-reading')).toMatchObject({ outcome: 'passed' })

    // Notices are held while the checks are made: a pump off at its breaker is no news to its owner.
    expect(await stateOf()).toBe('worked-on')

    await fitting.step('leak-down-before', { step: 'begin' })
    fitting.now += 1_800_000
    expect(
      await fitting.conclude('leak-down-before', {
        leakDown: { startPa: CUT_OUT_PA, endPa: CUT_OUT_PA - inHgToPa(0.1), seconds: 1_800 },
        resolutionPa: inHgToPa(0.1),
      }),
    ).toMatchObject({ outcome: 'passed', reason: /compare with/ })

    await fitting.step('zero', { step: 'begin' })
    await fitting.live(4, 2, () => 0)
    expect(await fitting.conclude('zero')).toMatchObject({ outcome: null, reason: /3 readings/ })
    await fitting.live(10, 2, () => 0)
    expect(await fitting.conclude('zero')).toMatchObject({ outcome: 'passed' })

    await fitting.step('two-point', { step: 'begin' })
    await fitting.live(
      20,
      2,
      (s) => (CUT_OUT_PA * s) / 20,
      () => true,
    )
    await fitting.live(120, 2, () => CUT_OUT_PA)
    expect(await fitting.conclude('two-point', { gaugePa: CUT_OUT_PA, resolutionPa: 100 })).toMatchObject({
      outcome: 'passed',
      reason: /corrected/,
    })
    const live = await installer.get<{ newest: { vacuumPa: number } }>(
      `/api/commissionings/${fitting.id}/live`,
      fitting.headers(),
    )
    expect(live.body.newest.vacuumPa).toBeCloseTo(CUT_OUT_PA, 0)

    await fitting.step('pump-channel', { step: 'begin' })
    expect(await fitting.conclude('pump-channel')).toMatchObject({ outcome: null, reason: /Flush one bowl/ })
    await fitting.live(10, 1, (s) => (s < 4 ? CUT_OUT_PA : CUT_OUT_PA - inHgToPa(3)))
    const drawn = (s: number) => CUT_OUT_PA - inHgToPa(3) * (1 - s / 30)
    await fitting.live(30, 1, drawn, () => true)
    await fitting.live(20, 1, () => CUT_OUT_PA)
    const pump = await fitting.conclude('pump-channel')
    expect(pump).toMatchObject({ outcome: 'passed' })
    expect(pump?.figures.find(({ name }) => name === 'Vacuum rose by')?.value).toBeGreaterThan(inHgToPa(2))

    await fitting.step('breaker-off', { step: 'begin' })
    await fitting.live(20, 2, () => CUT_OUT_PA)
    expect(await fitting.conclude('breaker-off')).toMatchObject({ outcome: null })
    await fitting.live(90, 2, () => CUT_IN_PA - inHgToPa(2))
    expect(await fitting.conclude('breaker-off')).toMatchObject({ outcome: 'passed' })

    await fitting.live(
      30,
      1,
      (s) => CUT_OUT_PA - inHgToPa(3.8) * (1 - s / 30),
      () => true,
    )
    await fitting.live(10, 2, () => CUT_OUT_PA)
    await fitting.step('leak-down-after', { step: 'begin' })
    await fitting.live(1_800, 10, (s) => CUT_OUT_PA - inHgToPa(0.2) * (s / 3600))
    const after = await fitting.conclude('leak-down-after')
    expect(after).toMatchObject({ outcome: 'passed', reason: /adds no leak/ })
    const rate = after?.figures.find(({ name }) => name === 'Leak rate after')
    expect(rate?.value).toBeGreaterThan(inHgToPa(0.19))
    expect(rate?.value).toBeLessThan(inHgToPa(0.21))

    const done = await fitting.ask<Commissioning>(
      installer,
      'POST',
      `/api/commissionings/${fitting.id}/finish`,
      {},
    )
    expect(done.body).toMatchObject({ passed: true, finishedBy: 'Ines Kelpwright' })
    expect(await stateOf()).not.toBe('worked-on')
    const late = await fitting.ask(installer, 'POST', `/api/commissionings/${fitting.id}/checks/zero`, {
      step: 'begin',
    })
    expect(late.status).toBe(409)

    const record = await manager.get<Commissioning>(`/api/loggers/${fitting.loggerId}/commissioning`)
    expect(record.body.checks.map(({ kind }) => kind)).toEqual(record.body.needed)
    const pdf = await manager.get<string>(`/api/loggers/${fitting.loggerId}/commissioning/pdf?units=kPa`)
    expect(pdf.headers.get('content-type')).toBe('application/pdf')
    expect(pdf.body.startsWith('%PDF-')).toBe(true)
  })

  it('fails a pump on another breaker and keeps both attempts in the record', async () => {
    const fitting = await fitted()
    await fitting.live(10, 2, () => CUT_OUT_PA)
    await fitting.step('breaker-off', { step: 'begin' })
    await fitting.live(20, 2, () => CUT_IN_PA - inHgToPa(2))
    await fitting.live(
      60,
      2,
      (s) => CUT_IN_PA - inHgToPa(2 - s / 120),
      () => true,
    )
    expect(await fitting.conclude('breaker-off')).toMatchObject({ outcome: 'failed', reason: /second feed/ })
    const body = await fitting.step('breaker-off', { step: 'leave-out', reason: 'No breaker of its own yet' })
    expect(body.checks.map(({ outcome }) => outcome)).toEqual(['failed', 'left-out'])
    const finished = await fitting.ask(installer, 'POST', `/api/commissionings/${fitting.id}/finish`, {})
    expect(finished.status).toBe(422)
    const noted = await fitting.ask<Commissioning>(
      installer,
      'POST',
      `/api/commissionings/${fitting.id}/finish`,
      {
        note: 'To be gone on with once the breaker is in',
      },
    )
    expect(noted.body).toMatchObject({ passed: false })
  })

  it('does not conclude what was not begun, nor take a gauge for granted', async () => {
    const fitting = await fitted()
    const path = `/api/commissionings/${fitting.id}/checks`
    expect((await fitting.ask(installer, 'POST', `${path}/zero`, { step: 'done' })).status).toBe(409)
    await fitting.step('two-point', { step: 'begin' })
    expect((await fitting.ask(installer, 'POST', `${path}/two-point`, { step: 'done' })).status).toBe(422)
    expect((await fitting.ask(installer, 'POST', `${path}/nonsense`, { step: 'begin' })).status).toBe(404)
  })
})

describe('a logger changes places', () => {
  it('moves with its key: the old boat keeps its past, the new one begins', async () => {
    const first = await fitted()
    await first.live(600, 60, () => CUT_OUT_PA)
    first.now += 1_000
    const second = await newSystem(first)
    const started = await first.ask<Commissioning>(installer, 'POST', '/api/commissionings', {
      way: 'known',
      serial: first.device.serial,
      systemId: second.systemId,
    })
    const moved = await first.ask<Fitted>(
      installer,
      'POST',
      `/api/commissionings/${started.body.id}/fitting`,
      {},
    )
    expect(moved.body).toEqual({ loggerId: first.loggerId, key: null })
    const movedAt = first.now
    await first.live(600, 60, () => CUT_OUT_PA - 1_000)
    const traceOf = async (systemId: string) => {
      const [from, to] = [movedAt - 600_000, movedAt + 660_000].map((ms) => new Date(ms).toISOString())
      const { body } = await manager.get<{
        channels: { vacuum?: { at: number[]; mean: (number | null)[] } }
      }>(`/api/systems/${systemId}/trace?from=${from}&to=${to}`, first.headers())
      return body.channels.vacuum
    }
    const [old, fresh] = [await traceOf(first.systemId), await traceOf(second.systemId)]
    expect(Math.max(...(old?.at ?? [Infinity]))).toBeLessThan(movedAt)
    expect(old?.at.length).toBeGreaterThan(5)
    expect(Math.min(...(fresh?.at ?? [0]))).toBeGreaterThanOrEqual(movedAt - 60_000)
    expect(fresh?.mean.every((pa) => pa === null || pa < CUT_OUT_PA - 900)).toBe(true)
  })

  it('is replaced without a break: the old fitting ends where the new one begins', async () => {
    const first = await fitted()
    await first.live(300, 60, () => CUT_OUT_PA)
    const serial = `C-${randomUUID().slice(0, 8)}`
    const started = await first.ask<Commissioning>(manager, 'POST', '/api/commissionings', {
      way: 'key',
      serial,
      systemId: first.systemId,
    })
    const placed = await first.ask<Fitted>(
      manager,
      'POST',
      `/api/commissionings/${started.body.id}/fitting`,
      {},
    )
    expect(placed.body.key).toMatch(/^mwk_/)
    const { body } = await manager.get<{ items: { id: string; serial: string; fitted: unknown }[] }>(
      '/api/loggers?limit=5000',
    )
    expect(body.items.find((item) => item.id === first.loggerId)?.fitted).toBeNull()
    expect(body.items.find((item) => item.serial === serial)?.fitted).toMatchObject({
      systemId: first.systemId,
    })
  })

  it('tells the supply of the last hour heard', async () => {
    const fitting = await fitted()
    await fitting.live(120, 60, () => CUT_OUT_PA)
    const { body } = await manager.get<{ items: { loggerId: string; supplyV: number | null }[] }>(
      '/api/loggers/health?limit=5000',
    )
    expect(body.items.find((item) => item.loggerId === fitting.loggerId)?.supplyV).toBeCloseTo(12.7, 5)
    const strange = await stranger.get<typeof body>('/api/loggers/health?limit=5000')
    expect(strange.body.items.some((item) => item.loggerId === fitting.loggerId)).toBe(false)
  })
})

describe('who may register', () => {
  it('is an installer, a manager or the owner; a technician sees the record; a stranger nothing', async () => {
    const fitting = await fitted()
    const path = `/api/commissionings/${fitting.id}`
    const record = `/api/loggers/${fitting.loggerId}/commissioning`
    expect((await nobody().get(path)).status).toBe(401)
    expect((await nobody().get(`${record}/pdf`)).status).toBe(401)
    for (const who of [stranger, owner])
      for (const address of [path, `${path}/live`, record, `${record}/pdf`])
        expect((await who.get(address)).status, address).toBe(404)
    expect((await manager.get(path)).status).toBe(200)
    expect((await technician.get(path)).status).toBe(403)
    expect((await technician.get(`${path}/live`)).status).toBe(403)
    expect((await technician.get(record)).status).toBe(200)
    const step = { step: 'begin' }
    expect((await technician.send('POST', `${path}/checks/zero`, step)).status).toBe(403)
    expect((await stranger.send('POST', `${path}/checks/zero`, step)).status).toBe(404)
    expect((await stranger.send('PATCH', path, { setAside: true })).status).toBe(404)
    expect((await technician.send('POST', `${path}/finish`, { note: 'not mine' })).status).toBe(403)
    const start = { way: 'key', serial: `C-${randomUUID().slice(0, 8)}` }
    expect((await technician.send('POST', '/api/commissionings', start)).status).toBe(403)
    const elsewhere = { ...start, systemId: fitting.systemId }
    expect((await stranger.send('POST', '/api/commissionings', elsewhere)).status).toBe(404)
    const list = await stranger.get<{ items: { id: string }[] }>('/api/commissionings')
    expect(list.body.items.some(({ id }) => id === fitting.id)).toBe(false)
  })

  it('shows one without a boat to its starter and the shop’s installers and managers alone', async () => {
    const start = { way: 'key', serial: `C-${randomUUID().slice(0, 8)}` }
    const { body } = await installer.send<Commissioning>('POST', '/api/commissionings', start)
    const path = `/api/commissionings/${body.id}`
    expect((await manager.get(path)).status).toBe(200)
    expect((await technician.get(path)).status).toBe(404)
    expect((await stranger.get(path)).status).toBe(404)
    const { status } = await installer.send('POST', `${path}/fitting`, {})
    expect(status).toBe(409)
  })

  it('takes no logger of another shop from its boat', async () => {
    const fitting = await fitted()
    const strange = await stranger.send<{ systems: { id: string }[] }>('POST', '/api/vessels', {
      name: 'Grey Phalarope',
      timeZone: 'America/New_York',
    })
    for (const way of ['key', 'known']) {
      const { body } = await stranger.send<Commissioning>('POST', '/api/commissionings', {
        way,
        serial: fitting.device.serial,
        systemId: strange.body.systems[0]?.id,
      })
      const answer = await stranger.send('POST', `/api/commissionings/${body.id}/fitting`, {})
      expect([404, 409]).toContain(answer.status)
    }
    await fitting.live(60, 60, () => CUT_OUT_PA)
  })
})

describe('the database itself', () => {
  it('lets people read and write only what their standing allows', async () => {
    const fitting = await fitted()
    const knex = serverDatabase()
    const as = async <T>(email: string, work: (trx: Knex.Transaction) => Promise<T>): Promise<T> => {
      const { id } = await knex('person').where({ email }).first<{ id: string }>('id')
      return knex.transaction(async (trx) => {
        await trx.raw('set local role mw_person')
        await trx.raw("select set_config('app.person_id', ?, true)", [id])
        return work(trx)
      })
    }
    const seen = (trx: Knex.Transaction) => trx('commissioning').where({ id: fitting.id }).select('id')
    const setAside = (trx: Knex.Transaction) =>
      trx('commissioning').where({ id: fitting.id }).update({ set_aside_at: null })
    try {
      expect(await as('installer@saltern.example', seen)).toHaveLength(1)
      expect(await as('technician@saltern.example', seen)).toHaveLength(1)
      expect(await as('manager@stranger.example', seen)).toHaveLength(0)
      expect(await as('installer@saltern.example', setAside)).toBe(1)
      expect(await as('manager@saltern.example', setAside)).toBe(1)
      expect(await as('technician@saltern.example', setAside)).toBe(0)
      expect(await as('manager@stranger.example', setAside)).toBe(0)
      const begin = (trx: Knex.Transaction) =>
        trx('commissioning_check').insert({
          commissioning_id: fitting.id,
          kind: 'zero',
          began_at: new Date(),
        })
      await expect(as('technician@saltern.example', begin)).rejects.toThrow('row-level security')
      await expect(as('manager@stranger.example', begin)).rejects.toThrow('row-level security')
      await as('installer@saltern.example', begin)
    } finally {
      await knex.destroy()
    }
  })
})
