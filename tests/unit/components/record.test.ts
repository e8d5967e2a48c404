import { describe, expect, it } from 'vitest'
import { holdAxis, holdPoints, holdsFinding, holdTickLabel } from '@/components/vessel/record/hold-points'
import { stepMarks, visitMarks } from '@/components/vessel/record/marks'
import {
  byKey,
  heldTo,
  LONGEST_MS,
  panned,
  parseRange,
  SHORTEST_MS,
  zoomed,
} from '@/components/vessel/record/range'
import { traceData, traceFinding } from '@/components/vessel/record/trace-data'
import { meanOfDays, pumpDays, rechargePoints } from '@/components/vessel/pump/pump-days'
import { pumpFinding } from '@/components/vessel/pump/finding'
import { layOut } from '@/components/vessel/set-up/plant-layout'
import { vesselBasis, vesselFinding } from '@/components/vessel/finding'
import { plain } from '@/components/tonight/phrases'
import type { Hold, Part, Run, Trace } from '@/shared/schemas'
import { inHgToPa } from '@/shared/units'
import { NOW, OFFSETS, outlook, summary } from './fixtures'

const HOUR = 3_600_000
const LIMITS = { limitSeconds: 10_800, aimSeconds: 28_800 }

describe('the stretch of a trace', () => {
  const range = { fromMs: NOW - 48 * HOUR, toMs: NOW }
  it('comes closer about the place that is pointed at', () => {
    const closer = zoomed(range, 0.5, 0.25, NOW)
    expect(closer.fromMs).toBe(NOW - 42 * HOUR)
    expect(closer.toMs).toBe(NOW - 18 * HOUR)
  })
  it('goes no closer than a second, no wider than the record, and not into the future', () => {
    let near = range
    for (let turn = 0; turn < 40; turn += 1) near = zoomed(near, 0.5, 0.5, NOW)
    expect(near.toMs - near.fromMs).toBe(SHORTEST_MS)
    const wide = zoomed(range, 1e6, 0.5, NOW)
    expect(wide.toMs - wide.fromMs).toBe(LONGEST_MS)
    expect(panned(range, 5, NOW).toMs).toBeLessThanOrEqual(NOW + 0.03 * 48 * HOUR)
    expect(heldTo(range, NOW)).toEqual(range)
  })
  it('answers to keys, and to no others', () => {
    expect(byKey('+', range, NOW)?.toMs).toBe(NOW - 12 * HOUR)
    expect(byKey('ArrowLeft', range, NOW)).toEqual({ fromMs: NOW - 60 * HOUR, toMs: NOW - 12 * HOUR })
    expect(byKey('Home', range, NOW)).toBeNull()
    expect(byKey('a', range, NOW)).toBeUndefined()
  })
  it('is read from an address only when it makes sense', () => {
    expect(
      parseRange(new URLSearchParams('from=2026-12-01T00:00:00Z&to=2026-12-02T00:00:00Z')),
    ).not.toBeNull()
    expect(parseRange(new URLSearchParams('from=2026-12-02T00:00:00Z&to=2026-12-01T00:00:00Z'))).toBeNull()
    expect(parseRange(new URLSearchParams('from=yesterday'))).toBeNull()
  })
})

describe('the trace', () => {
  const trace: Trace = {
    resolutionSeconds: 60,
    channels: {
      vacuum: {
        at: [0, 60_000, 120_000],
        min: [inHgToPa(5), null, inHgToPa(8)],
        max: [inHgToPa(10), null, inHgToPa(9)],
        mean: [inHgToPa(9), null, inHgToPa(8.5)],
      },
    },
    runs: [
      { startedAt: 0, stoppedAt: 40_000, trigger: 'leak' },
      { startedAt: 60_000, stoppedAt: null, trigger: 'flush' },
    ],
    flushes: [{ at: 60_000, dropPa: 9000, startedPump: true }],
    offsets: [],
  }
  it('keeps least and greatest apart, and a gap a gap', () => {
    const [at, high, low] = traceData(trace, 'inHg')
    expect(at).toEqual([0, 60, 120])
    expect(high?.[1]).toBeNull()
    expect(high?.[0]).toBeCloseTo(10, 9)
    expect(low?.[0]).toBeCloseTo(5, 9)
  })
  it('is empty without a vacuum channel', () => {
    expect(traceData({ ...trace, channels: {} }, 'kPa')).toEqual([[], [], []])
  })
  it('is said in words', () => {
    expect(traceFinding(trace, 7200, 'inHg')).toBe(
      'In 2 h the pump ran 2 times, 1 of them by itself, 1 flush, vacuum between 5.00 inHg and 10.00 inHg, 1 gap in what was heard.',
    )
  })
})

describe('the holds', () => {
  const hold = (hours: number, ending: Hold['ending']): Hold => ({
    startedAt: '2026-11-20T00:00:00Z',
    endedAt: '2026-11-20T01:00:00Z',
    durationSeconds: hours * 3600,
    ending,
    flushes: 0,
    leakRate: null,
  })
  const holds = [
    hold(2, 'leak'),
    hold(6, 'leak'),
    hold(10, 'leak'),
    hold(1, 'flush'),
    hold(5, 'interrupted'),
    hold(3, 'open'),
  ]
  it('differ in shape where the pump ended them and where a flush did', () => {
    const points = holdPoints(holds, LIMITS)
    expect(points.map((point) => [point.shape, point.tone])).toEqual([
      ['full', 'attention'],
      ['full', 'buff-ink'],
      ['full', 'sound'],
      ['open', 'ink-2'],
    ])
  })
  it('are said in words, interrupted ones left out', () => {
    expect(holdsFinding(holds, 60, LIMITS)).toBe(
      'In 60 days the pump ended 3 holds by itself, half of them within 6 h; 1 stayed under the limit of 3 h. A flush cut 1 short.',
    )
    expect(holdsFinding([], 14, LIMITS)).toBe('No hold ended in these 14 days.')
  })
  it('stand on an axis that always shows limit and aim', () => {
    const axis = holdAxis(holdPoints(holds, LIMITS), LIMITS)
    expect(axis.ticks).toContain(10_800)
    expect(axis.ticks).toContain(28_800)
    expect(axis.low).toBeLessThan(3600)
    expect(holdTickLabel(10_800, LIMITS)).toBe('limit 3 h')
    expect(holdTickLabel(60, LIMITS)).toBe('1 min')
  })
})

describe('the pump', () => {
  const run = (startedAt: string, seconds: number, trigger: Run['trigger']): Run => ({
    startedAt,
    stoppedAt: null,
    durationSeconds: seconds,
    trigger,
    vacuumAtStartPa: 28_000,
    vacuumAtStopPa: 34_000,
    edgeUncertaintySeconds: 1,
  })
  const runs = [
    run('2026-12-01T03:30:00Z', 60, 'leak'),
    run('2026-12-01T05:00:00Z', 120, 'flush'),
    run('2026-12-01T23:00:00Z', 60, 'leak'),
  ]
  it('is counted by the boat’s own days', () => {
    expect(pumpDays(runs, -4 * 3600, 6)).toEqual([
      { date: '2026-11-30', runs: 1, byItself: 1, seconds: 60, ampHours: expect.closeTo(0.1, 9) },
      { date: '2026-12-01', runs: 2, byItself: 1, seconds: 180, ampHours: expect.closeTo(0.3, 9) },
    ])
    expect(pumpDays(runs, 0, null)[0]?.ampHours).toBeNull()
  })
  it('draws a recharge only from runs by themselves', () => {
    expect(rechargePoints(runs).map((point) => point.value)).toEqual([100, 100])
  })
  it('is said in words', () => {
    const slow = summary({ recharge: { paPerSecond: 100, usualPaPerSecond: 150 } })
    expect(pumpFinding(slow, pumpDays(runs, 0, 6), 'kPa')).toBe(
      'It draws down at 0.100 kPa/s, 33 % slower than usual. In the last week it ran 3.0 times a day for 4 min in all, 0.4 Ah.',
    )
    expect(meanOfDays([], 7)).toBeNull()
  })
})

describe('what is drawn on the record', () => {
  it('names a step by its two ends, as on board', () => {
    const step = {
      between: ['2026-11-29T18:10:00Z', '2026-11-29T21:25:00Z'] as [string, string],
      fromPaPerHour: 1,
      toPaPerHour: 2,
      strength: 6,
    }
    expect(stepMarks([step], OFFSETS, NOW)[0]?.label).toBe('step, Sun 14:10 to Sun 17:25')
  })
  it('leaves out visits that have not happened and those to the other system', () => {
    expect(visitMarks([], '1')).toEqual([])
  })
})

describe('the finding of a vessel', () => {
  it('says state, hold time with interval, and tonight', () => {
    expect(plain(vesselFinding(summary(), outlook(), OFFSETS, NOW))).toBe(
      'Leaking. Holds 1.4 h (1.3 to 1.6 h), and would run about 6 times tonight, first by about 00:00.',
    )
  })
  it('says since when a silent boat is silent', () => {
    expect(plain(vesselFinding(summary({ state: 'unheard' }), null, OFFSETS, NOW))).toBe(
      'Unheard since Sun 14:10.',
    )
  })
  it('rests on legs, hours and correction, and names a cause and a step', () => {
    const step = {
      between: ['2026-11-29T18:10:00Z', '2026-11-29T21:25:00Z'] as [string, string],
      fromPaPerHour: 372.5,
      toPaPerHour: 1523.9,
      strength: 6,
    }
    expect(vesselBasis(summary({ cause: 'leak' }), [step], 'inHg', OFFSETS, NOW)).toBe(
      '0.81 inHg/h (0.71 to 0.92 inHg/h) from 22 legs over 24 h, corrected for temperature and barometer. The leak has grown; pump, switch and gas space are as they were. It stepped up, 0.11 to 0.45 inHg/h, between Sun 14:10 and Sun 17:25.',
    )
  })
})

describe('the system as drawn', () => {
  const part = (key: string, kind: Part['kind'], parent: string | null): Part => ({
    key,
    kind,
    name: key,
    volumeM3: 0,
    parent,
  })
  it('puts each hose beside the head it carries, and nothing on top of anything', () => {
    const placed = layOut([
      part('h1', 'head', 's1'),
      part('h2', 'head', 's2'),
      part('s2', 'hose', 't'),
      part('s1', 'hose', 't'),
      part('t', 'tank', null),
      part('w', 'switch', 't'),
      part('p', 'pump', 't'),
    ])
    const at = (key: string) => placed.find((place) => place.part.key === key)
    expect(at('s1')?.row).toBe(at('h1')?.row)
    expect(at('s2')?.row).toBe(at('h2')?.row)
    expect(new Set(placed.map((place) => `${place.column}/${place.row}`)).size).toBe(placed.length)
  })
  it('closes up columns that nothing stands in', () => {
    expect(layOut([part('h', 'head', null), part('p', 'pump', null)]).map((place) => place.column)).toEqual([
      0, 1,
    ])
  })
})
