import { randomUUID } from 'node:crypto'
import request from 'supertest'
import { serverUrl, signIn, type Client } from '../support/client'

/** Requests of one person, or of nobody, to the running server. */
export const asking = (client: Client | null) => {
  const ask = (method: 'get' | 'post' | 'put' | 'patch' | 'delete', path: string) => {
    const asked = request(serverUrl())[method](path)
    return client === null ? asked : asked.set('cookie', client.cookie)
  }
  return {
    get: (path: string) => ask('get', path),
    post: (path: string, body?: object) => ask('post', path).send(body ?? {}),
    put: (path: string, body?: object) => ask('put', path).send(body ?? {}),
    patch: (path: string, body?: object) => ask('patch', path).send(body ?? {}),
    delete: (path: string) => ask('delete', path),
  }
}
export type Asking = ReturnType<typeof asking>

export const ACCOUNTS = {
  manager: 'manager@saltern.example',
  technician: 'technician@saltern.example',
  installer: 'installer@saltern.example',
  owner: 'owner@saltern.example',
  strangeManager: 'manager@stranger.example',
  strangeOwner: 'owner@stranger.example',
} as const
export type Account = keyof typeof ACCOUNTS
export type People = Record<Account | 'nobody', Asking>

/** Everybody of the demo, signed in, and nobody. */
export async function everybody(): Promise<People> {
  const signedIn = await Promise.all(
    Object.entries(ACCOUNTS).map(async ([name, email]) => [name, asking(await signIn(email))] as const),
  )
  return { ...Object.fromEntries(signedIn), nobody: asking(null) } as People // one entry for each account above
}

export interface Boat {
  vesselId: string
  systemId: string
  loggerId: string
  serial: string
  key: string
}

export const CUT_OUT_PA = 33_863.9
export const CUT_IN_PA = 27_768.4
const PARTS = [
  { key: 'tank', kind: 'tank', name: 'Tank', volumeM3: 0.03 },
  { key: 'forward', kind: 'head', name: 'Forward head', volumeM3: 0.002, parent: 'tank' },
]

/** A boat of `owner@saltern.example`, which the shop set up and sees in full, with a logger the manager registered. */
export async function newBoat(people: People, over: object = {}): Promise<Boat> {
  const made = await people.manager
    .post('/api/vessels', {
      name: `Boat ${randomUUID().slice(0, 8)}`,
      timeZone: 'Europe/London',
      ownerEmail: ACCOUNTS.owner,
      system: { cutOutPa: CUT_OUT_PA, cutInPa: CUT_IN_PA, parts: PARTS },
      ...over,
    })
    .expect(201)
  const { id: vesselId, systems } = made.body as { id: string; systems: { id: string }[] }
  const systemId = systems[0]?.id ?? ''
  const serial = `T-${randomUUID()}`
  const registered = await people.manager
    .post(`/api/systems/${systemId}/loggers`, {
      serial,
      intervalSeconds: 60,
      channels: ['pump', 'vacuum', 'air'],
    })
    .expect(201)
  const { id: loggerId, key } = registered.body as { id: string; key: string }
  return { vesselId, systemId, loggerId, serial, key }
}

/** The shop's id. */
export async function shopOf(person: Asking): Promise<string> {
  const me = await person.get('/api/me').expect(200)
  const { shops } = me.body as { shops: { id: string }[] }
  return shops[0]?.id ?? ''
}

/** Uploads a sheet of samples, all of which must be taken. */
export async function upload(boat: Boat, csv: string): Promise<void> {
  const answer = await request(serverUrl())
    .post('/api/ingest')
    .set('authorization', `Bearer ${boat.key}`)
    .set('content-type', 'text/csv')
    .send(csv)
    .expect(200)
  const { samples } = answer.body as { samples: { received: number; stored: number } }
  if (samples.stored !== samples.received)
    throw new Error(`only ${samples.stored} of ${samples.received} stored`)
}

export interface Saw {
  /** Epoch milliseconds of the first and the last sample. */
  from: number
  to: number
  /** How fast the vacuum falls. */
  paPerHour: number
  /** Flushes, epoch milliseconds: the vacuum drops by a third of the band and more, and the pump starts. */
  flushes?: number[]
  /** A sample every minute, none in these spans. */
  gaps?: [number, number][]
}

/**
 * A plain saw-tooth as a logger would send it: a sample a minute, one more at each edge of the pump. The pump takes
 * half a minute from the cut-in to the cut-out.
 */
export function sawTooth(saw: Saw): string {
  const lines = ['time,vacuum_pa,pump,air_cel']
  const inGap = (at: number) => (saw.gaps ?? []).some(([a, b]) => at >= a && at < b)
  const tell = (at: number, vacuumPa: number, pump: 0 | 1) => {
    if (!inGap(at)) lines.push(`${new Date(at).toISOString()},${vacuumPa.toFixed(1)},${pump},18`)
  }
  const waiting = [...(saw.flushes ?? [])]
  let vacuumPa = CUT_OUT_PA
  let at = saw.from
  while (at <= saw.to) {
    tell(at, vacuumPa, 0)
    const flush = waiting[0]
    const flushed = flush !== undefined && flush <= at + 60_000
    if (flushed) waiting.shift()
    vacuumPa = flushed ? CUT_IN_PA - 1500 : vacuumPa - saw.paPerHour / 60
    at += flushed ? 2000 : 60_000
    if (vacuumPa > CUT_IN_PA) continue
    tell(at, vacuumPa, 1)
    tell(at + 15_000, (vacuumPa + CUT_OUT_PA) / 2, 1)
    at += 30_000
    vacuumPa = CUT_OUT_PA
  }
  return `${lines.join('\r\n')}\r\n`
}
