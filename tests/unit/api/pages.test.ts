import { describe, expect, it } from 'vitest'
import { methods } from '@/lib/api/methods'
import { pageOf } from '@/lib/api/page-of'
import { readForm, readJson, requireOwnOrigin } from '@/lib/api/read-body'
import { listSpan, pageByStart } from '@/lib/reading/list-span'
import { presentState } from '@/lib/fleet/present-state'

describe('a page of a list', () => {
  const items = ['a', 'b', 'c', 'd', 'e']
  const page = (limit: number, cursor?: string) => pageOf(items, { limit, cursor }, (item) => item)
  it('follows its cursor to the end', () => {
    expect(page(2)).toEqual({ items: ['a', 'b'], next: 'b' })
    expect(page(2, 'b')).toEqual({ items: ['c', 'd'], next: 'd' })
    expect(page(2, 'd')).toEqual({ items: ['e'], next: null })
    expect(page(5)).toEqual({ items, next: null })
  })
  it('begins again when the item of the cursor has gone', () => {
    expect(page(2, 'x')).toEqual({ items: ['a', 'b'], next: 'b' })
  })
})

describe('a page by start', () => {
  const at = (hour: number) => ({ startedAt: `2026-12-01T0${hour}:00:00.000Z` })
  const now = new Date('2026-12-02T00:00:00Z')
  it('puts what is open last, on the last page only', () => {
    const span = listSpan({ limit: 2 }, now)
    expect(span.limit).toBe(3)
    expect(pageByStart([at(1), at(2), at(3)], at(4), span)).toEqual({
      items: [at(1), at(2)],
      next: at(2).startedAt,
    })
    expect(pageByStart([at(3)], at(4), { ...span, after: new Date(at(2).startedAt) })).toEqual({
      items: [at(3), at(4)],
      next: null,
    })
  })
  it('leaves out what is open but began outside the span', () => {
    const span = listSpan({ limit: 5, from: at(1).startedAt, to: at(4).startedAt }, now)
    expect(pageByStart([at(1)], at(4), span).items).toEqual([at(1)])
    expect(pageByStart([at(1)], at(3), span).items).toEqual([at(1), at(3)])
  })
  it('refuses a cursor it never gave', () => {
    expect(() => listSpan({ limit: 2, cursor: 'next' }, now)).toThrow(/cursor/)
  })
})

describe('the methods of an address', () => {
  it('refuse the others with problem details and Allow', async () => {
    const { GET, DELETE } = methods({
      GET: async () => new Response('here'),
      PUT: async () => new Response(),
    })
    const context = { params: Promise.resolve({}) }
    expect(await (await GET(new Request('http://x'), context)).text()).toBe('here')
    const refused = await DELETE(new Request('http://x', { method: 'DELETE' }), context)
    expect(refused.status).toBe(405)
    expect(refused.headers.get('allow')).toBe('GET, PUT, HEAD, OPTIONS')
    expect(refused.headers.get('content-type')).toBe('application/problem+json')
  })
})

describe('bodies', () => {
  const post = (body: string, type?: string) =>
    new Request('http://x', { method: 'POST', body, headers: type ? { 'content-type': type } : {} })
  it('are JSON and said to be so', async () => {
    expect(await readJson(post('{"a":1}', 'application/json; charset=utf-8'))).toEqual({ a: 1 })
    await expect(readJson(post('{"a":1}', 'text/plain'))).rejects.toMatchObject({ kind: 'wrong-media-type' })
    await expect(readJson(post('{"a":', 'application/json'))).rejects.toMatchObject({ kind: 'not-parseable' })
  })
  it('may be nothing at all', async () => {
    expect(await readJson(new Request('http://x', { method: 'POST' }))).toEqual({})
  })
  it('stop at a mebibyte', async () => {
    const large = JSON.stringify('x'.repeat(1_100_000))
    await expect(readJson(post(large, 'application/json'))).rejects.toMatchObject({ kind: 'too-large' })
  })
  it('are forms where forms are asked for', async () => {
    expect(await readForm(post('a=1&b=2&a=3', 'application/x-www-form-urlencoded'))).toEqual({
      a: '1',
      b: '2',
    })
    await expect(readForm(post('{}', 'application/json'))).rejects.toMatchObject({ kind: 'wrong-media-type' })
  })
})

describe('the origin of a write', () => {
  const from = (origin: string | null, host = 'watch.example:3000') =>
    new Request('http://watch.example:3000/api', {
      method: 'POST',
      headers: { host, ...(origin === null ? {} : { origin }) },
    })
  it('is ours or absent', () => {
    expect(() => requireOwnOrigin(from(null))).not.toThrow()
    expect(() => requireOwnOrigin(from('http://watch.example:3000'))).not.toThrow()
    for (const other of ['http://watch.example', 'https://elsewhere.example', 'null'])
      expect(() => requireOwnOrigin(from(other))).toThrow()
  })
})

describe('the state now', () => {
  const now = new Date('2026-12-01T12:00:00Z')
  const known = {
    state: 'tight',
    since: new Date('2026-11-01T00:00:00Z'),
    lastHeardAt: new Date('2026-12-01T11:00:00Z'),
    silenceSeconds: 21_600,
    statement: null,
    now,
  }
  const said = (value: 'off' | 'laid-up' | 'worked-on') => ({ value, from: new Date('2026-12-01T10:00:00Z') })
  it('is what the figures say while it is heard', () => {
    expect(presentState(known)).toEqual({ state: 'tight', since: known.since })
  })
  it('is unheard from the silence limit on, whatever else', () => {
    const lastHeardAt = new Date('2026-12-01T05:59:59Z')
    expect(presentState({ ...known, lastHeardAt, statement: said('laid-up') })).toEqual({
      state: 'unheard',
      since: new Date('2026-12-01T11:59:59Z'),
    })
    expect(presentState({ ...known, lastHeardAt: null })).toEqual({ state: 'unheard', since: null })
  })
  it('is what people say before what is measured, but for a pump that runs on', () => {
    expect(presentState({ ...known, statement: said('worked-on') }).state).toBe('worked-on')
    expect(presentState({ ...known, statement: said('off') }).state).toBe('off')
    expect(presentState({ ...known, state: 'running-on', statement: said('off') }).state).toBe('running-on')
  })
  it('is learning where nothing was computed, or what was said is taken back', () => {
    expect(presentState({ ...known, state: null }).state).toBe('learning')
    expect(presentState({ ...known, state: 'laid-up' }).state).toBe('learning')
  })
})
