import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { INTERNAL_PATHS } from '@/lib/api/operations'
import { serverUrl } from '../support/client'

const ROOT = path.resolve(import.meta.dirname, '../..')

interface Document {
  openapi: string
  paths: Record<string, Record<string, { responses: Record<string, unknown>; security?: object[] }>>
}
let document: Document

beforeAll(async () => {
  const answer = await request(serverUrl()).get('/api/openapi.json').expect(200)
  document = answer.body as Document
})

/** Addresses on disk with the methods they handle: `/api/vessels/{id}` → get, patch. */
function routesOnDisk(): Map<string, string[]> {
  const found = new Map<string, string[]>()
  for (const entry of readdirSync(path.join(ROOT, 'app/api'), { recursive: true, withFileTypes: true })) {
    if (entry.name !== 'route.ts') continue
    const folder = path.relative(path.join(ROOT, 'app'), entry.parentPath)
    const address = `/${folder.replaceAll(path.sep, '/').replace(/\[(?:\.\.\.)?(\w+)\]/g, '{$1}')}`
    const source = readFileSync(path.join(entry.parentPath, entry.name), 'utf8')
    const given = source.slice(source.indexOf('= methods({'))
    const names = [...given.matchAll(/^ {2}(GET|POST|PUT|PATCH|DELETE): /gm)].map((match) => match[1] ?? '')
    found.set(address, names.map((name) => name.toLowerCase()).sort())
  }
  return found
}

describe('the OpenAPI document', () => {
  it('describes every address and method that there is, or says on purpose that it does not', () => {
    const routes = routesOnDisk()
    expect(routes.size).toBeGreaterThan(30)
    for (const [address, names] of routes) {
      // Signing in is a library's: its addresses are described one by one.
      if (address === '/api/auth/{nextauth}' || INTERNAL_PATHS.includes(address)) continue
      expect(names.length, `${address} handles nothing that this test can see`).toBeGreaterThan(0)
      expect(Object.keys(document.paths[address] ?? {}).sort(), address).toEqual(names)
    }
  })

  it('describes nothing that there is not', () => {
    const routes = routesOnDisk()
    for (const address of Object.keys(document.paths).filter((name) => !name.startsWith('/api/auth/')))
      expect(routes.has(address), address).toBe(true)
    for (const address of INTERNAL_PATHS) expect(routes.has(address), address).toBe(true)
  })

  it('is of version 3.1, with an answer for each operation and its refusals', () => {
    expect(document.openapi).toMatch(/^3\.1/)
    const trace = document.paths['/api/systems/{id}/trace']?.get
    expect(Object.keys(trace?.responses ?? {})).toEqual(['200', '400', '401', '404'])
    expect(trace?.security).toEqual([{ session: [] }])
    expect(document.paths['/api/leak-down']?.post?.security).toEqual([])
  })
})
