import type { Knex } from '@/db/knex'
import { ACTORS, cellsOf, fits, type Actor } from './actors'
import { cookieOf, type Answered, type Asker } from './ask'
import type { Method } from './discover'
import { REQUESTS } from './requests'
import { makeWorld, type World } from './world'

export interface Mismatch {
  row: string
  actor: Actor
  expected: string
  got: number
}

/** The method of a row's name. */
export const methodOf = (row: string): Method => row.split(' ')[0] as Method // rows are named so

/** Tables that a refusal may touch: who was seen when, and who tried how often. */
const TOUCHED_BY_ASKING = ['session', 'throttle']

/** What stands in the database, as a text that any change alters. */
export async function fingerprint(knex: Knex): Promise<string> {
  const tables = await knex('pg_tables')
    .where({ schemaname: 'public' })
    .orderBy('tablename')
    .pluck('tablename')
  const counted = tables
    .map(String)
    .filter((table) => !TOUCHED_BY_ASKING.includes(table))
    .map((table) => `select '${table}' as t, count(*) as n, max(xmin::text::bigint) as x from "${table}"`)
  const { rows } = await knex.raw<{ rows: object[] }>(`${counted.join(' union all ')} order by 1`)
  return JSON.stringify(rows)
}

/** The tables in which two fingerprints differ. */
function differing(before: string, after: string): string {
  const rows = (text: string) =>
    (JSON.parse(text) as { t: string }[]).map((row) => [row.t, JSON.stringify(row)] as const)
  const was = new Map(rows(before))
  return rows(after)
    .flatMap(([table, row]) => (was.get(table) === row ? [] : [table]))
    .join(', ')
}

const refused = (expected: string): boolean => expected === '401' || expected === '403' || expected === '404'

async function askRow(ask: Asker, row: string, world: World, actor: Actor): Promise<Answered> {
  const request = REQUESTS[row]
  if (request === undefined) throw new Error(`nothing says how ${row} is asked`)
  return ask(methodOf(row), request(world, actor), cookieOf(world, actor))
}

/**
 * Asks one row of the matrix as everybody. Who is refused asks first and must change nothing; who may asks in a world
 * of their own where the asking writes.
 * @returns the cells that came out otherwise
 */
export async function runRow(
  knex: Knex,
  ask: Asker,
  row: string,
  cells: string,
  shared: World,
  { refusalsAlone = false }: { refusalsAlone?: boolean } = {},
): Promise<Mismatch[]> {
  const expected = cellsOf(row, cells)
  const writes = methodOf(row) !== 'GET'
  const mismatches: Mismatch[] = []
  const check = async (actor: Actor, world: World) => {
    const answer = await askRow(ask, row, world, actor)
    if (!fits(expected[actor], answer))
      mismatches.push({ row, actor, expected: expected[actor], got: answer.status })
  }
  const turnedAway = ACTORS.filter((actor) => refused(expected[actor]))
  const before = writes ? await fingerprint(knex) : ''
  for (const actor of turnedAway) await check(actor, shared)
  const changed = writes && mismatches.length === 0 ? differing(before, await fingerprint(knex)) : ''
  if (changed !== '') throw new Error(`${row} was refused and changed something all the same: ${changed}`)
  if (refusalsAlone) return mismatches
  for (const actor of ACTORS.filter((name) => !turnedAway.includes(name)))
    await check(actor, writes ? await makeWorld(knex) : shared)
  return mismatches
}

export const told = (mismatches: readonly Mismatch[]): string[] =>
  mismatches.map(({ row, actor, expected, got }) => `${row} as ${actor}: ${got}, not ${expected}`)
