import { describe, expect, it } from 'vitest'
import { check, possibleSerials, type CheckAgainst } from '@/ingest/check'
import { clockOffsetSeconds, shiftSeconds } from '@/ingest/clock'
import { readTime } from '@/ingest/parse-csv'
import { CHANNELS, RecordColumns, reasonCode, takeValue, type Channel } from '@/ingest/records'

const NOW_MS = Date.UTC(2026, 10, 20, 12)
const against: CheckAgainst = {
  receiptMs: NOW_MS,
  offsetSeconds: 0,
  shiftSeconds: 0,
  sealed: [],
  otherLoggers: new Set(),
}
const columnsOf = (
  entries: [index: number, atMs: number, channel: Channel, value: number, relative?: boolean][],
) => {
  const columns = new RecordColumns()
  for (const [index, at, channel, value, relative = false] of entries)
    columns.push(index, at, relative, CHANNELS.indexOf(channel), value, 0)
  return columns
}

describe('check', () => {
  it('sorts by time and keeps the upload’s order within one time', () => {
    const { batch } = check(
      columnsOf([
        [0, NOW_MS - 1000, 'vacuum', 2],
        [1, NOW_MS - 2000, 'vacuum', 1],
        [2, NOW_MS - 1000, 'vacuum', 3],
        [3, NOW_MS - 1000, 'air', 18],
      ]),
      against,
    )
    expect([...batch.at]).toEqual([NOW_MS - 2000, NOW_MS - 1000])
    expect([...batch.vacuumPa]).toEqual([1, 2])
    expect([...batch.airC]).toEqual([NaN, 18])
    expect([...batch.conflicting]).toEqual([0, 1])
    expect([...batch.pumpOn]).toEqual([-1, -1])
  })

  it('is empty for nothing', () => {
    expect(check(new RecordColumns(), against)).toMatchObject({
      batch: { count: 0 },
      rejectedSamples: 0,
      rejected: [],
      rejectedRecords: 0,
    })
  })

  it('holds the edges of what is too old, future and sealed', () => {
    const day = 86_400_000
    const { batch, rejected } = check(
      columnsOf([
        [0, NOW_MS - 400 * day, 'vacuum', 1],
        [1, NOW_MS - 400 * day - 1, 'vacuum', 1],
        [2, NOW_MS + 120_000, 'vacuum', 1],
        [3, NOW_MS + 120_001, 'vacuum', 1],
        [4, NOW_MS - 10 * day - 1, 'vacuum', 1],
        [5, NOW_MS - 10 * day, 'vacuum', 1],
      ]),
      { ...against, sealed: [{ fromMs: NOW_MS - 20 * day, toMs: NOW_MS - 10 * day }] },
    )
    expect(rejected).toEqual([
      { index: 1, reason: 'too-old' },
      { index: 3, reason: 'future' },
      { index: 4, reason: 'too-old' },
    ])
    expect(batch.count).toBe(3)
  })

  it('shifts absolute times and not relative ones', () => {
    const { batch } = check(
      columnsOf([
        [0, NOW_MS + 3_600_000, 'vacuum', 1],
        [1, NOW_MS - 5_000, 'vacuum', 2, true],
      ]),
      { ...against, offsetSeconds: 3_600, shiftSeconds: 3_600 },
    )
    expect([...batch.at]).toEqual([NOW_MS - 5_000, NOW_MS])
  })

  it('puts a pack that was sent backwards in order', () => {
    const forward = columnsOf(Array.from({ length: 300 }, (_, i) => [i, NOW_MS - i * 1000, 'vacuum', i]))
    const { batch } = check(forward, against)
    expect([...batch.at]).toEqual([...batch.at].sort((a, b) => a - b))
    expect(batch.vacuumPa[299]).toBe(0)
  })
})

describe('possibleSerials', () => {
  it('finds the words between colon and slash, without the channel', () => {
    const found = possibleSerials(['urn:dev:mw:A-1:vacuum', 'A-2/pump', 'vacuum', 'A-3'])
    expect([...found.keys()]).toEqual(['urn', 'dev', 'mw', 'A-1', 'A-2', 'A-3'])
    expect(found.get('A-2')).toEqual([1])
  })
})

describe('takeValue', () => {
  it('rounds pressure to a tenth and the rest to a hundredth, before judging', () => {
    expect(takeValue(1, 30_000.05)).toEqual({ value: 30_000.1, reason: 0 })
    expect(takeValue(2, 85.004)).toEqual({ value: 85, reason: 0 })
    expect(takeValue(2, 85.006)).toEqual({ value: 85.01, reason: reasonCode('impossible') })
    expect(Object.is(takeValue(2, -0.001).value, 0)).toBe(true)
    expect(takeValue(1, Infinity).reason).toBe(reasonCode('bad-value'))
  })
})

describe('the clock', () => {
  it('is read from the Date header', () => {
    expect(clockOffsetSeconds('Fri, 20 Nov 2026 12:00:05 GMT', NOW_MS + 250)).toBe(4.75)
    expect(clockOffsetSeconds(null, NOW_MS)).toBeNull()
    expect(clockOffsetSeconds('soon', NOW_MS)).toBeNull()
  })

  it('shifts beyond two minutes, by the last shift while the clock stands as it stood', () => {
    expect(shiftSeconds(null, 7200)).toBe(0)
    expect(shiftSeconds(120, 7200)).toBe(0)
    expect(shiftSeconds(120.4, null)).toBe(120)
    expect(shiftSeconds(-7199.6, -7190)).toBe(-7190)
    expect(shiftSeconds(7_300, 7_200)).toBe(7_300)
  })
})

describe('readTime', () => {
  it.each([
    ['1700000000', 1_700_000_000_000],
    ['1700000000.1234', 1_700_000_000_123],
    ['2026-11-20T12:00:00Z', NOW_MS],
    ['2026-11-20t13:00:00.0006+01:00', NOW_MS + 1],
    ['2026-02-28T23:59:60Z', NaN],
    ['2026-02-30T00:00:00Z', NaN],
    ['2026-11-20T12:00:00', NaN],
    ['20.11.2026 12:00', NaN],
    ['', NaN],
  ])('%s', (text, ms) => {
    expect(readTime(text)).toBe(ms)
  })
})
