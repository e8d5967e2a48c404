import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { connect, type Knex } from '@/db/knex'
import { startLocalServer, type LocalServer } from '@/db/local-server'
import { up as peopleAndVessels } from '@/db/migrations/0001_people_and_vessels'
import { nightWindow, nightWindows, pastNightWindows, zoneKnown, zoneOffsets } from '@/db/queries/zones'
import type { Trx } from '@/db/roles'

/*
 * Source: IANA time zone database 2026f (Debian tzdata 2026f-0+deb12u1), zdump -v and Python zoneinfo agreeing.
 * Rules come from the operating system through PostgreSQL; zones whose rules changed in 2026 are checked where
 * the system's data know of it.
 */
let server: LocalServer
let knex: Knex

beforeAll(async () => {
  server = await startLocalServer({
    dataFolder: path.resolve(import.meta.dirname, '../../.data/reference-postgres'),
    fast: true,
  })
  const admin = connect(server.url, { max: 1 })
  await admin.raw('drop database if exists zones with (force)')
  await admin.raw('create database zones')
  await admin.destroy()
  knex = connect(server.urlOf('zones'), { max: 2 })
  await peopleAndVessels(knex)
}, 120_000)

afterAll(async () => {
  await knex.destroy()
  await server.stop()
})

const within = <T>(work: (trx: Trx) => Promise<T>): Promise<T> => knex.transaction(work)

async function vesselIn(timeZone: string, quiet = { start: '22:00', end: '07:00' }): Promise<string> {
  const [row] = await knex('vessel')
    .insert({ name: timeZone, time_zone: timeZone, quiet_start: quiet.start, quiet_end: quiet.end })
    .returning<{ id: string }[]>('id')
  return row?.id ?? ''
}

interface Change {
  zone: string
  night: string
  instant: string
  before: number
  after: number
  window: [string, string]
  hours: number
  /** A rule of 2026: checked when the system's zone data have it. */
  recent?: true
}

// Offsets in minutes, as the source gives them.
const CHANGES: Change[] = [
  {
    zone: 'America/New_York',
    night: '2026-03-07',
    instant: '2026-03-08T07:00:00Z',
    before: -300,
    after: -240,
    window: ['2026-03-08T03:00:00Z', '2026-03-08T11:00:00Z'],
    hours: 8,
  },
  {
    zone: 'America/New_York',
    night: '2026-10-31',
    instant: '2026-11-01T06:00:00Z',
    before: -240,
    after: -300,
    window: ['2026-11-01T02:00:00Z', '2026-11-01T12:00:00Z'],
    hours: 10,
  },
  {
    zone: 'America/New_York',
    night: '2027-03-13',
    instant: '2027-03-14T07:00:00Z',
    before: -300,
    after: -240,
    window: ['2027-03-14T03:00:00Z', '2027-03-14T11:00:00Z'],
    hours: 8,
  },
  {
    zone: 'America/New_York',
    night: '2027-11-06',
    instant: '2027-11-07T06:00:00Z',
    before: -240,
    after: -300,
    window: ['2027-11-07T02:00:00Z', '2027-11-07T12:00:00Z'],
    hours: 10,
  },
  {
    zone: 'Europe/London',
    night: '2026-03-28',
    instant: '2026-03-29T01:00:00Z',
    before: 0,
    after: 60,
    window: ['2026-03-28T22:00:00Z', '2026-03-29T06:00:00Z'],
    hours: 8,
  },
  {
    zone: 'Europe/London',
    night: '2026-10-24',
    instant: '2026-10-25T01:00:00Z',
    before: 60,
    after: 0,
    window: ['2026-10-24T21:00:00Z', '2026-10-25T07:00:00Z'],
    hours: 10,
  },
  {
    zone: 'Europe/London',
    night: '2027-10-30',
    instant: '2027-10-31T01:00:00Z',
    before: 60,
    after: 0,
    window: ['2027-10-30T21:00:00Z', '2027-10-31T07:00:00Z'],
    hours: 10,
  },
  {
    zone: 'Australia/Lord_Howe',
    night: '2026-04-04',
    instant: '2026-04-04T15:00:00Z',
    before: 660,
    after: 630,
    window: ['2026-04-04T11:00:00Z', '2026-04-04T20:30:00Z'],
    hours: 9.5,
  },
  {
    zone: 'Australia/Lord_Howe',
    night: '2026-10-03',
    instant: '2026-10-03T15:30:00Z',
    before: 630,
    after: 660,
    window: ['2026-10-03T11:30:00Z', '2026-10-03T20:00:00Z'],
    hours: 8.5,
  },
  {
    zone: 'Pacific/Auckland',
    night: '2026-04-04',
    instant: '2026-04-04T14:00:00Z',
    before: 780,
    after: 720,
    window: ['2026-04-04T09:00:00Z', '2026-04-04T19:00:00Z'],
    hours: 10,
  },
  {
    zone: 'Pacific/Auckland',
    night: '2026-09-26',
    instant: '2026-09-26T14:00:00Z',
    before: 720,
    after: 780,
    window: ['2026-09-26T10:00:00Z', '2026-09-26T18:00:00Z'],
    hours: 8,
  },
  {
    zone: 'America/Vancouver',
    night: '2026-03-07',
    instant: '2026-03-08T10:00:00Z',
    before: -480,
    after: -420,
    window: ['2026-03-08T06:00:00Z', '2026-03-08T14:00:00Z'],
    hours: 8,
  },
  {
    zone: 'America/Havana',
    night: '2026-03-07',
    instant: '2026-03-08T05:00:00Z',
    before: -300,
    after: -240,
    window: ['2026-03-08T03:00:00Z', '2026-03-08T11:00:00Z'],
    hours: 8,
  },
  {
    zone: 'Africa/Casablanca',
    night: '2026-02-14',
    instant: '2026-02-15T02:00:00Z',
    before: 60,
    after: 0,
    window: ['2026-02-14T21:00:00Z', '2026-02-15T07:00:00Z'],
    hours: 10,
  },
  {
    zone: 'Africa/Casablanca',
    night: '2026-03-21',
    instant: '2026-03-22T02:00:00Z',
    before: 0,
    after: 60,
    window: ['2026-03-21T22:00:00Z', '2026-03-22T06:00:00Z'],
    hours: 8,
  },
  {
    zone: 'Africa/Casablanca',
    night: '2026-09-19',
    instant: '2026-09-20T01:00:00Z',
    before: 60,
    after: 0,
    window: ['2026-09-19T21:00:00Z', '2026-09-20T07:00:00Z'],
    hours: 10,
    recent: true,
  },
]

/** Whether the operating system's zone data are of 2026: Winnipeg keeps its summer clock from then on. */
const current = async (): Promise<boolean> => {
  const { rows } = await knex.raw<{ rows: { hour: number }[] }>(
    "select extract(hour from timestamptz '2026-12-01T12:00:00Z' at time zone 'America/Winnipeg')::int as hour",
  )
  return rows[0]?.hour === 7
}

describe('quiet hours of a night in which the clocks change', () => {
  for (const change of CHANGES) {
    it(`${change.zone}, evening of ${change.night}: ${change.hours} h`, async ({ skip }) => {
      if (change.recent && !(await current())) skip('the system’s time-zone data are older than 2026f')
      const id = await vesselIn(change.zone)
      const [from, to] = change.window
      // Asked an hour before it begins, at its beginning, at the change itself and just before its end.
      for (const at of [
        Date.parse(from) - 3_600_000,
        Date.parse(from),
        Date.parse(change.instant),
        Date.parse(to) - 1,
      ]) {
        const night = await within((trx) => nightWindow(trx, id, new Date(at)))
        expect(night).toEqual({
          vesselId: id,
          night: change.night,
          from: new Date(from),
          to: new Date(to),
          timeZone: change.zone,
          hours: change.hours,
        })
      }
      const next = await within((trx) => nightWindow(trx, id, new Date(to)))
      expect(next.from.getTime()).toBeGreaterThan(Date.parse(to))
    })

    it(`${change.zone}: the clock changes at ${change.instant}`, async ({ skip }) => {
      if (change.recent && !(await current())) skip('the system’s time-zone data are older than 2026f')
      const day = 86_400_000
      const from = new Date(Date.parse(change.instant) - 3.3 * day)
      const to = new Date(Date.parse(change.instant) + 2.1 * day)
      expect(await within((trx) => zoneOffsets(trx, change.zone, from, to))).toEqual([
        { from, seconds: change.before * 60 },
        { from: new Date(change.instant), seconds: change.after * 60 },
      ])
    })
  }

  it('is nine hours on an ordinary night, and where only the name of the zone changes', async () => {
    const ordinary = await within(async (trx) =>
      nightWindow(trx, await vesselIn('Europe/London'), new Date('2026-07-01T12:00:00Z')),
    )
    expect(ordinary.hours).toBe(9)
  })

  it('follows the rules of 2026 in Winnipeg and Yellowknife', async ({ skip }) => {
    if (!(await current())) skip('the system’s time-zone data are older than 2026f')
    const expected: [string, string, string, string][] = [
      ['America/Winnipeg', '2026-10-31', '2026-11-01T03:00:00Z', '2026-11-01T12:00:00Z'],
      ['America/Yellowknife', '2026-10-31', '2026-11-01T04:00:00Z', '2026-11-01T13:00:00Z'],
    ]
    for (const [zone, night, from, to] of expected) {
      const id = await vesselIn(zone)
      const window = await within((trx) => nightWindow(trx, id, new Date(from)))
      expect(window).toMatchObject({ night, from: new Date(from), to: new Date(to), hours: 9 })
    }
  })
})

describe('nights and offsets', () => {
  it('gives a window that begins after midnight to the evening before', async () => {
    const id = await vesselIn('Etc/UTC', { start: '01:00', end: '06:00' })
    const night = await within((trx) => nightWindow(trx, id, new Date('2026-06-10T22:00:00Z')))
    expect(night).toMatchObject({ night: '2026-06-10', from: new Date('2026-06-11T01:00:00Z'), hours: 5 })
  })

  it('lists the last nights of many vessels, oldest first, the running one last', async () => {
    const ids = [await vesselIn('Europe/London'), await vesselIn('Pacific/Auckland')]
    const at = new Date('2026-06-10T23:30:00Z')
    const nights = await within((trx) => pastNightWindows(trx, ids, at, 3))
    expect(nights.map((n) => [n.vesselId, n.night])).toEqual([
      [ids[0], '2026-06-08'],
      [ids[0], '2026-06-09'],
      [ids[0], '2026-06-10'],
      [ids[1], '2026-06-08'],
      [ids[1], '2026-06-09'],
      [ids[1], '2026-06-10'],
    ])
    expect(await within((trx) => nightWindows(trx, [], at))).toEqual([])
  })

  it('finds both changes of a year, and none in a zone without', async () => {
    const from = new Date('2026-01-01T00:00:00Z')
    const to = new Date('2027-01-01T00:00:00Z')
    expect(await within((trx) => zoneOffsets(trx, 'Australia/Lord_Howe', from, to))).toEqual([
      { from, seconds: 39_600 },
      { from: new Date('2026-04-04T15:00:00Z'), seconds: 37_800 },
      { from: new Date('2026-10-03T15:30:00Z'), seconds: 39_600 },
    ])
    expect(await within((trx) => zoneOffsets(trx, 'Etc/UTC', from, to))).toEqual([{ from, seconds: 0 }])
  })

  it('knows which names are zones', async () => {
    expect(await within((trx) => zoneKnown(trx, 'Pacific/Auckland'))).toBe(true)
    expect(await within((trx) => zoneKnown(trx, 'Pacific/Averill'))).toBe(false)
  })
})
