import { describe, expect, it } from 'vitest'
import { expectedMinutes, minuteOf, runsToSay, tonightOf } from '@/components/tonight/night-plan'
import { stripWords } from '@/components/charts/night-strip'
import { drawnOn, finishedNights, withSilence } from '@/components/nights'
import { nightWord } from '@/components/tonight/last-nights'
import { clockChanges } from '@/components/tonight/use-night-offsets'
import { hold, outlook, summary } from './fixtures'

const QUIET = [240, 780] as const

describe('expected runs on tonight’s strip', () => {
  it('counts minutes from the start of the night, so that no zone is needed', () => {
    expect(minuteOf('2026-12-02T02:00:00Z', outlook(), QUIET)).toBe(240)
    expect(minuteOf('2026-12-02T03:55:00Z', outlook(), QUIET)).toBe(355)
  })
  it('puts one every hold time after the first, within the quiet hours', () => {
    expect(expectedMinutes(outlook(), summary(), QUIET)).toEqual([354, 438, 522, 606, 690, 774])
  })
  it('draws none where a run is not likely, and none without an outlook', () => {
    expect(expectedMinutes(outlook({ chanceIfFlushedLast: 0.49 }), summary(), QUIET)).toEqual([])
    expect(expectedMinutes(null, summary(), QUIET)).toEqual([])
  })
  it('draws one alone where the hold time is not known', () => {
    expect(expectedMinutes(outlook(), summary({ holdTime: null }), QUIET)).toEqual([355])
  })
  it('never draws more than the strip can show', () => {
    const many = expectedMinutes(outlook({ expectedRuns: 5000 }), summary({ holdTime: hold(0.02) }), QUIET)
    expect(many.length).toBeLessThanOrEqual(200)
  })
  it('says at least one run where one is likely', () => {
    expect(runsToSay(outlook({ expectedRuns: 0.3 }), summary({ holdTime: null }))).toBe(1)
    expect(runsToSay(outlook({ expectedRuns: 0.3 }), summary({ holdTime: hold(20) }))).toBe(1)
  })
  it('says as many as a night after a flush last thing has, while people are up', () => {
    expect(runsToSay(outlook({ expectedRuns: 5 }), summary())).toBe(6)
  })
})

describe('tonight among the listed nights', () => {
  const night = (date: string) => ({
    date,
    quiet: [240, 780] as [number, number],
    runs: [300],
    flushes: [],
    more: 0,
  })
  it('is the last one when it has begun', () => {
    expect(tonightOf([night('2026-11-30'), night('2026-12-01')], outlook(), -14_400)?.runs).toEqual([300])
  })
  it('is empty, with the same quiet hours, while the list still ends with the night before', () => {
    expect(tonightOf([night('2026-11-30')], outlook(), -14_400)).toEqual({
      date: '2026-12-01',
      quiet: [240, 780],
      runs: [],
      flushes: [],
      more: 0,
    })
  })
  it('is nothing when nothing was heard', () => {
    expect(tonightOf([], outlook(), 0)).toBeNull()
  })
})

describe('a night whose clock changes', () => {
  const quiet = { start: '22:00', end: '07:00' }
  it('is told by what its end reads', () => {
    const usual = { from: '2026-12-02T02:00:00Z', to: '2026-12-02T11:00:00Z', timeZone: '', hours: 9 }
    expect(clockChanges(usual, quiet, -4 * 3600)).toBe(false)
    expect(clockChanges({ ...usual, to: '2026-12-02T12:00:00Z', hours: 10 }, quiet, -4 * 3600)).toBe(true)
  })
})

describe('the nights that are over', () => {
  const night = (date: string) => ({
    date,
    quiet: [240, 780] as [number, number],
    runs: [],
    flushes: [],
    more: 0,
  })
  const nights = ['2026-11-29', '2026-11-30', '2026-12-01'].map(night)
  const dates = (at: string) => finishedNights(nights, -14_400, Date.parse(at)).map((one) => one.date)
  it('do not hold the one that is to come or under way', () => {
    expect(dates('2026-12-01T22:40:00Z')).toEqual(['2026-11-29', '2026-11-30'])
    expect(dates('2026-12-02T10:59:00Z')).toEqual(['2026-11-29', '2026-11-30'])
    expect(dates('2026-12-02T11:00:00Z')).toEqual(['2026-11-29', '2026-11-30', '2026-12-01'])
  })
})

describe('a night whose list was cut short', () => {
  const night = {
    date: '2026-12-01',
    quiet: [240, 780] as [number, number],
    runs: [200, 210, 220],
    flushes: [],
    more: 100,
  }
  it('is drawn on at the pace of what was listed, to the morning', () => {
    const drawn = drawnOn(night)
    expect(drawn.runs.slice(0, 5)).toEqual([200, 210, 220, 230, 240])
    expect(drawn.runs[drawn.runs.length - 1]).toBe(960)
    expect(nightWord(night)).toBe('c. 54 runs')
  })
  it('is left alone when nothing is missing', () => {
    expect(drawnOn({ ...night, more: 0 }).runs).toEqual([200, 210, 220])
    expect(nightWord({ ...night, more: 0, runs: [200, 300] })).toBe('1 run')
    expect(nightWord({ ...night, more: 0, runs: [] })).toBe('quiet')
  })
})

describe('a night in which the logger fell silent', () => {
  const night = { date: '2026-11-30', quiet: [240, 780] as [number, number], runs: [], flushes: [], more: 0 }
  const since = (lastHeardAt: string | null) => withSilence(night, lastHeardAt, -14_400)
  it('is not called quiet', () => {
    expect(since('2026-12-01T04:00:00Z').unheardFrom).toBe(360)
    expect(nightWord(since('2026-12-01T04:00:00Z'))).toBe('unheard')
    expect(since('2026-11-20T04:00:00Z').unheardFrom).toBe(0)
    expect(since(null).unheardFrom).toBe(0)
    expect(stripWords(since('2026-12-01T04:00:00Z'))).toBe('quiet; not heard after 00:00')
    expect(stripWords(since(null))).toBe('not heard')
  })
  it('is whole when the last word came after its quiet hours', () => {
    expect(since('2026-12-01T11:30:00Z').unheardFrom).toBeUndefined()
  })
})
