import { describe, expect, it } from 'vitest'
import { timeLabels, timeSplits } from '@/components/charts/time-axis'
import {
  ago,
  clock,
  clockOfMinute,
  dayAndClock,
  dayOf,
  dayOfDate,
  offsetAt,
  span,
  until,
} from '@/components/time'

const at = (text: string) => Date.parse(text)

describe('times as on board', () => {
  it('adds the offset that is given, whatever zone the reader is in', () => {
    expect(clock('2026-12-02T03:40:00Z', -4 * 3600)).toBe('23:40')
    expect(clock('2026-12-02T03:40:30Z', 5.75 * 3600, true)).toBe('09:25:30')
  })
  it('takes the offset in force at the instant', () => {
    const offsets = [
      { from: '2026-10-01T00:00:00Z', seconds: 7200 },
      { from: '2026-10-25T01:00:00Z', seconds: 3600 },
    ]
    expect(offsetAt(offsets, at('2026-10-25T00:59:59Z'))).toBe(7200)
    expect(offsetAt(offsets, at('2026-10-25T01:00:00Z'))).toBe(3600)
    expect(offsetAt(offsets, at('2020-01-01T00:00:00Z'))).toBe(7200)
    expect(offsetAt([], 0)).toBe(0)
  })
  it('says the day when it is not today, and the date when it is far', () => {
    const now = at('2026-12-01T22:40:00Z')
    expect(dayAndClock('2026-12-01T20:00:00Z', 0, now)).toBe('20:00')
    expect(dayAndClock('2026-11-30T20:00:00Z', 0, now)).toBe('Mon 20:00')
    expect(dayAndClock('2026-11-20T20:00:00Z', 0, now)).toBe('Fri 20 Nov, 20:00')
    expect(dayAndClock('2025-11-20T20:00:00Z', 0, now)).toBe('Thu 20 Nov 2025, 20:00')
  })
  it('knows a calendar date and a minute of a night', () => {
    expect(dayOfDate('2026-12-01')).toBe('Tue 1 Dec')
    expect(dayOf(0, 0)).toBe('Thu 1 Jan')
    expect(clockOfMinute(0)).toBe('18:00')
    expect(clockOfMinute(420)).toBe('01:00')
    expect(clockOfMinute(960)).toBe('10:00')
    expect(clockOfMinute(-30)).toBe('17:30')
  })
  it('says how long ago and how soon in the unit that fits', () => {
    expect(span(59.7)).toBe('1 min')
    expect(span(3599)).toBe('1 h')
    expect(span(9 * 3600)).toBe('9 h')
    expect(span(12 * 86_400)).toBe('12 days')
    expect(ago(0, 4_000)).toBe('now')
    expect(ago(0, 120_000)).toBe('2 min ago')
    expect(until(7_200_000, 0)).toBe('in 2 h')
  })
})

describe('the time axis', () => {
  const local = (seconds: number, offset: number) => new Date((seconds + offset) * 1000).toISOString()
  it('stands on round times of the boat’s own clock, also where the offset is not a whole hour', () => {
    const offset = 5.75 * 3600
    const from = at('2026-12-01T00:00:00Z') / 1000
    for (const split of timeSplits(from, from + 86_400, [{ from: 0, seconds: offset }], 8))
      expect(local(split, offset)).toMatch(/T(00|03|06|09|12|15|18|21):00:00/)
  })
  it('keeps to local midnight across a clock change', () => {
    const offsets = [
      { from: 0, seconds: 7200 },
      { from: '2026-10-25T01:00:00Z', seconds: 3600 },
    ]
    const from = at('2026-10-23T00:00:00Z') / 1000
    const splits = timeSplits(from, from + 5 * 86_400, offsets, 6)
    expect(splits.length).toBeGreaterThanOrEqual(4)
    for (const split of splits) expect(local(split, offsetAt(offsets, split * 1000))).toMatch(/T00:00:00/)
  })
  it('goes from seconds to months without crowding', () => {
    for (const length of [3, 60, 3600, 86_400, 14 * 86_400, 365 * 86_400]) {
      const splits = timeSplits(1_780_000_000, 1_780_000_000 + length, [], 8)
      expect(splits.length).toBeGreaterThanOrEqual(2)
      expect(splits.length).toBeLessThanOrEqual(10)
      expect(timeLabels(splits, [])).toHaveLength(splits.length)
    }
  })
  it('names the day under the first mark and at each midnight', () => {
    const from = at('2026-11-30T18:00:00Z') / 1000
    expect(timeLabels(timeSplits(from, from + 12 * 3600, [], 4), [])).toEqual([
      '18:00\nMon 30 Nov',
      '21:00',
      '00:00\nTue 1 Dec',
      '03:00',
      '06:00',
    ])
  })
})
