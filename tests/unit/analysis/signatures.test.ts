import { describe, expect, test } from 'vitest'
import type { FlushRow, LegRow, RunRow } from '@/lib/analysis/fold'
import {
  changesAcrossFlushes,
  chatter,
  cupTest,
  followsTemperature,
  lateSeating,
  pastCutOut,
  plateau,
  priorFactorsOf,
  sealDrying,
  signsTogether,
  somebodyTouchedIt,
  suspectsOf,
  underWay,
  type SignatureFinding,
  type SignatureInput,
} from '@/lib/analysis/signatures'
import { AT, DAY_MS, flush, HOUR_MS, hold, INHG, lawOf, leg, run } from './record-rows'

const SAME = { ratePaPerSecond: 0.5, rechargePaPerSecond: 100, differentialPa: 2 * INHG, ratio: 0.005 }
const EMPTY: SignatureInput = {
  at: AT,
  legs: [],
  runs: [],
  holds: [],
  flushes: [],
  figures: {
    state: 'leaking',
    signs: { now: SAME, usual: SAME },
    cutOutPa: 10 * INHG,
    cutInPa: 8 * INHG,
    settledPa: 9.9 * INHG,
  },
  standardPressurePa: 101_325,
  steps: [],
  cupTests: [],
  offsets: [],
}

const named = (finding: SignatureFinding): string[] =>
  finding.enough ? finding.suspects.map((suspect) => suspect.family) : ['not enough']

/** Legs of an hour with a run between them, every other one begun by a flush; `scale` of each by its place. */
function story(scaleOf: (index: number) => number, count = 40): SignatureInput {
  const legs: LegRow[] = []
  const runs: RunRow[] = []
  const flushes: FlushRow[] = []
  for (let i = 0; i < count; i += 1) {
    const startedAt = AT - (count - i) * HOUR_MS
    const flushed = i % 2 === 0
    if (flushed) flushes.push(flush(startedAt - 160_000))
    runs.push(run(startedAt - 160_000, 60, { trigger: flushed ? 'flush' : 'leak' }))
    legs.push(leg(startedAt, 3300, lawOf(1500 * scaleOf(i)), { sinceFlushSeconds: flushed ? 160 : 3760 }))
  }
  return { ...EMPTY, legs, runs, flushes }
}

/** Something between 0.6 and 1.7 that differs from step to step. */
const jump = (step: number): number => [1, 1.6, 0.7, 1.3, 0.6, 1.1, 1.7][step % 7] ?? 1

describe('an empty record', () => {
  test('names nobody and says what is missing', () => {
    const found = suspectsOf(EMPTY)
    expect(found.families).toEqual([])
    expect(found.notEnough.length).toBeGreaterThanOrEqual(5)
    expect(found.notEnough.every(({ missing }) => missing.length > 0)).toBe(true)
    expect(found.inseparable.length).toBe(4)
  })
})

describe('changes across flushes', () => {
  test('only with flushes: a bowl valve, with the counts', () => {
    const finding = changesAcrossFlushes(story((i) => jump(Math.floor(i / 2))))
    expect(named(finding)).toEqual(['bowl-valve'])
    expect(finding.enough && finding.suspects[0]?.basis).toMatch(
      /after flushes \d+ of \d+, after leak runs 0 of/,
    )
  })
  test('with every run: a check valve', () => {
    expect(named(changesAcrossFlushes(story(jump)))).toEqual(['check-valve'])
  })
  test('with neither: nothing on a short record', () => {
    expect(named(changesAcrossFlushes(story(() => 1)))).toEqual([])
  })
  test('few holds: not enough', () => {
    expect(named(changesAcrossFlushes(story(jump, 8)))).toEqual(['not enough'])
  })
})

describe('a bowl seal', () => {
  test('a knee in the first hold after a flush, and only there', () => {
    const input = story(() => 1)
    const legs = input.legs.map((one, index) => {
      if (index % 2 !== 0) return one
      const bins = {
        ...one.bins,
        vacuumPa: one.bins.offsetSeconds.map(
          (s) => 10 * INHG - (s < 1500 ? 0.1 * s : 150 + 0.6 * (s - 1500)),
        ),
      }
      return { ...one, bins }
    })
    expect(named(sealDrying({ ...input, legs }))).toEqual(['bowl-seal'])
    expect(named(sealDrying(input))).toEqual([])
  })

  test('the cup test: fell and came back, stayed, not done', () => {
    const before = { paPerHour: 2000, sigma: 50 }
    const cup = (wet: number, after: number | null) => ({
      ...EMPTY,
      cupTests: [
        {
          headName: 'forward head',
          before,
          wet: { paPerHour: wet, sigma: 50 },
          after: after === null ? null : { paPerHour: after, sigma: 50 },
        },
      ],
    })
    const both = cupTest(cup(600, 1950))
    const once = cupTest(cup(600, null))
    expect(named(both)).toEqual(['bowl-seal'])
    expect(
      both.enough && once.enough && (both.suspects[0]?.strength ?? 0) > (once.suspects[0]?.strength ?? 0),
    ).toBe(true)
    const cleared = cupTest(cup(1980, null))
    expect(cleared.enough && (cleared.suspects[0]?.strength ?? 1)).toBeLessThan(1)
    expect(named(cupTest(EMPTY))).toEqual(['not enough'])
  })
})

describe('r, R, D and K together', () => {
  const now = (over: Partial<typeof SAME>) => {
    const signs = { ...SAME, ...over }
    const ratio = signs.ratePaPerSecond / (signs.ratePaPerSecond + signs.rechargePaPerSecond)
    return { ...EMPTY, figures: { ...EMPTY.figures, signs: { now: { ...signs, ratio }, usual: SAME } } }
  }
  test.each([
    [{ rechargePaPerSecond: 60 }, ['pump']],
    [{ differentialPa: 1.3 * INHG }, ['switch']],
    [{ ratePaPerSecond: 0.8, rechargePaPerSecond: 160 }, ['gas-space']],
    [{ ratePaPerSecond: 1, rechargePaPerSecond: 60 }, ['check-valve']],
    [{}, []],
  ])('%j', (over, families) => {
    expect(named(signsTogether(now(over)))).toEqual(families)
  })
  test('a slow recharge with a low supply is the supply', () => {
    const runs = [4, 3, 2, 1.5, 0.6, 0.4, 0.2].map((days) =>
      run(AT - days * DAY_MS, 60, { supplyV: days < 1 ? 11.4 : 12.7 }),
    )
    expect(named(signsTogether({ ...now({ rechargePaPerSecond: 60 }), runs }))).toEqual(['supply'])
  })
})

describe('switch', () => {
  const runsOf = (stopPa: number, gapSeconds: number) =>
    Array.from({ length: 8 }, (_, i) =>
      run(AT - (i + 1) * (60 + gapSeconds) * 1000, 60, { vacuumAtStopPa: stopPa }),
    )
  test('past the cut-out by an inch', () => {
    expect(named(pastCutOut({ ...EMPTY, runs: runsOf(11.2 * INHG, 600) }))).toEqual(['switch'])
    expect(named(pastCutOut({ ...EMPTY, runs: runsOf(10 * INHG, 600) }))).toEqual([])
    expect(named(pastCutOut(EMPTY))).toEqual(['not enough'])
  })
  test('chatter', () => {
    expect(named(chatter({ ...EMPTY, runs: runsOf(10 * INHG, 3) }))).toEqual(['switch'])
    expect(named(chatter({ ...EMPTY, runs: runsOf(10 * INHG, 600) }))).toEqual([])
  })
})

describe('a run that plateaus', () => {
  const low = run(AT - HOUR_MS, 900, { vacuumAtStopPa: 6 * INHG })
  test('then falls slowly: a weak pump; fast: a big leak; near zero after a flush: a bowl valve', () => {
    const after = (endPa: number) => [hold(low.stoppedAt, 1800, { cutOutPa: 6 * INHG, endPa })]
    expect(named(plateau({ ...EMPTY, runs: [low], holds: after(5.9 * INHG) }))).toEqual(['pump'])
    expect(named(plateau({ ...EMPTY, runs: [low], holds: after(3 * INHG) }))).toEqual(['fixed-fitting'])
    const open = { ...low, vacuumAtStopPa: 0.5 * INHG }
    expect(named(plateau({ ...EMPTY, runs: [open], flushes: [flush(open.startedAt)] }))).toEqual([
      'bowl-valve',
    ])
    expect(named(plateau(EMPTY))).toEqual([])
  })
})

describe('over weeks', () => {
  test('a settling that grows: valves seating late', () => {
    const holds = (growth: number) =>
      Array.from({ length: 40 }, (_, i) =>
        hold(AT - (40 - i) * DAY_MS, 3600, { settledPa: (9.8 - growth * (i / 7)) * INHG }),
      )
    expect(named(lateSeating({ ...EMPTY, holds: holds(0.1) }))).toEqual(['check-valve'])
    expect(named(lateSeating({ ...EMPTY, holds: holds(0) }))).toEqual([])
    expect(named(lateSeating(EMPTY))).toEqual(['not enough'])
  })

  test('a leak that follows the temperature: hose or clamp', () => {
    const warm = (perDegree: number) => {
      const input = story((i) => Math.exp(perDegree * (i % 10)))
      const legs = input.legs.map((one, i) => ({
        ...one,
        bins: { ...one.bins, airC: one.bins.airC.map(() => 15 + (i % 10)) },
      }))
      return { ...input, legs }
    }
    expect(named(followsTemperature(warm(0.06)))).toEqual(['hose-or-clamp'])
    expect(named(followsTemperature(warm(0)))).toEqual([])
    expect(named(followsTemperature(story(() => 1)))).toEqual(['not enough'])
  })

  test('higher while charging: moved by motion', () => {
    const input = story((i) => (i % 3 === 0 ? 1.8 : 1))
    const legs = input.legs.map((one, i) => ({ ...one, holdStartedAt: input.runs[i]?.stoppedAt ?? 0 }))
    const runs = input.runs.map((one, i) => ({ ...one, supplyV: i % 3 === 0 ? 14.1 : 12.6 }))
    expect(named(underWay({ ...input, legs, runs }))).toEqual(['hose-or-clamp'])
    expect(named(underWay(input))).toEqual(['not enough'])
  })

  test('a step in working hours with nothing near: somebody touched it', () => {
    const noon = Date.UTC(2027, 2, 15, 12)
    const step = { between: [noon, noon + HOUR_MS] as const, fromPaPerHour: 400, toPaPerHour: 1500 }
    expect(named(somebodyTouchedIt({ ...EMPTY, steps: [step] }))).toEqual(['handled'])
    expect(named(somebodyTouchedIt({ ...EMPTY, steps: [step], flushes: [flush(noon + 60_000)] }))).toEqual([])
    const night = { ...step, between: [noon - 11 * HOUR_MS, noon - 10 * HOUR_MS] as const }
    expect(named(somebodyTouchedIt({ ...EMPTY, steps: [night] }))).toEqual([])
  })
})

describe('together', () => {
  test('three families at most, the likeliest first, and factors for the parts of their kinds', () => {
    const found = suspectsOf(story(jump))
    expect(found.families.length).toBeLessThanOrEqual(3)
    expect(found.families[0]?.family).toBe('check-valve')
    const parts = [
      { key: 'pump', kind: 'pump' as const },
      { key: 'head-1', kind: 'head' as const },
    ]
    expect(priorFactorsOf(found, parts)).toEqual({ pump: found.families[0]?.factor })
  })
})
