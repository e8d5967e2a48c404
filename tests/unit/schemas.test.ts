import { describe, expect, it } from 'vitest'
import {
  comparisonQuerySchema,
  createVesselSchema,
  isolationInputSchema,
  nightsQuerySchema,
  queryInstantSchema,
  registerLoggerSchema,
  spanQuerySchema,
  systemInputSchema,
  traceQuerySchema,
} from '@/shared/schemas'

describe('instants', () => {
  it('take any offset, also one whose plus was read as a space', () => {
    expect(queryInstantSchema.parse('2026-12-01T10:00:00Z')).toBe('2026-12-01T10:00:00Z')
    expect(queryInstantSchema.parse('2026-12-01T10:00:00 02:00')).toBe('2026-12-01T10:00:00+02:00')
  })
  it('need an offset', () => {
    expect(queryInstantSchema.safeParse('2026-12-01T10:00:00').success).toBe(false)
    expect(queryInstantSchema.safeParse('yesterday').success).toBe(false)
  })
})

describe('queries', () => {
  it('give lists 200 items unless told, and never more than 5,000', () => {
    expect(spanQuerySchema.parse({}).limit).toBe(200)
    expect(spanQuerySchema.parse({ limit: '5000' }).limit).toBe(5000)
    expect(spanQuerySchema.safeParse({ limit: '5001' }).success).toBe(false)
    expect(spanQuerySchema.safeParse({ limit: '0' }).success).toBe(false)
  })
  it('ask for a trace of 1,200 points unless told, at most 4,000, forwards in time', () => {
    const span = { from: '2026-01-01T00:00:00Z', to: '2026-02-01T00:00:00Z' }
    expect(traceQuerySchema.parse(span).points).toBe(1200)
    expect(traceQuerySchema.safeParse({ ...span, points: '4001' }).success).toBe(false)
    expect(traceQuerySchema.safeParse({ from: span.to, to: span.from }).success).toBe(false)
  })
  it('compare two spans or name a visit, not both and not half', () => {
    const span = '2026-01-01T00:00:00Z/2026-01-02T00:00:00Z'
    expect(comparisonQuerySchema.parse({ before: span, after: span }).before).toEqual({
      from: '2026-01-01T00:00:00Z',
      to: '2026-01-02T00:00:00Z',
    })
    expect(comparisonQuerySchema.safeParse({ visit: '7' }).success).toBe(true)
    expect(comparisonQuerySchema.safeParse({ before: span }).success).toBe(false)
    expect(comparisonQuerySchema.safeParse({ before: span, after: span, visit: '7' }).success).toBe(false)
    expect(comparisonQuerySchema.safeParse({ before: 'a/b', after: span }).success).toBe(false)
  })
  it('list systems by commas', () => {
    expect(nightsQuerySchema.parse({ systems: '1,22,3' })).toMatchObject({
      systems: ['1', '22', '3'],
      nights: 7,
    })
    expect(nightsQuerySchema.safeParse({ systems: '1,x' }).success).toBe(false)
    expect(nightsQuerySchema.safeParse({ systems: '' }).success).toBe(false)
  })
})

describe('set-up', () => {
  it('takes a vessel with no more than a name and a zone', () => {
    expect(createVesselSchema.parse({ name: ' Petrel ', timeZone: 'Europe/London' }).name).toBe('Petrel')
  })
  it('refuses quiet hours that begin as they end, and times that are none', () => {
    const vessel = { name: 'Petrel', timeZone: 'Europe/London' }
    const quiet = (start: string, end: string) =>
      createVesselSchema.safeParse({ ...vessel, quietHours: { start, end } }).success
    expect(quiet('22:00', '07:00')).toBe(true)
    expect(quiet('22:00', '22:00')).toBe(false)
    expect(quiet('24:00', '07:00')).toBe(false)
    expect(quiet('7:00', '22:00')).toBe(false)
  })
  it('wants the cut-out above the cut-in and the limit within the aim', () => {
    expect(systemInputSchema.safeParse({ cutOutPa: 33_864, cutInPa: 27_091 }).success).toBe(true)
    expect(systemInputSchema.safeParse({ cutOutPa: 27_091, cutInPa: 33_864 }).success).toBe(false)
    expect(systemInputSchema.safeParse({ limitSeconds: 20_000, aimSeconds: 10_000 }).success).toBe(false)
  })
  it('draws parts with keys of their own, and parents among them', () => {
    const tank = { key: 'tank', kind: 'tank', name: 'Tank', volumeM3: 0.04 }
    const head = { key: 'fwd', kind: 'head', name: 'Forward head', parent: 'tank' }
    expect(systemInputSchema.safeParse({ parts: [tank, head] }).success).toBe(true)
    expect(systemInputSchema.safeParse({ parts: [tank, tank] }).success).toBe(false)
    expect(systemInputSchema.safeParse({ parts: [head] }).success).toBe(false)
    expect(systemInputSchema.safeParse({ parts: [{ ...tank, parent: 'tank' }] }).success).toBe(false)
  })
  it('registers loggers that measure the pump or the vacuum', () => {
    const logger = (channels: string[]) =>
      registerLoggerSchema.safeParse({ serial: 'MW-1', intervalSeconds: 60, channels }).success
    expect(logger(['pump'])).toBe(true)
    expect(logger(['vacuum', 'air'])).toBe(true)
    expect(logger(['air'])).toBe(false)
    expect(logger(['pump', 'pump'])).toBe(false)
    expect(logger([])).toBe(false)
  })
})

describe('isolation', () => {
  it('names only parts that there are', () => {
    const parts = [{ key: 'a', kind: 'head', volumeM3: 0.01 }]
    const test = (names: string[]) => ({ parts: names, startPa: 30_000, endPa: 29_000, seconds: 600 })
    expect(isolationInputSchema.safeParse({ parts, tests: [test(['a'])] }).success).toBe(true)
    expect(isolationInputSchema.safeParse({ parts, tests: [test(['b'])] }).success).toBe(false)
    expect(
      isolationInputSchema.safeParse({ parts, tests: [], possible: [{ parts: ['b'], minutes: 5 }] }).success,
    ).toBe(false)
  })
})
