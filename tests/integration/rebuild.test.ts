import { execFile } from 'node:child_process'
import path from 'node:path'
import { promisify } from 'node:util'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { dump, newBoat, readingsOf, send, senml, type Boat } from '../support/boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const ROOT = path.resolve(import.meta.dirname, '../..')
const NOW = new Date('2026-11-20T12:00:00Z')

let database: TestDatabase
let boats: Boat[]

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  boats = []
  for (const seed of [1, 2]) {
    const boat = await newBoat(database.knex)
    const story = readingsOf({ fromSeconds: Date.parse('2026-11-15T00:00:00Z') / 1000, hours: 50, seed })
    // Late and shuffled, so that the rows have been replaced more than once.
    for (const part of [story.slice(2_000), story.slice(0, 700), story.slice(600, 2_100)])
      await send(boat, senml(boat.serial, part), { at: NOW })
    boats.push(boat)
  }
})
afterAll(() => database.drop())

const rebuild = (...args: string[]) =>
  promisify(execFile)(process.execPath, ['--import', 'tsx', 'lib/run/rebuild.ts', ...args], {
    cwd: ROOT,
    env: { ...process.env, DATABASE_URL: database.url },
  })
const dumps = () => Promise.all(boats.map((boat) => dump(database.knex, boat)))

describe('npm run rebuild', () => {
  it('brings back to the byte what was derived bit by bit', async () => {
    const before = await dumps()
    const [first, second] = boats
    for (const table of ['run', 'hold', 'leg', 'flush', 'fault', 'checkpoint', 'system_day'])
      await database
        .knex(table)
        .whereIn('system_id', [first?.systemId ?? '', second?.systemId ?? ''])
        .delete()
    await database.knex('system_state').update({ head: null, head_at: null })
    expect(await dumps()).not.toEqual(before)

    const { stdout } = await rebuild('--system', first?.systemId ?? '')
    expect(stdout).toMatch(new RegExp(`^system ${first?.systemId}: \\d+ items`))
    const [one, two] = await dumps()
    expect(one).toEqual(before[0])
    expect(two).not.toEqual(before[1])

    await rebuild('--all')
    expect(await dumps()).toEqual(before)
  })

  it('says what is wrong with its arguments', async () => {
    await expect(rebuild()).rejects.toMatchObject({ code: 1, stderr: expect.stringMatching(/--system ID/) })
    await expect(rebuild('--system', 'x', '--all')).rejects.toMatchObject({ code: 1 })
    await expect(rebuild('--system', '999999')).rejects.toMatchObject({
      stderr: expect.stringMatching(/no system/),
    })
  })
})
