import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Knex } from '@/db/knex'
import type { Standing } from '@/db/queries/access'
import { cellsOf } from '../support/access/actors'
import { askingHandlers, cookieOf, type Asker } from '../support/access/ask'
import { routesOnDisk } from '../support/access/discover'
import { HANDLERS } from '../support/access/matrix'
import { REQUESTS } from '../support/access/requests'
import { methodOf, runRow, told, type Mismatch } from '../support/access/run-matrix'
import { makeWorld, type World } from '../support/access/world'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

/*
 * The matrix must notice when a rule is lost. Handlers run in this process on a clone of the database; one rule at a
 * time is spoilt, in the policy's own function or in the service's, and the matrix is asked again.
 */

const spoilt = vi.hoisted(() => {
  // Without their rules handlers fail in many ways, and each would be logged.
  process.env.LOG_LEVEL = process.env.SHOW_ERRORS === undefined ? 'silent' : 'error'
  return { rule: '' }
})
const EVERY_ROLE = ['technician', 'installer', 'manager']

vi.mock('@/lib/access/rights', async (original) => {
  const real = await original<typeof import('@/lib/access/rights')>()
  return {
    rightsOf: (standing: Standing) => {
      if (spoilt.rule === 'roles') return real.rightsOf({ ...standing, roles: EVERY_ROLE })
      if (spoilt.rule === 'owner') return real.rightsOf({ ...standing, owns: true })
      return real.rightsOf(standing)
    },
  }
})
vi.mock('@/lib/access/require-right', async (original) => {
  const real = await original<typeof import('@/lib/access/require-right')>()
  const anybody = (vesselId: string): Promise<Standing> =>
    Promise.resolve({ vesselId, owns: true, fullRecord: true, keeps: true, roles: EVERY_ROLE })
  return {
    ...real,
    requireRight: (...asked: Parameters<typeof real.requireRight>) =>
      spoilt.rule === 'check' ? anybody(asked[1]) : real.requireRight(...asked),
    requireSystemRight: (...asked: Parameters<typeof real.requireSystemRight>) =>
      spoilt.rule === 'check' ? anybody('0') : real.requireSystemRight(...asked),
  }
})

let database: TestDatabase
let knex: Knex
let ask: Asker
let world: World
beforeAll(async () => {
  database = await testDatabase()
  knex = database.knex
  await useDatabase(database.url)
  ask = askingHandlers(await routesOnDisk())
})
afterAll(() => database.drop())
beforeEach(async () => {
  world = await makeWorld(knex)
})
afterEach(() => {
  spoilt.rule = ''
})

/** Sign-in is a library's and wants a server around it; the database's answer is asked over HTTP beside this. */
const ROWS = Object.entries(HANDLERS).filter(
  ([row]) => !row.includes('/api/auth/') && !row.includes('{path}'),
)

/** Asks the matrix until so many cells came out otherwise. */
async function mismatchesOf(most: number): Promise<Mismatch[]> {
  const found: Mismatch[] = []
  for (const [row, cells] of ROWS) {
    // A spoilt rule also lets somebody write who is refused: that is noticed too, and by its own words.
    found.push(
      ...(await runRow(knex, ask, row, cells, world, { refusalsAlone: true }).catch(
        (error: unknown): Mismatch[] => [
          { row: `${row}: ${String(error)}`, actor: 'nobody', expected: 'no error', got: 0 },
        ],
      )),
    )
    if (found.length >= most) break
  }
  return found
}

/** Rewrites a function of the policies for as long as `work` runs. */
async function withFunction<T>(
  name: string,
  change: (source: string) => string,
  work: () => Promise<T>,
): Promise<T> {
  const { rows } = await knex.raw<{ rows: { source: string }[] }>(
    'select pg_get_functiondef(?::regprocedure) as source',
    [name],
  )
  const source = rows[0]?.source ?? ''
  const changed = change(source)
  expect(changed, `${name} has nothing of the kind to spoil`).not.toBe(source)
  await knex.raw(changed.replaceAll('?', '\\?'))
  try {
    return await work()
  } finally {
    await knex.raw(source.replaceAll('?', '\\?'))
  }
}

describe('the matrix, in this process', () => {
  it('holds while nothing is spoilt', async () => {
    expect(told(await mismatchesOf(Infinity))).toEqual([])
  })

  it('notices that the service looks at no right', async () => {
    spoilt.rule = 'check'
    expect((await mismatchesOf(1)).length).toBeGreaterThan(0)
  })

  it('notices that an ended membership goes on', async () => {
    const found = await withFunction(
      'my_shops()',
      (source) => source.replace(/\s+and\s+ended_at is null/, ''),
      () => mismatchesOf(1),
    )
    expect(found.map((cell) => cell.actor)).toContain('lapsed')
  })

  it('notices that withdrawn access goes on', async () => {
    const found = await withFunction(
      'visible_vessels()',
      (source) => source.replaceAll(/withdrawn_at is null\s+and\s+/g, ''),
      () => mismatchesOf(1),
    )
    expect(found.map((cell) => cell.actor)).toContain('withdrawn')
  })

  it('notices that roles are not looked at', async () => {
    spoilt.rule = 'roles'
    const found = await mismatchesOf(1)
    expect(found.map((cell) => cell.actor)).toContain('installer')
  })

  it('notices that anybody who sees a boat passes for its owner', async () => {
    spoilt.rule = 'owner'
    const found = await mismatchesOf(1)
    expect(found.some((cell) => ['technician', 'installer', 'manager', 'figures'].includes(cell.actor))).toBe(
      true,
    )
  })

  it('notices that a boat is everybody’s own', async () => {
    const found = await withFunction(
      'owned_vessels()',
      (source) => source.replace(/person_id = current_person\(\)\s+and\s+/, ''),
      () => mismatchesOf(1),
    )
    expect(found.length).toBeGreaterThan(0)
  })

  it('notices that the second consent is not asked for', async () => {
    const found = await withFunction(
      'full_record_vessels()',
      (source) => source.replace(/and\s+(?:\w+\.)?level = 'full'/i, ''),
      () => mismatchesOf(1),
    )
    expect(found.map((cell) => cell.actor)).toContain('figures')
  })
})

describe('without the service’s check', () => {
  /*
   * Read by the service itself once the right is proven: what they answer stands behind the check alone. Each is
   * named, so that another does not join them unseen.
   */
  const BEHIND_THE_CHECK_ALONE = ['GET /api/vessels/{id}/log', 'GET /api/invitations · of a vessel']
  /** A shop keeps the visits it did, with the boat's name on them. */
  const KEPT = ['GET /api/visits as withdrawn', 'GET /api/visits/{id} · done before as withdrawn']

  it('the database still shows strangers nothing of the boat', async () => {
    spoilt.rule = 'check'
    const shown: string[] = []
    const asked = ROWS.filter(
      ([name, cells]) =>
        methodOf(name) === 'GET' &&
        cellsOf(name, cells).nobody !== 'ok' &&
        !BEHIND_THE_CHECK_ALONE.includes(name),
    )
    for (const [row] of asked)
      for (const actor of ['strangeOwner', 'strangeManager', 'lapsed', 'withdrawn'] as const) {
        const request = REQUESTS[row]
        if (request === undefined) continue
        const answer = await ask('GET', request(world, actor), cookieOf(world, actor))
        if (answer.text.includes(world.marker)) shown.push(`${row} as ${actor}`)
      }
    expect(shown.filter((line) => !KEPT.includes(line))).toEqual([])
  })
})
