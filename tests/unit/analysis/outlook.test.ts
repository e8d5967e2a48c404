import { describe, expect, test } from 'vitest'
import {
  eveningStart,
  localHour,
  outlookOf,
  scoreNight,
  warns,
  type Outlook,
  type OutlookInput,
  type WarningSettings,
} from '@/lib/analysis/outlook'
import type { LeakModel } from '@/lib/analysis/fit'
import { AT, DAY_MS, flush, HOUR_MS, hold, INHG, lawOf, run } from './record-rows'

const EVENING = Date.UTC(2027, 2, 15, 20)
const NIGHT = { from: EVENING + 2 * HOUR_MS, to: EVENING + 11 * HOUR_MS, bedtime: EVENING + 2.5 * HOUR_MS }

function modelOf(hours: number, over: Partial<LeakModel> = {}): LeakModel {
  return {
    law: lawOf((2 * INHG) / hours),
    gasResponse: [80, 80, 80],
    holdSeconds: hours * 3600,
    lowSeconds: 0.97 * hours * 3600,
    highSeconds: 1.03 * hours * 3600,
    bound: null,
    logSigma: 0.015,
    observedHoldSeconds: hours * 3600,
    standardPressurePa: 101_325,
    cutOutPa: 10 * INHG,
    settledPa: 10 * INHG,
    cutInPa: 8 * INHG,
    compensated: true,
    ...over,
  }
}

/** A week of flushes at 07:00, 13:00, 19:00 and 21:30. */
const FLUSHES = Array.from({ length: 8 }, (_, day) =>
  [7, 13, 19, 21.5].map((hour) => flush(Date.UTC(2027, 2, 15 - day) + hour * HOUR_MS)),
)
  .flat()
  .filter((one) => one.at < EVENING)

function inputOf(hours: number, over: Partial<OutlookInput> = {}): OutlookInput {
  return {
    at: EVENING,
    night: NIGHT,
    offsets: [{ from: 0, seconds: 0 }],
    runs: [],
    holds: [hold(EVENING - 8 * DAY_MS, 3600)],
    flushes: FLUSHES,
    open: { run: null, hold: hold(EVENING - HOUR_MS, 60), leg: null },
    current: {
      at: EVENING,
      vacuumPa: 9.5 * INHG,
      pumpOn: false,
      airC: 18,
      barometerPa: 101_325,
      supplyV: 12.6,
    },
    model: modelOf(hours),
    air: [],
    said: 'unknown',
    lastHeardAt: EVENING,
    seesFlushes: true,
    ...over,
  }
}

describe('chances', () => {
  test('learning: everything is null', () => {
    const outlook = outlookOf(inputOf(5, { model: null }))
    expect(outlook).toMatchObject({
      basis: 'learning',
      chance: null,
      chanceIfFlushedLast: null,
      firstRun: null,
    })
  })

  test('an 11 h boat and a 9 h night: quiet if flushed last, so no warning', () => {
    const outlook = outlookOf(inputOf(11))
    expect(outlook.chanceIfFlushedLast).toBeLessThan(0.05)
    expect(warns(outlook, SETTINGS)).toMatchObject({ warn: false })
  })

  test('a 2 h boat runs whatever anybody does, about four times', () => {
    const outlook = outlookOf(inputOf(2))
    expect(outlook.chance).toBeGreaterThan(0.97)
    expect(outlook.chanceIfFlushedLast).toBeGreaterThan(0.97)
    expect(outlook.expectedRuns).toBeGreaterThan(3)
    expect(outlook.expectedRuns).toBeLessThan(5)
    expect(outlook.basis).toBe('phase-open')
    expect(outlook.firstRun?.at).toBeNull()
  })

  test('the chance falls as the hold time grows', () => {
    const chances = [1, 4, 7, 10, 20].map((hours) => outlookOf(inputOf(hours)).chance ?? NaN)
    chances
      .slice(1)
      .forEach((chance, index) => expect(chance).toBeLessThanOrEqual((chances[index] ?? 0) + 0.03))
  })

  test('the same input gives the same outlook', () => {
    expect(outlookOf(inputOf(6))).toEqual(outlookOf(inputOf(6)))
  })

  test('a bound on the hold time makes no promise of a run', () => {
    const outlook = outlookOf(
      inputOf(14, { model: modelOf(14, { bound: 'at-least', highSeconds: null, logSigma: 0.5 }) }),
    )
    expect(outlook.chanceIfFlushedLast).toBeLessThan(0.1)
  })
})

describe('next run', () => {
  test('away: the decay from the vacuum now', () => {
    const outlook = outlookOf(inputOf(8, { said: 'away' }))
    expect(outlook.basis).toBe('phase-known')
    const hours = ((outlook.firstRun?.at ?? 0) - EVENING) / HOUR_MS
    // From 9.5 to 8 inHg, three quarters of an 8 h hold and a little more, since it slows.
    expect(hours).toBeGreaterThan(5.9)
    expect(hours).toBeLessThan(6.5)
    expect(outlook.firstRun?.earliest).toBeLessThan(outlook.firstRun?.at ?? 0)
    expect(outlook.firstRun?.latest).toBeGreaterThan(outlook.firstRun?.at ?? Infinity)
  })

  test('inside quiet hours the phase is known though people are aboard', () => {
    const at = NIGHT.from + HOUR_MS
    const outlook = outlookOf(inputOf(8, { at, lastHeardAt: at }))
    expect(outlook.basis).toBe('phase-known')
    expect(outlook.firstRun?.at).not.toBeNull()
  })

  test('a night that cools by three degrees stretches the hold', () => {
    const air = Array.from({ length: 97 }, (_, i) => {
      const at = EVENING - 2 * DAY_MS + (i * HOUR_MS) / 2
      return {
        at,
        airC: 18 + 3 * Math.cos(((at % DAY_MS) / DAY_MS - 0.6) * 2 * Math.PI),
        barometerPa: 101_325,
      }
    })
    const cooled = outlookOf(inputOf(8, { said: 'away', air }))
    const steady = outlookOf(inputOf(8, { said: 'away' }))
    expect((cooled.nextRun?.at ?? 0) - (steady.nextRun?.at ?? 0)).toBeGreaterThan(0.3 * HOUR_MS)
  })

  test('pump only: from when the hold began', () => {
    const model = modelOf(8, { law: null, cutOutPa: null, settledPa: null, cutInPa: null })
    const current = {
      at: EVENING,
      vacuumPa: null,
      pumpOn: false,
      airC: null,
      barometerPa: null,
      supplyV: null,
    }
    const outlook = outlookOf(inputOf(8, { model, current, said: 'away', seesFlushes: false, flushes: [] }))
    expect(((outlook.nextRun?.at ?? 0) - EVENING) / HOUR_MS).toBeCloseTo(7, 0)
  })
})

describe('local time comes as data', () => {
  const offsets = [
    { from: 0, seconds: 3600 },
    { from: AT, seconds: 7200 },
  ]
  test('hours and evenings follow the span in force', () => {
    expect(localHour(offsets, AT - 1)).toBe(12)
    expect(localHour(offsets, AT)).toBe(14)
    expect(localHour([], AT)).toBe(12)
    expect(eveningStart([{ from: 0, seconds: 7200 }], Date.UTC(2027, 2, 15, 20))).toBe(
      Date.UTC(2027, 2, 15, 15),
    )
  })

  test('quiet hours that begin after midnight belong to the evening before', () => {
    expect(eveningStart([], Date.UTC(2027, 2, 16, 0, 30))).toBe(Date.UTC(2027, 2, 15, 17))
  })

  test('a night of a clock change is an hour longer', () => {
    const outlook = outlookOf(inputOf(5, { night: { ...NIGHT, to: NIGHT.to + HOUR_MS } }))
    expect(outlook.night.hours).toBe(10)
  })
})

const SETTINGS: WarningSettings = {
  threshold: 0.5,
  expected: true,
  lastWarning: null,
  latestAt: NIGHT.from + HOUR_MS,
}

describe('warns', () => {
  const outlook: Outlook = { ...outlookOf(inputOf(2)), aboard: 'aboard' }
  const quiet = { ...outlook, chance: 0.1, chanceIfFlushedLast: 0.02 }
  const lastWarning = { at: EVENING - DAY_MS, expectedRuns: outlook.expectedRuns ?? 0 }
  test.each<[string, Outlook, Partial<WarningSettings>, boolean, string]>([
    ['likely whatever anybody does', outlook, {}, true, 'likely-even-if-flushed-last'],
    ['the same again', outlook, { lastWarning }, false, 'already-said'],
    ['grown by half', outlook, { lastWarning: { ...lastWarning, expectedRuns: 2 } }, true, 'grown-by-half'],
    [
      'a week later',
      outlook,
      { lastWarning: { ...lastWarning, at: EVENING - 8 * DAY_MS } },
      true,
      'seven-days-since',
    ],
    ['nobody known to be aboard', { ...outlook, aboard: 'unknown' }, {}, false, 'nobody-aboard'],
    ['old data', { ...outlook, heardAt: EVENING - 3 * HOUR_MS }, {}, false, 'stale-data'],
    ['never heard', { ...outlook, heardAt: null }, {}, false, 'stale-data'],
    ['past the last moment', outlook, { latestAt: EVENING - 1 }, false, 'too-late'],
    ['laid up', outlook, { expected: false }, false, 'not-expected'],
    ['learning', { ...outlook, chance: null }, {}, false, 'learning'],
    ['quiet if flushed last thing', { ...quiet, chance: 0.8 }, {}, false, 'flush-last-thing'],
    ['quiet', quiet, {}, false, 'quiet-night'],
    [
      'exactly at the setting',
      { ...outlook, chanceIfFlushedLast: 0.5, chance: 0.5 },
      {},
      false,
      'quiet-night',
    ],
  ])('%s', (_name, given, settings, warn, reason) => {
    expect(warns(given, { ...SETTINGS, ...settings })).toEqual({ warn, reason })
  })
})

describe('the night after', () => {
  const own = run(NIGHT.from + HOUR_MS, 60)
  const base = { night: NIGHT, holds: [], foretold: true, heardUntil: NIGHT.to }
  test('hit, false, missed, quiet, unknown', () => {
    expect(scoreNight({ ...base, runs: [own] })).toMatchObject({
      outcome: 'hit',
      runs: 1,
      firstRunAt: own.startedAt,
    })
    expect(scoreNight({ ...base, runs: [] }).outcome).toBe('false')
    expect(scoreNight({ ...base, runs: [own], foretold: false }).outcome).toBe('missed')
    expect(scoreNight({ ...base, runs: [], foretold: false }).outcome).toBe('quiet')
    expect(scoreNight({ ...base, runs: [], heardUntil: NIGHT.from }).outcome).toBe('unknown')
  })

  test('flush runs and runs outside quiet hours do not count', () => {
    const flushed = run(NIGHT.from + HOUR_MS, 60, { trigger: 'flush' })
    const early = run(NIGHT.from - 1, 60)
    const late = run(NIGHT.to, 60)
    expect(scoreNight({ ...base, runs: [flushed, early, late] }).outcome).toBe('false')
  })

  test('a gap in the night leaves it unknown, unless a run was seen', () => {
    const holds = [hold(NIGHT.from, 3600, { ending: 'interrupted' })]
    expect(scoreNight({ ...base, runs: [], holds }).outcome).toBe('unknown')
    expect(scoreNight({ ...base, runs: [own], holds }).outcome).toBe('hit')
  })
})
