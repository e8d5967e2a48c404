import { spawn } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { gzipSync } from 'node:zlib'
import { setImmediate as turn } from 'node:timers/promises'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { dump, newBoat, readingsOf, send, senml, type Boat } from '../support/boats'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

const NOW = new Date('2026-11-20T12:00:00Z')
const FROM_SECONDS = Date.parse('2026-11-16T00:00:00Z') / 1000
const BACKLOG = readingsOf({ fromSeconds: FROM_SECONDS, hours: 90, intervalSeconds: 10, seed: 3 })
const BEFORE = readingsOf({ fromSeconds: FROM_SECONDS - 6 * 3600, hours: 6, seed: 4 })

let database: TestDatabase
let folder: string
let clean: Record<string, string[]>

const GZIP = { 'content-encoding': 'gzip' }
const packed = (boat: Boat, readings: typeof BACKLOG) =>
  new Uint8Array(gzipSync(JSON.stringify(senml(boat.serial, readings)), { level: 1 }))

const sendWhole = async (boat: Boat, readings: typeof BACKLOG) => {
  for (;;) {
    const { status } = await send(boat, packed(boat, readings), { at: NOW, headers: GZIP })
    // The killed process's transaction may hold its locks until the server has noticed.
    if (status === 503) continue
    expect(status).toBe(200)
    return
  }
}

beforeAll(async () => {
  database = await testDatabase()
  await useDatabase(database.url)
  folder = mkdtempSync(path.join(tmpdir(), 'middlewatch-'))
  const boat = await newBoat(database.knex, { intervalSeconds: 10 })
  await sendWhole(boat, BEFORE)
  await sendWhole(boat, BACKLOG)
  clean = await dump(database.knex, boat)
})
afterAll(async () => {
  rmSync(folder, { recursive: true, force: true })
  await database.drop()
})

/** Starts the sender, and kills it as soon as the database is seen at work on a statement of this kind for it. */
async function killAt(boat: Boat, statement: RegExp): Promise<void> {
  const file = path.join(folder, `${boat.serial}.json.gz`)
  writeFileSync(file, packed(boat, BACKLOG))
  const child = spawn(
    process.execPath,
    [
      '--import',
      'tsx',
      path.join(import.meta.dirname, 'backlog-sender.ts'),
      boat.key,
      file,
      NOW.toISOString(),
    ],
    { env: { ...process.env, DATABASE_URL: database.url }, stdio: ['ignore', 'pipe', 'inherit'] },
  )
  let answered = ''
  child.stdout.on('data', (chunk: Buffer) => (answered += chunk.toString()))
  const gone = new Promise((resolve) => child.once('exit', resolve))
  const atWork = async (): Promise<boolean> => {
    const { rows } = await database.knex.raw<{ rows: { query: string }[] }>(
      `select query from pg_stat_activity
       where datname = current_database() and pid <> pg_backend_pid() and xact_start is not null`,
    )
    return rows.some(({ query }) => statement.test(query))
  }
  while (child.exitCode === null && !(await atWork())) await turn()
  child.kill('SIGKILL')
  await gone
  expect(answered, 'the process should have been killed before it answered').toBe('')
}

describe('a process killed in the middle of a backlog', () => {
  it('is a backlog worth the name', () => {
    expect(BACKLOG.length).toBeGreaterThan(30_000)
    expect(clean.runs?.length).toBeGreaterThan(25)
  })

  it.each([
    ['while samples go in', /^copy sample/i],
    ['while hours are rolled up', /insert into sample_hour/i],
    ['while rows are derived', /insert into "(leg|run|hold|flush)"/i],
  ])('%s: nothing is lost, nothing is there twice', { timeout: 120_000 }, async (_when, statement) => {
    const boat = await newBoat(database.knex, { intervalSeconds: 10 })
    await sendWhole(boat, BEFORE)
    const before = await dump(database.knex, boat)
    await killAt(boat, statement)
    expect(await dump(database.knex, boat)).toEqual(before)
    await sendWhole(boat, BACKLOG)
    expect(await dump(database.knex, boat)).toEqual(clean)
    await sendWhole(boat, BACKLOG)
    expect(await dump(database.knex, boat)).toEqual(clean)
  })
})
