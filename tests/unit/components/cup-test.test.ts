import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { CupTestForm } from '@/components/tonight/cup-test-form'
import { CupTestPast } from '@/components/tonight/cup-test-past'
import { CupTestRunning } from '@/components/tonight/cup-test-running'
import type { CupTestResult, System } from '@/shared/schemas'

const NOW = Date.parse('2026-08-02T22:40:00Z')
const test: CupTestResult = {
  id: '7',
  partKey: 'forward',
  headName: 'Forward head',
  waterAt: '2026-08-02T22:04:00Z',
  flushedAt: null,
  open: true,
  verdict: null,
  sentence: 'Not told yet: about 18 more minutes without a flush.',
  minutesLeft: 18,
  before: null,
  wet: null,
  after: null,
}
const part = (key: string, kind: 'head' | 'pump', name: string) => ({
  key,
  kind,
  name,
  volumeM3: null,
  parent: null,
})
const system = (parts: System['parts']): System => ({
  id: '3',
  name: 'Main',
  state: 'tight',
  settings: {
    kind: 'pass-through',
    cutOutPa: null,
    cutInPa: null,
    limitSeconds: 10_800,
    aimSeconds: 28_800,
    silenceSeconds: 21_600,
    pumpAmps: null,
    lowSupplyV: null,
    inForceFrom: '2026-01-01T00:00:00Z',
  },
  statement: null,
  parts,
  logger: null,
})
const changed = () => undefined
const running = (shown: CupTestResult): string =>
  renderToStaticMarkup(
    createElement(CupTestRunning, { test: shown, systemId: '3', offsetSeconds: 3600, nowMs: NOW, changed }),
  )
const form = (parts: System['parts']): string =>
  renderToStaticMarkup(createElement(CupTestForm, { system: system(parts), changed }))

describe('the cup test on the page', () => {
  it('says by the boat’s clock when the water went in, and how long to wait, where it is read out', () => {
    const html = running(test)
    expect(html).toContain('Water in at 23:04')
    expect(html).toMatch(/role="status"[^>]*>Not told yet: about 18 more minutes/)
    expect(html).toContain('No water went in: take it back')
    expect(running({ ...test, flushedAt: '2026-08-02T22:39:00Z' })).toContain('flushed at 23:39')
  })

  it('offers the heads of the drawing and another bowl, and nothing else of it', () => {
    const html = form([part('forward', 'head', 'Forward head'), part('pump', 'pump', 'Pump')])
    expect(html).toContain('Forward head')
    expect(html).toContain('Another bowl')
    expect(html).not.toContain('>Pump')
    expect(html).not.toContain('What you call that bowl')
  })

  it('asks for a name where no head is drawn', () => {
    expect(form([])).toContain('What you call that bowl')
  })

  it('gives every control the height of a finger', () => {
    const html = form([part('forward', 'head', 'Forward head')]) + form([]) + running(test)
    const controls = html.match(/<(button|label(?= class="flex)|input(?! type="radio"))[^>]*>/g) ?? []
    expect(controls.length).toBeGreaterThanOrEqual(5)
    expect(controls.filter((tag) => !tag.includes('min-h-11'))).toEqual([])
  })

  it('lists what was done before, and is silent without any', () => {
    const past = (tests: CupTestResult[]) =>
      renderToStaticMarkup(createElement(CupTestPast, { tests, offsetSeconds: 3600, nowMs: NOW }))
    expect(past([test])).toContain('Forward head, 23:04')
    expect(past([])).toBe('')
  })
})
