import { describe, expect, it } from 'vitest'
import type { OpenNotice } from '@/db/queries/notice-writes'
import type { SilentSystem } from '@/db/queries/silence'
import { decide, decidePause } from '@/lib/notices/decide'
import { explainedBy } from '@/lib/notices/group'
import { groupSilence } from '@/lib/notices/group-silence'
import { mutedBy } from '@/lib/notices/mute'
import { absent, unclear, type Finding } from '@/lib/notices/record'

const present: Finding = { is: 'present', severity: 1.5, reason: 'Holds 2 h', evidence: {} }
const FREE = { muted: null, snoozed: false, explainedBy: null } as const

const standing = (changes: Partial<OpenNotice> = {}): OpenNotice => ({
  id: '1',
  systemId: '1',
  vesselId: '1',
  kind: 'short-hold',
  openedAt: new Date('2026-03-01T00:00:00Z'),
  heldSince: null,
  severity: 1.5,
  evidence: {},
  night: null,
  acknowledgedAt: null,
  snoozedUntil: null,
  ...changes,
})

const reasonOf = (...args: Parameters<typeof decide>) => {
  const { action, reason } = decide(...args)
  return `${action}: ${reason}`
}

describe('where nothing stands', () => {
  it('opens what is found, unless something speaks against it', () => {
    expect(reasonOf('short-hold', present, null, FREE)).toBe('open: found')
    expect(reasonOf('short-hold', absent, null, FREE)).toBe('none: nothing-found')
    expect(reasonOf('short-hold', unclear, null, FREE)).toBe('none: nothing-found')
    expect(reasonOf('short-hold', present, null, { ...FREE, muted: 'laid-up' })).toBe('none: still-paused')
    expect(reasonOf('short-hold', present, null, { ...FREE, snoozed: true })).toBe('none: snoozed')
    expect(decide('short-hold', present, null, { ...FREE, explainedBy: 'short-cycling' })).toMatchObject({
      action: 'none',
      reason: 'explained-by-another',
      because: 'short-cycling',
    })
  })
})

describe('where one stands', () => {
  it('is told again when it has grown by half, and not before', () => {
    expect(reasonOf('short-hold', { ...present, severity: 2.24 }, standing(), FREE)).toBe('none: stands')
    expect(reasonOf('short-hold', { ...present, severity: 2.25 }, standing(), FREE)).toBe(
      'worsen: grown-by-half',
    )
    expect(reasonOf('short-hold', { ...present, severity: 9 }, standing(), { ...FREE, snoozed: true })).toBe(
      'none: snoozed',
    )
  })

  it('ends when it is over, snoozed or not; what is unclear stays', () => {
    expect(reasonOf('short-hold', absent, standing(), FREE)).toBe('end: over')
    expect(reasonOf('short-hold', absent, standing(), { ...FREE, snoozed: true })).toBe('end: over')
    expect(reasonOf('short-hold', unclear, standing(), FREE)).toBe('none: stands')
  })

  it('neither grows nor ends while paused, and says once that it pauses and that it goes on', () => {
    const held = standing({ heldSince: new Date('2026-03-02T00:00:00Z') })
    expect(reasonOf('short-hold', absent, standing(), { ...FREE, muted: 'unheard' })).toBe('hold: paused')
    expect(reasonOf('short-hold', absent, held, { ...FREE, muted: 'unheard' })).toBe('none: still-paused')
    expect(reasonOf('short-hold', present, held, FREE)).toBe('resume: heard-again')
    expect(decidePause(held, null).action).toBe('resume')
  })
})

describe('what pauses', () => {
  it('silence and what people say, but frost only by a lay-up', () => {
    expect(mutedBy('short-hold', { unheard: true, statement: 'laid-up' })).toBe('unheard')
    expect(mutedBy('short-hold', { unheard: false, statement: 'worked-on' })).toBe('worked-on')
    expect(mutedBy('short-hold', { unheard: false, statement: null })).toBeNull()
    expect(mutedBy('freeze', { unheard: false, statement: 'off' })).toBeNull()
    expect(mutedBy('freeze', { unheard: false, statement: 'laid-up' })).toBe('laid-up')
  })
})

describe('what explains what', () => {
  it('a sensor that cannot be trusted explains all that is read from it', () => {
    const explained = explainedBy(
      new Map([
        ['sensor-fault', present],
        ['short-cycling', present],
      ]),
    )
    expect(explained.get('short-hold')).toBe('sensor-fault')
    expect(explained.get('low-supply')).toBeUndefined()
  })

  it('nothing absent explains anything', () => {
    expect(explainedBy(new Map([['short-cycling', absent]])).size).toBe(0)
  })
})

describe('silence', () => {
  const silent = (systemId: string, minutes: number, changes: Partial<SilentSystem> = {}): SilentSystem => ({
    systemId,
    vesselId: systemId,
    vesselName: `Boat ${systemId}`,
    harbour: 'Port Averill',
    timeZone: 'Europe/London',
    shopId: '1',
    lastHeardAt: new Date(Date.parse('2026-03-10T06:00:00Z') + minutes * 60_000),
    overdue: minutes < 10,
    noticeId: null,
    covered: false,
    ...changes,
  })
  const told = (systems: SilentSystem[]) =>
    groupSilence(systems).map((news) => `${news.reason} ${news.systems.map((s) => s.systemId).join()}`)

  it('of three in one harbour within the hour is its network, once', () => {
    expect(told([silent('1', 0), silent('2', 20), silent('3', 50)])).toEqual(['harbour-network 1,2,3'])
  })

  it('of two, or of three in other harbours, shops or hours, is each its own', () => {
    expect(told([silent('1', 0), silent('2', 5)])).toEqual(['one-logger 1', 'one-logger 2'])
    expect(told([silent('1', 0), silent('2', 5), silent('3', 6, { harbour: 'Eastmere' })])).toHaveLength(3)
    expect(told([silent('1', 0), silent('2', 5), silent('3', 6, { shopId: '2' })])).toHaveLength(3)
    expect(told([silent('1', -90), silent('2', 0), silent('3', 5)])).toHaveLength(3)
    expect(
      told([silent('1', 0), silent('2', 1), silent('3', 2)].map((s) => ({ ...s, harbour: null }))),
    ).toHaveLength(3)
  })

  it('near the limit alone waits; told already is not news', () => {
    expect(told([silent('1', 30)])).toEqual([])
    expect(
      told([silent('1', 0, { noticeId: '9' }), silent('2', 5, { covered: true }), silent('3', 6)]),
    ).toEqual(['one-logger 3'])
  })
})
