import { describe, expect, it } from 'vitest'
import { outlookScoreWords } from '@/components/fleet/outlook-score-words'
import {
  notEnoughWords,
  strengthWords,
  suspectsFinding,
  whatToBring,
} from '@/components/vessel/before-you-go/words'
import { supplyBins, supplyFinding } from '@/components/vessel/pump/supply-bins'
import {
  comparableVisits,
  comparisonPath,
  instantOf,
  NOTHING,
  spanTrouble,
  wallOf,
} from '@/components/vessel/record/compare-spans'
import { compareFinding, compareRows } from '@/components/vessel/record/compare-words'
import { trendWords } from '@/components/vessel/record/trend-words'
import type { Comparison, ComparisonSide, Run, Suspect, Trend, Visit } from '@/shared/schemas'
import { NOW } from './fixtures'

const DAY_MS = 86_400_000
const iso = (ms: number): string => new Date(ms).toISOString()

const SIDE: ComparisonSide = {
  holds: 21,
  holdTimeSeconds: 7200,
  leakRatePaPerHour: 3386.39,
  rechargePaPerSecond: 338.639,
  differentialPa: 6772.78,
  flowRatio: 0.00277,
  runsPerDay: 12.4,
  pumpSecondsPerDay: 600,
  ampHoursPerDay: 1,
}
const comparison = (over: Partial<Comparison>): Comparison => ({
  before: SIDE,
  after: { ...SIDE, holds: 9, holdTimeSeconds: 23_040, rechargePaPerSecond: null, ampHoursPerDay: null },
  ratio: { value: 3.21, low: 2.8, high: 3.66 },
  pValue: 0.00002,
  verdict: 'held',
  hoursNeeded: null,
  because: null,
  ...over,
})

describe('before and after', () => {
  it('says the verdict with ratio and interval, of a visit and of any two spans', () => {
    expect(compareFinding(comparison({}), true)).toBe(
      'The repair held: it holds 3.2 times as long as before (2.8 to 3.7, p under 0.001).',
    )
    expect(compareFinding(comparison({}), false)).toMatch(/^Better, and over the limit: /)
  })
  it('says about how many more quiet hours it takes, in whole hours and no fewer', () => {
    const early = comparison({ verdict: 'too-early', ratio: null, pValue: null, hoursNeeded: 11.2 })
    expect(compareFinding(early, true)).toBe('Too early to say. About 12 more quiet hours are needed.')
  })
  it('gives a bound as a bound, and names the tank that was pumped out', () => {
    const bound = comparison({ ratio: { value: 4, low: 2.1, high: null } })
    expect(compareFinding(bound, true)).toContain('holds at least 2.1 times as long')
    const pumpedOut = comparison({ verdict: 'no-change', because: 'gas-space' })
    expect(compareFinding(pumpedOut, true)).toMatch(/^No change: .*gas space changed/)
  })
  it('sets r, R, D and K side by side, and a dash where nothing was measured', () => {
    const rows = new Map(compareRows(comparison({}), 'inHg').map((row) => [row.name, row]))
    expect(rows.get('Hold time')).toMatchObject({ before: '2 h', after: '6.4 h' })
    expect(rows.get('Leak rate r')?.before).toBe('1.00 inHg/h')
    expect(rows.get('Recharge R')).toMatchObject({ before: '0.100 inHg/s', after: '–' })
    expect(rows.get('Differential D')?.before).toBe('2.00 inHg')
    expect(rows.get('K, leak flow over pump flow')?.before).toBe('0.28 %')
    expect(rows.get('Ah a day')).toMatchObject({ before: '1.0', after: '–' })
  })
  it('reads what is typed by the boat’s clock, and asks only for what is whole', () => {
    expect(wallOf(0, 3600)).toBe('1970-01-01T01:00')
    expect(instantOf('1970-01-01T01:00', 3600)).toBe(0)
    const before = { from: '2026-11-01T00:00', to: '2026-11-08T00:00' }
    const after = { from: '2026-11-09T00:00', to: '2026-11-12T00:00' }
    expect(spanTrouble(before, 0)).toBeNull()
    expect(spanTrouble({ from: before.to, to: before.from }, 0)).toMatch(/later/)
    expect(comparisonPath('7', { before, after: NOTHING, visitId: null }, 0)).toBeNull()
    const path = comparisonPath('7', { before, after, visitId: null }, 3600) ?? ''
    expect(new URL(path, 'http://boats.example').searchParams.get('before')).toBe(
      '2026-10-31T23:00:00.000Z/2026-11-07T23:00:00.000Z',
    )
    expect(comparisonPath('7', { before, after, visitId: '3' }, 0)).toBe('/api/systems/7/comparison?visit=3')
  })
  it('offers visits to this system that began, newest first', () => {
    const visit = (id: string, startedAt: string | null, systemId: string | null): Visit =>
      ({ id, startedAt, systemId }) as Visit // only these members are looked at
    const visits = [
      visit('1', iso(NOW - 9 * DAY_MS), null),
      visit('2', iso(NOW - 2 * DAY_MS), '7'),
      visit('3', iso(NOW - DAY_MS), '8'),
      visit('4', null, '7'),
    ]
    expect(comparableVisits(visits, '7').map(({ id }) => id)).toEqual(['2', '1'])
  })
})

describe('the trend', () => {
  const trend = (over: Partial<Trend>): Trend => ({
    slopePerDay: 0.033,
    doublingDays: 21,
    pValue: 0.0041,
    limitCrossing: null,
    steps: [],
    ...over,
  })
  const say = (over: Partial<Trend>) => trendWords(trend(over), 10_800, 0, NOW)
  it('says what it doubles in, and when the limit is crossed or was', () => {
    expect(say({})).toBe('The leak grows: it doubles in 21 days (p 0.0041).')
    const crossing = (days: number) => ({
      limitCrossing: {
        at: iso(NOW + days * DAY_MS),
        low: iso(NOW + (days - 3) * DAY_MS),
        high: iso(NOW + (days + 5) * DAY_MS),
      },
    })
    expect(say(crossing(10))).toMatch(/falls under the limit of 3 h about .* \(between .* and .*\)\.$/)
    expect(say(crossing(-10))).toMatch(/fell under the limit of 3 h about/)
  })
  it('says that it shrinks, that there is none, and that it cannot be said', () => {
    expect(say({ doublingDays: -7, slopePerDay: -0.1 })).toMatch(/^The leak shrinks: it halves in 7 days/)
    expect(say({ doublingDays: null, pValue: 0.4 })).toBe(
      'No trend in the leak over the last 90 days (p 0.4).',
    )
    expect(say({ slopePerDay: null, pValue: null, doublingDays: null })).toMatch(/not yet enough days/)
  })
})

describe('the pump by supply voltage', () => {
  const run = (supplyV: number | null, rechargePaPerSecond: number, over: Partial<Run> = {}): Run => ({
    startedAt: iso(NOW),
    stoppedAt: iso(NOW + 30_000),
    durationSeconds: 30,
    trigger: 'leak',
    vacuumAtStartPa: null,
    vacuumAtStopPa: null,
    edgeUncertaintySeconds: 0,
    rechargePaPerSecond,
    supplyV,
    ...over,
  })
  const low = [100, 104, 102].map((rate) => run(12.1, rate))
  const high = [130, 120, 127, 124].map((rate) => run(13.2, rate))
  it('takes the middle of runs by themselves at each half volt', () => {
    const bins = supplyBins([...high, ...low, run(null, 999), run(12.2, 999, { trigger: 'flush' })])
    expect(bins).toEqual([
      { lowV: 12, highV: 12.5, runs: 3, rechargePaPerSecond: 102, seconds: 30 },
      { lowV: 13, highV: 13.5, runs: 4, rechargePaPerSecond: 125.5, seconds: 30 },
    ])
    expect(supplyFinding(bins)).toBe('At 13.0 to 13.5 V it draws down 23 % faster than at 12.0 to 12.5 V.')
  })
  it('says so where the supply hardly varied', () => {
    expect(supplyBins([run(null, 100)])).toEqual([])
    expect(supplyFinding(supplyBins(low))).toMatch(/hardly varied/)
  })
})

describe('before you go', () => {
  const suspect = (family: Suspect['family']): Suspect => ({
    family,
    strength: 3.5,
    basis: ['leak changes after flushes 2 of 20, after leak runs 9 of 21'],
    overturnedBy: ['a night of leak runs without a change'],
    parts: ['pump'],
  })
  const said = (verdict: 'named' | 'nobody' | 'not-enough', suspects: Suspect[]) =>
    suspectsFinding({
      at: iso(NOW),
      from: iso(NOW - DAY_MS),
      verdict,
      suspects,
      cleared: [],
      notEnough: [],
      inseparable: [],
      priorFactors: {},
    })
  it('names the likeliest, or says that nobody is named and why', () => {
    expect(said('named', [suspect('check-valve')])).toMatch(/check valve .* likeliest by the record/)
    expect(said('nobody', [])).toMatch(/points at no part/)
    expect(said('not-enough', [])).toMatch(/not enough yet/)
    expect(strengthWords(3.5)).toBe('about 3.5 times likelier than on any boat')
  })
  it('packs the suspects’ parts first, and each thing once', () => {
    const bag = whatToBring({ suspects: [suspect('pump'), suspect('check-valve')] })
    expect(bag[0]).toBe('check valves')
    expect(new Set(bag).size).toBe(bag.length)
    expect(whatToBring({ suspects: [] })).toContain('bowl seals')
  })
  it('says what is missing in words', () => {
    expect(notEnoughWords({ signature: 'late-seating', missing: '20 holds over a week' })).toBe(
      'valves that seat late: needs 20 holds over a week',
    )
  })
})

describe('the outlook’s score', () => {
  const score = {
    from: iso(NOW - 30 * DAY_MS),
    to: iso(NOW),
    nights: 60,
    outcomes: { hit: 8, false: 3, missed: 2, quiet: 47 },
    brier: 0.0512,
    baseRateBrier: 0.1389,
    rated: 60,
  }
  it('stands in one line beside the base rate, and says nothing before the first night', () => {
    expect(outlookScoreWords(score)).toBe(
      'Outlook, last 30 nights: of 60 nights 8 foretold and ran, 3 foretold and stayed quiet, 2 ran unforetold, 47 quiet as foretold. Brier score 0.051 against 0.139 for the base rate (lower is better).',
    )
    expect(outlookScoreWords({ ...score, nights: 0 })).toBe('')
    expect(outlookScoreWords({ ...score, brier: null, baseRateBrier: null })).not.toContain('Brier')
  })
})
