import { afterAll, beforeAll, expect, it } from 'vitest'
import { getSettings, changeSettings } from '@/lib/systems/change-settings'
import { getSetUp } from '@/lib/systems/get-set-up'
import { setParts } from '@/lib/systems/set-parts'
import { changeVessel } from '@/lib/vessels/change-vessel'
import { createVessel } from '@/lib/vessels/create-vessel'
import { findTimeZones } from '@/lib/vessels/find-time-zones'
import { getVessel } from '@/lib/vessels/get-vessel'
import { DEFAULT_UNITS } from '@/shared/units'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const NOW = new Date('2026-12-01T12:00:00Z')
const later = (minutes: number) => new Date(NOW.getTime() + minutes * 60_000)
const derivedFrom: Date[] = []
const rederive = async (_trx: unknown, _systemId: string, since: Date) => {
  derivedFrom.push(since)
}
const PARTS = [
  { key: 'tank', kind: 'tank', name: 'Tank', volumeM3: 0.03 },
  { key: 'fore', kind: 'head', name: 'Forward head', parent: 'tank' },
  { key: 'pump', kind: 'pump', name: 'Pump', parent: 'tank' },
] as const

let database: TestDatabase
let owner: string
let technician: string
let stranger: string
beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  const idOf = async (email: string): Promise<string> => {
    const row = await database.knex('person').where({ email }).first<{ id: string }>('id')
    return row?.id ?? ''
  }
  owner = await idOf('owner@saltern.example')
  technician = await idOf('technician@saltern.example')
  stranger = await idOf('owner@stranger.example')
})
afterAll(() => database.drop())

/** A boat of the owner's, set up a year before. */
async function boat(): Promise<{ vesselId: string; systemId: string }> {
  const made = await createVessel(
    {
      personId: owner,
      sessionId: '1',
      name: 'Owner',
      email: 'owner@saltern.example',
      units: { ...DEFAULT_UNITS, clock: '24h' },
      memberships: [],
      ownsVessels: true,
    },
    { name: 'Grey Teal', timeZone: 'Europe/London', system: { parts: [...PARTS], limitSeconds: 10_800 } },
    new Date('2025-12-01T12:00:00Z'),
  )
  return { vesselId: made.id, systemId: made.systems[0]?.id ?? '' }
}

it('says which parts each test point of the drawing has in its test', async () => {
  const { systemId } = await boat()
  const { testPoints } = await getSetUp(owner, systemId, NOW)
  const of = (kind: string) => testPoints.find((point) => point.kind === kind)
  expect(of('whole-boat')?.parts).toEqual(['tank', 'fore', 'pump'])
  expect(of('tank-ports')?.parts).toEqual(['tank', 'pump'])
  expect(of('pump-inlet')).toMatchObject({ at: 'pump', parts: ['pump'], switchSees: false })
  await changeSettings(owner, systemId, { kind: 'unit' }, later(1), rederive)
  const unit = await getSetUp(owner, systemId, later(2))
  expect(unit.testPoints.map((point) => point.kind)).not.toContain('pump-inlet')
})

it('lists who changed what, from what to what, the newest first', async () => {
  const { vesselId, systemId } = await boat()
  expect((await getSetUp(owner, systemId, NOW)).history).toEqual([])
  await changeSettings(owner, systemId, { limitSeconds: 14_400, cutOutPa: 33_863.9 }, later(1), rederive)
  await setParts(
    owner,
    systemId,
    [
      { key: 'tank', kind: 'tank', name: 'Tank', volumeM3: 0.04 },
      { key: 'fore', kind: 'head', name: 'Fore head', parent: 'tank' },
      { key: 'aft', kind: 'head', name: 'Aft head', parent: 'tank' },
    ],
    later(2),
  )
  await changeVessel(
    owner,
    vesselId,
    { quietHours: { start: '21:30', end: '06:30' }, berth: 'C 4' },
    later(3),
  )
  const { history } = await getSetUp(owner, systemId, later(4))
  const name = (await database.knex('person').where({ id: owner }).first<{ name: string }>('name'))?.name
  expect(history.map((entry) => [entry.subject, entry.who, entry.at])).toEqual([
    ['boat', name, later(3).toISOString()],
    ['parts', name, later(2).toISOString()],
    ['figures', name, later(1).toISOString()],
  ])
  expect(history[0]?.changes).toEqual([
    { field: 'quietHours', part: null, from: '22:00 to 07:00', to: '21:30 to 06:30' },
    { field: 'berth', part: null, from: null, to: 'C 4' },
  ])
  expect(history[1]?.changes).toEqual([
    { field: 'volumeM3', part: 'Tank', from: expect.closeTo(0.03, 6), to: 0.04 },
    { field: 'name', part: 'Fore head', from: 'Forward head', to: 'Fore head' },
    { field: 'part', part: 'Aft head', from: null, to: 'Aft head' },
    { field: 'part', part: 'Pump', from: 'Pump', to: null },
  ])
  expect(history[2]?.changes).toEqual([
    { field: 'cutOutPa', part: null, from: null, to: 33_863.9 },
    { field: 'limitSeconds', part: null, from: 10_800, to: 14_400 },
  ])
})

it('keeps the history of one system apart from that of another boat’s, and from strangers', async () => {
  const one = await boat()
  const other = await boat()
  await changeSettings(owner, one.systemId, { aimSeconds: 36_000 }, later(1), rederive)
  expect((await getSetUp(owner, other.systemId, later(2))).history).toEqual([])
  await expect(getSetUp(stranger, one.systemId, later(2))).rejects.toMatchObject({ kind: 'not-found' })
  await expect(getSetUp(technician, one.systemId, later(2))).rejects.toMatchObject({ kind: 'not-found' })
})

it('names nobody whom the reader does not know', async () => {
  const { vesselId, systemId } = await boat()
  await database.knex('audit_entry').insert({
    at: later(1),
    person_id: stranger,
    vessel_id: vesselId,
    action: 'system.settings',
    detail: JSON.stringify({ systemId, pumpAmps: 7 }),
  })
  const { history } = await getSetUp(owner, systemId, later(2))
  expect(history).toMatchObject([{ who: null, changes: [{ field: 'pumpAmps', to: 7 }] }])
  expect(history[0]?.changes[0]).not.toHaveProperty('from')
})

it('carries a figure of an earlier day on until it was next changed itself', async () => {
  const { systemId } = await boat()
  const day = (date: string) => new Date(`${date}T00:00:00Z`)
  await changeSettings(owner, systemId, { pumpAmps: 6 }, day('2026-03-01'), rederive)
  await changeSettings(owner, systemId, { limitSeconds: 7200 }, day('2026-06-01'), rederive)
  await changeSettings(
    owner,
    systemId,
    { limitSeconds: 14_400, silenceSeconds: 43_200, inForceFrom: '2026-02-01T00:00:00Z' },
    NOW,
    rederive,
  )
  expect(derivedFrom.at(-1)).toEqual(day('2026-02-01'))
  const at = async (date: string) => {
    const { limitSeconds, silenceSeconds, pumpAmps } = await getSettings(owner, systemId, day(date))
    return [limitSeconds, silenceSeconds, pumpAmps]
  }
  expect(await at('2026-01-15')).toEqual([10_800, 21_600, null])
  expect(await at('2026-02-15')).toEqual([14_400, 43_200, null])
  expect(await at('2026-03-15')).toEqual([14_400, 43_200, 6])
  expect(await at('2026-06-15')).toEqual([7200, 43_200, 6])
  const { history } = await getSetUp(owner, systemId, later(1))
  expect(history[0]).toMatchObject({ inForceFrom: '2026-02-01T00:00:00.000Z' })
})

it('gives the boat’s offsets, for days that a change counts from', async () => {
  const { systemId } = await boat()
  const { offsets } = await getSetUp(owner, systemId, NOW)
  expect(offsets).toContainEqual({ from: '2026-03-29T01:00:00.000Z', seconds: 3600 })
  expect(offsets.at(-1)).toEqual({ from: '2026-10-25T01:00:00.000Z', seconds: 0 })
})

it('finds time zones by the words of their names, each a name that a boat may have', async () => {
  const names = async (search: string) =>
    (await findTimeZones(owner, { search, limit: 20 })).items.map((zone) => zone.name)
  expect((await names('new york'))[0]).toBe('America/New_York')
  expect(await names('lond')).toContain('Europe/London')
  expect(await names('%')).toEqual([])
  expect(await names('posix')).toEqual([])
  const { vesselId } = await boat()
  for (const zone of (await names('pacific/a')).slice(0, 3)) {
    await changeVessel(owner, vesselId, { timeZone: zone }, NOW)
    expect((await getVessel(owner, vesselId, NOW)).timeZone).toBe(zone)
  }
})
