import { existsSync, readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import { ACTORS, cellsOf, fits } from '../support/access/actors'
import { askingServer, cookieOf, type Asker } from '../support/access/ask'
import {
  otherEntriesOnDisk,
  pagesOnDisk,
  routesOnDisk,
  type FoundRoute,
  type Method,
} from '../support/access/discover'
import { HANDLERS, PAGES } from '../support/access/matrix'
import { PAGE_PATHS, REQUESTS } from '../support/access/requests'
import { runRow, told } from '../support/access/run-matrix'
import { makeWorld, type World } from '../support/access/world'
import { serverUrl } from '../support/client'
import { serverDatabase } from '../support/database'

/*
 * Every route handler and every page, found on disk, asked over HTTP by everybody there is: who may, who sees without
 * the right (403), who may not see (404), who is not signed in (401, pages: sent to sign in).
 */

const ROOT = path.resolve(import.meta.dirname, '../..')
const plain = (row: string): string => row.split(' · ')[0] ?? row

let database: Knex
let world: World
let ask: Asker
let routes: FoundRoute[]
beforeAll(async () => {
  database = serverDatabase()
  world = await makeWorld(database)
  ask = askingServer(serverUrl())
  routes = await routesOnDisk()
})
afterAll(() => database.destroy())

/** The methods of a route that do something: the others answer 405, whoever asks. */
async function taken(route: FoundRoute): Promise<Method[]> {
  const methods = Object.keys(route.handlers) as Method[] // its keys are those
  const answers = await Promise.all(
    methods.map(async (method) => {
      const address = route.address.replaceAll(/\{\w+\}/g, '1')
      if (route.address === '/api/auth/{nextauth}') return method
      const { status } = await ask(method, { path: address, body: method === 'GET' ? undefined : {} }, '')
      return status === 405 ? null : method
    }),
  )
  return answers.flatMap((method) => (method === null ? [] : [method]))
}

describe('the matrix', () => {
  it('has a row for every handler on disk, and no other', async () => {
    const onDisk: string[] = []
    for (const route of routes)
      for (const method of await taken(route)) onDisk.push(`${method} ${route.address}`)
    const declared = [...new Set(Object.keys(HANDLERS).map(plain))]
    expect(onDisk.length).toBeGreaterThan(80)
    expect({
      undeclared: onDisk.filter((name) => !declared.includes(name)),
      gone: declared.filter((name) => !onDisk.includes(name)),
    }).toEqual({ undeclared: [], gone: [] })
  })

  it('has a row for every page on disk, and no other', () => {
    const onDisk = pagesOnDisk().map((page) => page.address)
    expect({
      undeclared: onDisk.filter((address) => PAGES[address] === undefined),
      gone: Object.keys(PAGES).filter((address) => !onDisk.includes(address)),
    }).toEqual({ undeclared: [], gone: [] })
  })

  it('says of each row how it is asked', () => {
    expect(Object.keys(REQUESTS).sort()).toEqual(Object.keys(HANDLERS).sort())
    const varying = Object.keys(PAGES).filter((address) => address.includes('{'))
    expect(Object.keys(PAGE_PATHS).sort()).toEqual(varying.sort())
    for (const [name, row] of Object.entries({ ...HANDLERS, ...PAGES })) cellsOf(name, row)
  })

  it('knows every door: no server actions, no pages of the older kind, no files that Next calls by itself', () => {
    expect(otherEntriesOnDisk()).toEqual([])
    for (const name of ['pages', 'src', 'middleware.ts', 'middleware.js'])
      expect(existsSync(path.join(ROOT, name)), name).toBe(false)
    for (const folder of ['app', 'components', 'lib', 'ingest'])
      for (const entry of readdirSync(path.join(ROOT, folder), { recursive: true, withFileTypes: true })) {
        if (!/\.(ts|tsx|js|mjs)$/.test(entry.name)) continue
        const source = readFileSync(path.join(entry.parentPath, entry.name), 'utf8')
        expect(/^\s*['"]use server['"]/m.test(source), entry.name).toBe(false)
      }
  })
})

describe('handlers', () => {
  for (const [row, cells] of Object.entries(HANDLERS))
    it(row, async () => {
      expect(told(await runRow(database, ask, row, cells, world))).toEqual([])
    })
})

describe('pages', () => {
  for (const [address, row] of Object.entries(PAGES))
    it(address, async () => {
      const expected = cellsOf(address, row)
      const wrong: string[] = []
      for (const actor of ACTORS) {
        const page = PAGE_PATHS[address]?.(world) ?? address
        const answer = await ask('GET', { path: page }, cookieOf(world, actor))
        if (!fits(expected[actor], answer))
          wrong.push(`${actor}: ${answer.status} ${answer.location ?? ''}, not ${expected[actor]}`)
        const mayNot = expected[actor] === '404' || expected[actor] === 'in'
        if (mayNot && answer.text.includes(world.marker))
          wrong.push(`${actor} is shown something of the boat`)
        // What a click in the browser asks for, which may leave layouts out.
        const click = await ask('GET', { path: page, headers: { rsc: '1' } }, cookieOf(world, actor))
        if (mayNot && click.text.includes(world.marker)) wrong.push(`${actor} is shown it by a click`)
      }
      expect(wrong).toEqual([])
    })
})
