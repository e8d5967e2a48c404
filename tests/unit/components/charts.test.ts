import { renderToStaticMarkup } from 'react-dom/server'
import { createElement } from 'react'
import { describe, expect, it } from 'vitest'
import { quietSpans } from '@/components/charts/annotations'
import { axisMinutes } from '@/components/charts/night-axis'
import { NightStrip, stripWords } from '@/components/charts/night-strip'
import { holdPosition, inQuiet, linearTicks, logPosition, tickPath } from '@/components/charts/scales'

describe('the hold scale', () => {
  it('runs from a minute to two days and holds what lies beyond to its ends', () => {
    expect(holdPosition(60)).toBe(0)
    expect(holdPosition(172_800)).toBe(1)
    expect(holdPosition(1)).toBe(0)
    expect(holdPosition(Infinity)).toBe(1)
    expect(holdPosition(Number.NaN)).toBe(0)
  })
  it('is logarithmic', () => {
    expect(logPosition(100, 10, 1000)).toBeCloseTo(0.5, 12)
    expect(holdPosition(3600) - holdPosition(360)).toBeCloseTo(holdPosition(36_000) - holdPosition(3600), 12)
  })
})

describe('a linear axis', () => {
  it('steps by 1, 2 or 5', () => {
    expect(linearTicks(0, 10, 5)).toEqual([0, 2, 4, 6, 8, 10])
    expect(linearTicks(0, 0.047, 5)).toEqual([0, 0.01, 0.02, 0.03, 0.04])
    expect(linearTicks(3, 3)).toEqual([3])
  })
})

describe('the night strip', () => {
  const quiet = [240, 780] as const
  it('holds the start of the quiet hours in and their end out', () => {
    expect(inQuiet(240, quiet)).toBe(true)
    expect(inQuiet(780, quiet)).toBe(false)
  })
  it('draws every tick in one path, and none beyond the strip', () => {
    expect(tickPath([60, 61.4, -1, 961], 2, 20)).toBe('M60 2V20M61 2V20')
  })
  it('says what it shows', () => {
    expect(stripWords({ quiet, runs: [], flushes: [80, 200] })).toBe('quiet; 2 flushes')
    expect(stripWords({ quiet, runs: [100, 340, 420], flushes: [] })).toBe('2 runs by itself, first at 23:40')
    expect(stripWords({ quiet, runs: [], flushes: [], expected: [355, 439] })).toBe(
      'no run by itself yet; 2 runs expected, first about 23:55',
    )
  })
  it('is an unbroken band on a quiet night, with the sentence for those who cannot see it', () => {
    const html = renderToStaticMarkup(createElement(NightStrip, { night: { quiet, runs: [], flushes: [] } }))
    expect(html).not.toContain('<path')
    expect(html).toContain('aria-label="quiet"')
    expect(html).toContain('x="240" width="540"')
  })
  it('tells a run, a flush and an expected run apart by form, and a calm boat’s run by ink', () => {
    const night = { quiet, runs: [300], flushes: [400], expected: [500] }
    const html = renderToStaticMarkup(createElement(NightStrip, { night, height: 20 }))
    expect(html).toContain('d="M300 1.4V18.6"')
    expect(html).toContain('d="M400 12V18.6"')
    expect(html).toMatch(/stroke-dasharray="3.5 3"/)
    expect(html).toContain('var(--tick-run-quiet)')
    expect(renderToStaticMarkup(createElement(NightStrip, { night, calm: true }))).toContain(
      'var(--tick-calm-quiet)',
    )
  })
  it('names hours without letting their labels touch', () => {
    expect(axisMinutes([240, 780])).toEqual([0, 240, 510, 780, 960])
    expect(axisMinutes([30, 900])).toEqual([30, 465, 900])
  })
})

describe('quiet hours behind a trace', () => {
  const quiet = { start: '22:00', end: '07:00' }
  const at = (text: string) => Date.parse(text)
  it('fall on the boat’s own clock', () => {
    const spans = quietSpans(at('2026-12-01T12:00:00Z'), at('2026-12-02T12:00:00Z'), quiet, [
      { from: 0, seconds: -14_400 },
    ])
    expect(spans).toEqual([{ fromMs: at('2026-12-02T02:00:00Z'), toMs: at('2026-12-02T11:00:00Z') }])
  })
  it('are an hour longer in the night the clock goes back', () => {
    const offsets = [
      { from: 0, seconds: 7200 },
      { from: '2026-10-25T01:00:00Z', seconds: 3600 },
    ]
    const [night] = quietSpans(at('2026-10-24T18:00:00Z'), at('2026-10-25T08:00:00Z'), quiet, offsets)
    expect(night && (night.toMs - night.fromMs) / 3_600_000).toBe(10)
  })
  it('are left out where nobody could see them', () => {
    expect(quietSpans(0, 200 * 86_400_000, quiet, [])).toEqual([])
  })
})
