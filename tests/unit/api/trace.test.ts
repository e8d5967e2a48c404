import { describe, expect, it } from 'vitest'
import type { TraceBucket } from '@/db/queries/trace'
import { gapMs, traceChannels } from '@/lib/reading/trace-channels'
import { traceResolutionMs } from '@/lib/reading/trace-resolution'

const HOUR = 3_600_000
const DAY = 24 * HOUR

describe('the width of a bucket', () => {
  it('is the finest readable one whose buckets are few enough', () => {
    const from = Date.UTC(2026, 0, 1)
    expect(traceResolutionMs(from, from + DAY, 1200)).toBe(120_000)
    expect(traceResolutionMs(from, from + 365 * DAY, 1200)).toBe(8 * HOUR)
    expect(traceResolutionMs(from, from + 60_000, 1200)).toBe(100)
  })
  it('never makes more buckets than points, wherever the span begins', () => {
    for (const points of [1, 2, 7, 100, 1200, 4000])
      for (const span of [1000, 61_234, HOUR, 3.3 * DAY, 400 * DAY, 4000 * DAY])
        for (const shift of [0, 1, 1234.5, 59_999, 0.77 * DAY]) {
          const from = Date.UTC(2026, 5, 1) + shift
          const width = traceResolutionMs(from, from + span, points)
          expect(Math.ceil((from + span) / width) - Math.floor(from / width)).toBeLessThanOrEqual(points)
        }
  })
  it('is whole hours from an hour on', () => {
    for (let days = 1; days < 800; days += 3) {
      const width = traceResolutionMs(0, days * DAY, 600)
      if (width >= HOUR) expect(width % HOUR).toBe(0)
    }
  })
})

describe('channels', () => {
  const bucket = (at: number, vacuum: [number, number] | null, air: number | null = null): TraceBucket => ({
    at,
    firstAt: at,
    lastAt: at + 50_000,
    vacuum: vacuum && { min: vacuum[0], max: vacuum[1], mean: (vacuum[0] + vacuum[1]) / 2 },
    air: air === null ? null : { min: air, max: air, mean: air },
    barometer: null,
    supply: null,
  })
  it('keep extremes, and leave out what was never measured', () => {
    const { vacuum, air } = traceChannels(
      [bucket(0, [30_000.04, 33_000.06]), bucket(60_000, [1, 2])],
      60_000,
      600_000,
    )
    expect(vacuum).toEqual({ at: [0, 60_000], min: [30_000, 1], max: [33_000.1, 2], mean: [31_500.1, 1.5] })
    expect(air).toBeUndefined()
  })
  it('show a gap as one bucket of nulls after the last reading', () => {
    const far = 100 * 60_000
    const { vacuum } = traceChannels([bucket(0, [1, 2]), bucket(far, [3, 4])], 60_000, 600_000)
    expect(vacuum?.at).toEqual([0, 60_000, far])
    expect(vacuum?.mean).toEqual([1.5, null, 3.5])
  })
  it('show none where readings are merely further apart than buckets', () => {
    const { vacuum } = traceChannels([bucket(0, [1, 2]), bucket(5 * 60_000, [3, 4])], 60_000, 600_000)
    expect(vacuum?.at).toEqual([0, 5 * 60_000])
  })
  it('tell gaps of each channel apart', () => {
    const { vacuum, air } = traceChannels(
      [bucket(0, [1, 2], 20), bucket(600_000, [1, 2]), bucket(1_200_000, [1, 2], 21)],
      60_000,
      600_000,
    )
    expect(vacuum?.min).toEqual([1, 1, 1])
    expect(air?.min).toEqual([20, null, 21])
  })
  it('call a gap what interrupts a hold: ten minutes, or five rhythms', () => {
    expect(gapMs(1)).toBe(600_000)
    expect(gapMs(600)).toBe(3_000_000)
  })
})
