import { describe, expect, it } from 'vitest'
import { evidenceLines } from '@/components/notices/evidence'
import { holdEvidence, stripEvidence } from '@/components/notices/evidence-shapes'
import { noticesFinding } from '@/components/notices/finding'
import { isCurrent, navigationOf } from '@/components/shell/navigation'
import { parseTheme, parseUnits, unitsText } from '@/components/shell/preferences'
import { homeOf } from '@/components/shell/viewer'
import { safeNext } from '@/components/sign-in/safe-next'
import { storyNights } from '@/components/home/story'
import { withQuery } from '@/components/data/request'
import { notice } from './fixtures'

describe('where each role may go', () => {
  const places = (roles: ('owner' | 'manager')[]) =>
    navigationOf({ name: 'A', roles }, false).map((item) => item.href)
  it('starts owners at tonight and the shop at the fleet', () => {
    expect(places(['owner'])).toContain('/tonight')
    expect(places(['owner'])).not.toContain('/fleet')
    expect(places(['manager'])).toContain('/fleet')
    expect(places(['manager'])).not.toContain('/tonight')
    expect(places(['owner', 'manager'])).toEqual(expect.arrayContaining(['/fleet', '/tonight']))
    expect(homeOf({ name: 'A', roles: ['owner'] })).toBe('/tonight')
    expect(homeOf({ name: 'A', roles: ['owner', 'manager'] })).toBe('/fleet')
  })
  it('shows the outbox in the demo alone', () => {
    expect(navigationOf(null, false).map((item) => item.href)).not.toContain('/outbox')
    expect(navigationOf(null, true).map((item) => item.href)).toContain('/outbox')
  })
  it('knows which place a page is in', () => {
    expect(isCurrent('/', '/tonight')).toBe(false)
    expect(isCurrent('/fleet', '/vessels/7/record')).toBe(true)
    expect(isCurrent('/notices', '/notices')).toBe(true)
  })
})

describe('after signing in', () => {
  it('goes to a path of our own and nowhere else', () => {
    expect(safeNext('/vessels/7?system=2')).toBe('/vessels/7?system=2')
    expect(safeNext('http://127.0.0.1:3000/fleet')).toBe('/fleet')
    for (const bad of [
      '//elsewhere.example',
      '/\\elsewhere.example',
      'javascript:alert(1)',
      '/sign-in',
      '',
      undefined,
    ])
      expect(safeNext(bad)).toBeNull()
  })
})

describe('what a reader chose', () => {
  it('comes back from its cookie, part by part', () => {
    const units = { vacuum: 'kPa', temperature: 'F', volume: 'usGal' } as const
    expect(parseUnits(unitsText(units))).toEqual(units)
    expect(parseUnits('furlong.F')).toEqual({ vacuum: 'inHg', temperature: 'F', volume: 'L' })
    expect(parseTheme('night')).toBe('night')
    expect(parseTheme('dusk')).toBe('system')
  })
})

describe('notices', () => {
  it('are summed up', () => {
    expect(noticesFinding([])).toBe('Nothing stands open.')
    expect(noticesFinding([notice()])).toBe('Short hold on Saltmarsh Hare, not seen yet.')
    const seen = notice({ id: '2', acknowledgedAt: '2026-12-01T13:00:00Z' })
    expect(noticesFinding([notice(), seen])).toBe('2 stand open on 1 boat, 1 not seen yet.')
  })
  it('show their evidence with its units', () => {
    const lines = evidenceLines(
      {
        holdSeconds: 5040,
        leakPaPerHour: 2743,
        chance: 0.98,
        supplyV: 11.2,
        nested: {},
        at: '2026-12-01T00:00:00Z',
      },
      'inHg',
    )
    expect(lines).toEqual([
      { name: 'Hold', value: '1.4 h' },
      { name: 'Leak', value: '0.81 inHg/h' },
      { name: 'Chance', value: '98 %' },
      { name: 'Supply', value: '11.2 V' },
    ])
  })
})

describe('the story of the first page', () => {
  it('grows worse until the repair and is quiet after it', () => {
    const runs = storyNights().map(({ night }) => night.runs.filter((m) => m >= 240 && m < 780).length)
    expect(runs.slice(0, 7)).toEqual([...runs.slice(0, 7)].sort((a, b) => a - b))
    expect(runs.slice(7)).toEqual([0, 0])
  })
})

describe('an address with its query', () => {
  it('leaves out what is not said', () => {
    expect(withQuery('/api/x', { a: 1, b: undefined, c: '' })).toBe('/api/x?a=1')
    expect(withQuery('/api/x', {})).toBe('/api/x')
  })
})

describe('the evidence that is drawn', () => {
  it('is a night where one was foretold, a hold time where one is held against a limit, else nothing', () => {
    expect(stripEvidence({ strip: { quiet: [240, 780], expected: [300] } })?.expected).toEqual([300])
    expect(stripEvidence({ strip: { quiet: [240] } })).toBeNull()
    expect(holdEvidence({ holdSeconds: 5040, limitSeconds: 7200 })?.limitSeconds).toBe(7200)
    expect(holdEvidence({ airC: 2 })).toBeNull()
  })
})
